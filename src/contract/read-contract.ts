import type { FileMapping } from '../core/file-mapping.ts';
import type { LightCurve, StarParameters } from '../core/light-curve.ts';
import type { Outcome } from './outcome.ts';

export type FileFormat = 'fits' | 'text';
/** A column as the mapping form shows it. */
export interface ColumnPreview {
  readonly name: string;
  readonly unit: string | undefined;
  /** First values as text. */
  readonly sample: readonly string[];
  readonly smallest: number | undefined;
  readonly largest: number | undefined;
  readonly missing: number;
}

export interface ReadJob {
  readonly jobId: string;
  readonly fileName: string;
  /** Transferred. */
  readonly bytes: ArrayBuffer;
  /** The analyst's correction, or the mapping a session keeps; guessed where absent. */
  readonly mapping?: FileMapping | undefined;
}

/** A file with no light curve in it but a table of stars: parameters by target label. */
export interface StarRow {
  readonly label: string;
  readonly star: StarParameters;
}

/** A span of time at which the instrument is not to be trusted. */
export interface InstrumentSpan {
  readonly start: number;
  readonly end: number;
  readonly note: string;
}

export type ReadResult =
  | {
      readonly kind: 'light curve';
      readonly format: FileFormat;
      readonly lightCurve: LightCurve;
      readonly mapping: FileMapping;
      readonly columns: readonly ColumnPreview[];
      readonly sha256: string;
      /** From the header (OBJECT) or the file name. */
      readonly label: string;
      readonly star: StarParameters;
      /** Sentences the analyst should see: contradictions, dropped rows, unknown meanings. */
      readonly warnings: readonly string[];
    }
  | {
      readonly kind: 'stars';
      readonly rows: readonly StarRow[];
      readonly sha256: string;
      readonly warnings: readonly string[];
    }
  | {
      readonly kind: 'instrument times';
      readonly spans: readonly InstrumentSpan[];
      readonly sha256: string;
      readonly warnings: readonly string[];
    }
  | {
      /** Readable, but what is what must be asked: the form opens with this guess. */
      readonly kind: 'question';
      readonly format: FileFormat;
      readonly sentence: string;
      readonly mapping: FileMapping;
      readonly columns: readonly ColumnPreview[];
      readonly sha256: string;
      readonly label: string;
    };

export interface ReadWorker {
  read(job: ReadJob): Promise<Outcome<ReadResult>>;
}
