import type { Case, SessionDocument, Target } from './document.ts';

/**
 * The text of a *.candling.json file. Cases of a linear timing also say their ephemeris and the strength of their
 * signal in the units of a paper, for other programs: derived from timing and numbers, and left out on reading.
 */
export function writeSession(document: SessionDocument): string {
  const targets = document.targets.map((target) => ({
    ...target,
    cases: target.cases.map((one) => ({ ...one, ...derivedOf(one, target) })),
  }));
  return `${JSON.stringify({ ...document, targets }, undefined, 1)}\n`;
}

function derivedOf({ timing, numbers, origin }: Case, target: Target) {
  if (timing.kind !== 'linear') return {};
  const { periodDays, epochDays, durationDays } = timing;
  const ephemeris = {
    periodDays,
    epoch: epochDays,
    /** What the epoch counts from, a Julian date; absent where the file does not say. */
    zeroJd: target.files[0]?.timeReference.zeroJd,
    durationHours: durationDays * 24,
    depthPpm: numbers === undefined || isInSigma(target) ? undefined : numbers.boxDepth * 1e6,
  };
  const snr = numbers?.signalToNoise;
  if (numbers === undefined || snr === undefined) return { ephemeris };
  const { correlatedSignalToNoise: snrCorrelated, sde, falseAlarmProbability, eventCount: events } = numbers;
  const { round, rank } = origin.kind === 'search' ? origin : {};
  return { ephemeris, search: { snr, snrCorrelated, sde, falseAlarmProbability, events, round, rank } };
}

/** Depths of flux in multiples of its scatter are no parts per million. */
function isInSigma({ recipe, files }: Target): boolean {
  const columns = files.flatMap(({ mapping }) => mapping.columns).filter(({ role }) => role === 'flux');
  const used = columns.filter(({ column }) => recipe.fluxColumn === undefined || column === recipe.fluxColumn);
  return used.some(({ unit }) => unit === 'sigma');
}
