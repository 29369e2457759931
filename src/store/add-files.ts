import type { ReadResult, StarRow } from '../contract/read-contract.ts';
import type { FileMapping } from '../core/file-mapping.ts';
import { DEFAULT_RECIPE } from '../core/recipe.ts';
import type { Jobs } from '../jobs/jobs.ts';
import type { FileRecord, InstrumentTable, Target } from '../session/document.ts';
import type { DocumentStore } from './document-store.ts';
import { instrumentTableOf } from './instrument-spans.ts';
import { fileResult, type LightCurveRead, type ResultsStore } from './results-store.ts';
import type { SessionStorage } from './session-storage.ts';
import { lightCurveKey } from './target-keys.ts';
import type { MappingQuestion, Unread, ViewStore } from './view-store.ts';

/** A file as the browser hands it over; its bytes are fetched only when its turn comes. */
export interface IncomingFile {
  readonly name: string;
  bytes(): Promise<ArrayBuffer>;
}

export interface AddFiles {
  /** Reads all files; those that cannot be read are listed by name with the reason, the others become targets. */
  add(files: readonly IncomingFile[]): Promise<void>;
  /** The analyst's answer to a mapping question; `alike` answers every waiting file with the same columns too. */
  answer(question: MappingQuestion, mapping: FileMapping, alike: boolean): Promise<void>;
  dismissQuestion(question: MappingQuestion): void;
  /** Opens the columns of a loaded target for correction. */
  reviseColumns(target: Target): Promise<void>;
}

interface Deps {
  readonly jobs: Jobs;
  readonly storage: SessionStorage;
  readonly document: DocumentStore;
  readonly view: ViewStore;
  readonly results: ResultsStore;
  readonly newId: () => string;
}

/** What a batch of files came to, before anything is committed. */
interface Batch {
  readonly targets: Target[];
  readonly stars: StarRow[];
  readonly instruments: InstrumentTable[];
  readonly questions: MappingQuestion[];
  readonly unread: Unread[];
}

const emptyBatch = (): Batch => ({ targets: [], stars: [], instruments: [], questions: [], unread: [] });

export function createAddFiles(deps: Deps): AddFiles {
  const { jobs, storage, document, view, results, newId } = deps;

  async function readInto(batch: Batch, name: string, bytes: ArrayBuffer, mapping?: FileMapping): Promise<void> {
    // The worker takes its buffer away; ours is still to be kept.
    const outcome = await jobs.readFile(name, bytes.slice(0), mapping);
    if (outcome.kind === 'cancelled') return;
    if (outcome.kind === 'failed') batch.unread.push({ fileName: name, sentence: outcome.error.sentence });
    else await take(batch, name, bytes, outcome.value);
  }

  async function take(batch: Batch, fileName: string, bytes: ArrayBuffer, read: ReadResult): Promise<void> {
    if (read.kind === 'stars') {
      batch.stars.push(...read.rows);
      for (const sentence of read.warnings) batch.unread.push({ fileName, sentence });
    } else if (read.kind === 'instrument times') {
      batch.instruments.push(instrumentTableOf(fileName, read.spans));
      for (const sentence of read.warnings) batch.unread.push({ fileName, sentence });
    } else if (read.kind === 'question') {
      batch.questions.push({ fileName, bytes, read, mapping: read.mapping, targetId: undefined });
    } else {
      await storage.saveFile(read.sha256, fileName, bytes);
      const target = newTarget(newId(), fileName, bytes.byteLength, read);
      fileResult(results, 'lightCurves', lightCurveKey(target), read);
      batch.targets.push(target);
    }
  }

  function commit(batch: Batch): void {
    results.setState({ failures: new Map() });
    const { run } = document.getState();
    if (batch.targets.length > 0) run({ kind: 'add targets', targets: batch.targets });
    if (batch.stars.length > 0) run({ kind: 'describe stars', rows: batch.stars });
    for (const table of batch.instruments) run({ kind: 'use instrument table', table });
    const { unread, mappingQuestions, targetId } = view.getState();
    view.setState({
      unread: [...unread, ...batch.unread],
      mappingQuestions: [...mappingQuestions, ...batch.questions],
      ...(targetId === undefined ? { targetId: document.getState().document?.targets[0]?.id } : {}),
    });
  }

  const add: AddFiles['add'] = async (files) => {
    const batch = emptyBatch();
    for (const file of files) {
      try {
        await readInto(batch, file.name, await file.bytes());
      } catch (cause) {
        batch.unread.push({ fileName: file.name, sentence: `${file.name} was not read. ${sentenceOf(cause)}` });
      }
    }
    commit(batch);
  };

  const dismissQuestion: AddFiles['dismissQuestion'] = (question) =>
    view.setState({ mappingQuestions: view.getState().mappingQuestions.filter((other) => other !== question) });

  return {
    add,
    dismissQuestion,
    async answer(question, mapping, alike) {
      const waiting = view.getState().mappingQuestions;
      const answered = waiting.filter((other) => other === question || (alike && sameColumns(other, question)));
      const batch = emptyBatch();
      for (const { fileName, bytes, targetId } of answered) {
        await readInto(batch, fileName, bytes, mapping);
        if (targetId !== undefined) remapLast(batch, targetId);
      }
      view.setState({ mappingQuestions: view.getState().mappingQuestions.filter((q) => !answered.includes(q)) });
      commit(batch);
    },
    async reviseColumns(target) {
      const file = target.files[0]!;
      const read = results.getState().lightCurves.get(lightCurveKey(target));
      const bytes = await storage.readFile(file.sha256);
      if (read === undefined || bytes === undefined) return;
      const question = { fileName: file.name, bytes, read, mapping: file.mapping, targetId: target.id };
      view.setState({ mappingQuestions: [question, ...view.getState().mappingQuestions] });
    },
  };

  /** A corrected file replaces its target's record instead of making a new target. */
  function remapLast(batch: Batch, targetId: string): void {
    const target = batch.targets.pop();
    if (target === undefined) return;
    const { files, star } = target;
    document.getState().run({ kind: 'remap file', targetId, file: files[0]!, star });
  }
}

function newTarget(id: string, name: string, bytes: number, read: LightCurveRead): Target {
  const { sha256, mapping, warnings, lightCurve, label, star } = read;
  const { time, timeReference } = lightCurve;
  const file: FileRecord = { name, sha256, bytes, mapping, timeReference, warnings, points: time.length };
  return {
    id,
    label,
    files: [file],
    star,
    recipe: DEFAULT_RECIPE,
    search: {},
    instrumentTable: undefined,
    modeSet: undefined,
    marks: [],
    cases: [],
    lastCaseNumber: 0,
  };
}

function sameColumns(a: MappingQuestion, b: MappingQuestion): boolean {
  const names = (question: MappingQuestion) => question.read.columns.map((column) => column.name).join('\n');
  return a.targetId === undefined && b.targetId === undefined && names(a) === names(b);
}

function sentenceOf(cause: unknown): string {
  return cause instanceof Error ? `The browser said: ${cause.message}.` : 'The browser gave no reason.';
}
