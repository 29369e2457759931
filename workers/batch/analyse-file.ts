import { done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { ReadResult } from '../../src/contract/read-contract.ts';
import { DEFAULT_BOX_SEARCH } from '../../src/core/box-search-settings.ts';
import type { Interval } from '../../src/core/interval.ts';
import type { StarParameters, TimeReference } from '../../src/core/light-curve.ts';
import { DEFAULT_RECIPE } from '../../src/core/recipe.ts';
import type { FileRecord, InstrumentTable } from '../../src/session/document.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { prepareSeries } from '../prepare/prepare.ts';
import { readFile } from '../read/read-file.ts';
import { refuseResult } from './build-session.ts';
import { questionWords } from './identify-file.ts';
import { densityOf, resultKeys } from './result-key.ts';
import { searchRounds } from './search-rounds.ts';
import type { FileJob, TargetResult } from './target-result.ts';

type LightCurveRead = Extract<ReadResult, { kind: 'light curve' }>;

/** Nobody waits for a message here: a kernel is never due to pause. */
const UNBROKEN: Checkpoint = { isDue: () => false, pause: async () => true };

/**
 * A file's bytes to the signals in it: read, prepared by the default recipe, searched by box least squares in rounds.
 * Pure: no clock, no files, no random numbers but seeded ones; equal jobs give equal results, in any thread and order.
 * The bytes are left as they are. A file without a light curve, or with one that cannot be searched, is a failed
 * outcome with its sentence.
 */
export async function analyseFile(job: FileJob): Promise<Outcome<TargetResult>> {
  const { fileName, bytes } = job;
  const read = await readFile({ jobId: fileName, fileName, bytes });
  if (read.kind !== 'done') return read;
  if (read.value.kind !== 'light curve') return failed(notALightCurve(fileName, read.value));
  const target = describeTarget(job, read.value);
  const searched = await searchTarget(job, read.value, target);
  if (searched.kind !== 'done') return named(fileName, searched);
  const result = { ...target, ...searched.value };
  const refusal = refuseResult(result, job.options);
  return refusal === undefined ? done(result) : failed(`${fileName} does not fit into a session. ${refusal}`);
}

type Described = Pick<TargetResult, 'label' | 'file' | 'star' | 'recipe' | 'search'>;

function describeTarget({ fileName, bytes, star, options }: FileJob, read: LightCurveRead): Described {
  const { sha256, mapping, warnings, lightCurve, label } = read;
  const { time, timeReference } = lightCurve;
  const size = bytes.byteLength;
  const file: FileRecord = {
    name: fileName,
    sha256,
    bytes: size,
    mapping,
    timeReference,
    points: time.length,
    warnings,
  };
  return { label, file, star: joinStars(read.star, star), recipe: DEFAULT_RECIPE, search: options.search };
}

async function searchTarget(
  { instrumentTable, options }: FileJob,
  { lightCurve }: LightCurveRead,
  { file, star, recipe, search }: Described,
) {
  const settings = { ...DEFAULT_BOX_SEARCH, densityCgs: densityOf(star), ...search };
  const keys = resultKeys({ file, recipe, settings, instrumentTable: instrumentTable?.id });
  const prepared = await prepareSeries(
    {
      jobId: file.name,
      key: keys.prepared,
      lightCurve,
      recipe,
      excluded: [],
      protectedEvents: [],
      protectedIntervals: [],
      instrumentSpans: instrumentSpansIn(instrumentTable, lightCurve.timeReference),
      commonModes: undefined,
    },
    UNBROKEN,
  );
  if (prepared.kind !== 'done') return prepared;
  const { time, flux, error } = prepared.value;
  const series = { seriesId: keys.prepared, time, flux, error };
  return searchRounds(series, { key: keys.search, settings, options }, UNBROKEN);
}

/** The spans of a table in the light curve's times; none where the zero of those is not known. */
function instrumentSpansIn(table: InstrumentTable | undefined, { zeroJd }: TimeReference): readonly Interval[] {
  if (table === undefined) return [];
  if (!table.isJulian) return table.spans;
  if (zeroJd === undefined) return [];
  return table.spans.map(({ start, end }) => ({ start: start - zeroJd, end: end - zeroJd }));
}

/** What a stars table leaves open stays as the file says. */
function joinStars(own: StarParameters, given: StarParameters | undefined): StarParameters {
  const known = Object.entries(given ?? {}).filter(([, value]) => value !== undefined);
  return { ...own, ...Object.fromEntries(known) };
}

function notALightCurve(fileName: string, read: Exclude<ReadResult, LightCurveRead>): string {
  if (read.kind === 'question') return questionWords(fileName, read.sentence);
  return `${fileName} was not swept. It is a table of ${read.kind}, no light curve.`;
}

/** The kernels do not know the file's name. */
function named<T>(fileName: string, outcome: Outcome<T>): Outcome<never> {
  if (outcome.kind !== 'failed') return outcome as Outcome<never>;
  return failed(`${fileName} was not searched. ${outcome.error.sentence}`, outcome.error.detail);
}
