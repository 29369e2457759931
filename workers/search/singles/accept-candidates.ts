import type { Checkpoint } from '../../checkpoint.ts';
import { type AcceptedEvent, judgeCandidate } from './judge-candidate.ts';
import type { PlacedTemplate } from './neighbourhood.ts';
import { boundWithin } from './stretches.ts';
import type { Candidate, DurationSearch } from './template-search.ts';
import type { UsablePoints } from './usable-points.ts';

/** Candidates are looked at strongest first, and at most so many: on a restless star the rest is more of the same. */
const MOST_REFINED = 300;
/** Where so many were turned down within half a duration, the next will be too. */
const MOST_TURNED_DOWN = 6;
/** Within so many durations of a lone point that was taken out, what the search found has to be searched again. */
const STALE_DURATIONS = 3;
/** Half-width, in durations, of what is taken out with an event. */
const TAKEN_OUT = 0.6;

/** What has been found so far. */
export interface Findings {
  readonly accepted: readonly AcceptedEvent[];
  /** Accepted events and lone points have no weight. */
  readonly points: UsablePoints;
  /** Where points were taken out in the last round, as `x`. */
  readonly changedAt: readonly number[];
}

/**
 * Goes through the candidates, strongest first, refines them and takes each event that still stands out and overlaps
 * none so far. Its points carry no weight from then on, so that neither its sides nor its shoulders make another.
 *
 * @param all the points as they were before anything was taken out
 * @returns undefined when cancelled
 */
export async function acceptCandidates(
  all: UsablePoints,
  earlier: Findings,
  searches: readonly DurationSearch[],
  threshold: number,
  checkpoint: Checkpoint,
): Promise<Findings | undefined> {
  let findings: Findings = { ...earlier, changedAt: [] };
  const turnedDown: number[] = [];
  const lonePoints: number[] = [];
  let refined = 0;
  for (const { template, centre } of rankCandidates(searches)) {
    const placed = { ...template, centre };
    if (refined === MOST_REFINED) break;
    if (isTaken(findings, placed) || countNear(turnedDown, placed, 0.5) >= MOST_TURNED_DOWN) continue;
    if (countNear(lonePoints, placed, STALE_DURATIONS) > 0) continue;
    refined += 1;
    const verdict = judgeCandidate(all, findings.points, searches, threshold, placed);
    if (verdict === undefined) turnedDown.push(centre);
    else if (typeof verdict === 'number') {
      lonePoints.push(all.x[verdict]!);
      findings = withoutLonePoint(findings, verdict);
    } else if (!isTaken(findings, verdict.placed)) findings = withEvent(findings, verdict);
    // Refinements are few beside the search itself: they leave its progress where it is.
    if (checkpoint.isDue() && !(await checkpoint.pause(0, 1))) return undefined;
  }
  return findings;
}

/**
 * By significance against white noise, though each has passed the threshold against all noise: where noise is red, an
 * edge of a dip alone has a higher S/N than the whole, of which it is not the better description.
 */
function rankCandidates(searches: readonly DurationSearch[]): Candidate[] {
  return searches.flatMap(({ candidates }) => candidates).sort((a, b) => b.significance - a.significance);
}

function countNear(times: readonly number[], { centre, durationDays }: PlacedTemplate, reachDurations: number): number {
  return times.filter((time) => Math.abs(time - centre) <= reachDurations * durationDays).length;
}

function isTaken({ accepted }: Findings, { centre, durationDays }: PlacedTemplate): boolean {
  return accepted.some(({ placed }) => Math.abs(placed.centre - centre) < (placed.durationDays + durationDays) / 2);
}

function withEvent({ accepted, points, changedAt }: Findings, event: AcceptedEvent): Findings {
  const { centre, durationDays } = event.placed;
  const from = boundWithin(points.x, centre - TAKEN_OUT * durationDays, 0, points.x.length);
  const end = boundWithin(points.x, centre + TAKEN_OUT * durationDays, from, points.x.length);
  return {
    accepted: [...accepted, event],
    points: withoutWeight(points, from, end),
    changedAt: [...changedAt, centre],
  };
}

function withoutLonePoint({ accepted, points, changedAt }: Findings, point: number): Findings {
  return {
    accepted,
    points: withoutWeight(points, point, point + 1),
    changedAt: [...changedAt, points.x[point]!],
  };
}

function withoutWeight(points: UsablePoints, from: number, end: number): UsablePoints {
  return { ...points, weight: points.weight.slice().fill(0, from, end) };
}
