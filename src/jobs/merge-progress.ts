import type { OnProgress, Progress } from '../contract/outcome.ts';

/**
 * One progress out of several parts': the sums of what is done and to do, never going back. A part that has not
 * reported yet counts as large as the mean of those that have.
 */
export function mergeProgress(partCount: number, onProgress: OnProgress): (part: number, progress: Progress) => void {
  const latest = new Map<number, Progress>();
  let furthest = 0;
  return (part, progress) => {
    latest.set(part, progress);
    const known = [...latest.values()];
    const total = Math.round((known.reduce((sum, { total }) => sum + total, 0) * partCount) / known.length);
    const done = known.reduce((sum, { done }) => sum + done, 0);
    const fraction = total === 0 ? 0 : done / total;
    if (fraction < furthest) return;
    furthest = fraction;
    onProgress({ done, total });
  };
}
