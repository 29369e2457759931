import { cancelled, done, failed, type Outcome } from '../../src/contract/outcome.ts';
import type { DepthLoss, DepthLossJob } from '../../src/contract/prepare-contract.ts';
import { type Ephemeris, phaseOf } from '../../src/core/ephemeris.ts';
import type { FluxColumn, LightCurve } from '../../src/core/light-curve.ts';
import { measureBox } from '../../src/core/measure-box.ts';
import type { Checkpoint } from '../checkpoint.ts';
import { chooseColumn } from './choose-column.ts';
import { prepareSeries } from './prepare.ts';

const INJECTIONS = 8;
const FEWEST_INJECTIONS = 3;
/** An injected event keeps this many durations away from the real one. */
const LEAST_DISTANCE = 2;

/**
 * What a recipe leaves of a dip: dips of the same period, duration and depth are put into the flux as it was read, at
 * phases away from the real events, and the flux is prepared again with the real events protected as the recipe says.
 * Kept is the box depth of the injected dips with them less that without, over what was put in.
 */
export async function measureDepthLoss(job: DepthLossJob, checkpoint: Checkpoint): Promise<Outcome<DepthLoss>> {
  const column = chooseColumn(job.lightCurve, job.recipe.fluxColumn);
  if (column.kind !== 'done') return column;
  const plain = await prepareSeries({ ...job, protectedEvents: [job.ephemeris] }, checkpoint);
  if (plain.kind !== 'done') return plain;
  const kept: number[] = [];
  for (const injected of otherPhases(job.ephemeris)) {
    const lightCurve = inject(job.lightCurve, column.value, injected, job.depth);
    const prepared = await prepareSeries({ ...job, lightCurve, protectedEvents: [job.ephemeris] }, checkpoint);
    if (prepared.kind === 'cancelled') return cancelled;
    if (prepared.kind === 'failed') continue;
    const { time, flux, error } = prepared.value;
    const found = measureBox(time, flux, error, injected);
    const before = measureBox(plain.value.time, plain.value.flux, plain.value.error, injected);
    if (found !== undefined && before !== undefined) kept.push((found.depth - before.depth) / job.depth);
  }
  if (kept.length < FEWEST_INJECTIONS)
    return failed('Too few phases have data for an injection: the events fill the cycle, or it is hardly covered.');
  const mean = kept.reduce((sum, part) => sum + part, 0) / kept.length;
  const variance = kept.reduce((sum, part) => sum + (part - mean) ** 2, 0) / (kept.length - 1);
  return done({
    key: job.key,
    keptFraction: mean,
    keptFractionError: Math.sqrt(variance / kept.length),
    injections: kept.length,
  });
}

function otherPhases(ephemeris: Ephemeris): Ephemeris[] {
  const { periodDays, epochDays, durationDays } = ephemeris;
  const least = (LEAST_DISTANCE * durationDays) / periodDays;
  return Array.from({ length: INJECTIONS }, (_, i) => (i + 0.5) / INJECTIONS)
    .filter((phase) => Math.min(phase, 1 - phase) > least)
    .map((phase) => ({ ...ephemeris, epochDays: epochDays + phase * periodDays }));
}

/** Dips in a flux column of whatever unit: a dip of a magnitude goes up. */
function inject(lightCurve: LightCurve, column: FluxColumn, event: Ephemeris, depth: number): LightCurve {
  const half = event.durationDays / 2;
  const flux = column.flux.map((value, i) => {
    const away = Math.abs(phaseOf(lightCurve.time[i]!, event.periodDays, event.epochDays)) * event.periodDays;
    return away > half ? value : dimmed(value, column.unit, depth);
  });
  const fluxColumns = lightCurve.fluxColumns.map((other) => (other === column ? { ...column, flux } : other));
  return { ...lightCurve, fluxColumns };
}

function dimmed(value: number, unit: FluxColumn['unit'], depth: number): number {
  if (unit === 'magnitude') return value - 2.5 * Math.log10(1 - depth);
  if (unit === 'ppm') return (1 + value * 1e-6) * (1 - depth) * 1e6 - 1e6;
  return unit === 'sigma' ? value - depth : value * (1 - depth);
}
