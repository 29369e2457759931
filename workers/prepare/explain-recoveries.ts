import { median } from '../../src/core/robust-statistics.ts';
import { fitRecovery } from './fit-recovery.ts';
import type { ExplainStep } from './systematics-input.ts';

const LEVEL_POINTS = 5;

/** The exponential recovery after each sudden drop, as far as the next split. */
export const explainRecoveries: ExplainStep = (_, { points, drops, splits, isSubtracted }, flux) => {
  if (drops.length === 0) return undefined;
  const { time, isProtected } = points;
  const explained = new Float64Array(flux.length).fill(1);
  const cadenceDays = median(time.subarray(1).map((value, i) => value - time[i]!));
  const warnings = drops.map((drop) => {
    const end = splits.find((split) => split > drop) ?? time.length;
    const before = median(flux.subarray(Math.max(0, drop - LEVEL_POINTS), drop));
    const after = median(flux.subarray(drop, Math.min(end, drop + LEVEL_POINTS)));
    const fall = before - after;
    const hasWeight = isProtected.slice(drop, end).map((own) => 1 - own);
    const own = time.subarray(drop, end);
    const recovery = fitRecovery(own, flux.subarray(drop, end), hasWeight, fall, cadenceDays);
    if (recovery !== undefined) {
      const depth = isSubtracted ? recovery.height : recovery.height / recovery.level;
      for (let i = drop; i < end; i += 1)
        explained[i] = 1 - depth * Math.exp((time[drop]! - time[i]!) / recovery.decayDays);
    }
    return describeDrop(time[drop]!, isSubtracted ? fall : fall / before, recovery?.decayDays, isSubtracted);
  });
  return { explained, warnings };
};

function describeDrop(at: number, fall: number, decayDays: number | undefined, isInSigma: boolean): string {
  const depth = isInSigma ? `${fall.toFixed(1)} sigma` : `${Number((fall * 1e6).toPrecision(3))} ppm`;
  const recovery =
    decayDays === undefined ? '' : `, and its recovery over ${Number(decayDays.toPrecision(2))} d was taken out`;
  return `The flux drops suddenly by ${depth} at ${Number(at.toFixed(4))} d: the series was split there${recovery}.`;
}
