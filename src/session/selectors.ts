import type { Case, Ruling, RulingKind, SessionDocument, Target } from './document.ts';

/** Where a case or a target stands: its ruling, waiting for something, or not looked at. */
export type Standing = RulingKind | 'parked' | undefined;

export function standingRuling(of: Pick<Case, 'rulings'>): Ruling | undefined {
  return of.rulings.at(-1);
}

/** A parked case waits, whatever was ruled before. */
export function caseStanding(of: Pick<Case, 'rulings' | 'parked'>): Standing {
  return of.parked === undefined ? standingRuling(of)?.kind : 'parked';
}

/** A target is done when every case of it is; its first case speaks for it in the docket. */
export function targetStanding(target: Pick<Target, 'cases'>): Standing {
  const standings = target.cases.map(caseStanding);
  return standings.includes(undefined) ? undefined : standings[0];
}

/** The next target of a list, after the given one and round the end, that has neither ruling nor parking. */
export function nextUnruledTarget(targets: readonly Target[], afterId: string | undefined): Target | undefined {
  const start = targets.findIndex(({ id }) => id === afterId) + 1;
  const order = [...targets.slice(start), ...targets.slice(0, start)];
  return order.find((target) => target.id !== afterId && targetStanding(target) === undefined);
}

export interface SittingCounts {
  readonly total: number;
  readonly parked: number;
  readonly left: number;
  readonly byRuling: Readonly<Record<RulingKind, number>>;
}

/** How far the sitting has come, counted in targets. */
export function countSitting(targets: readonly Target[]): SittingCounts {
  const byRuling = { 'worth telescope time': 0, 'stellar mimic': 0, 'not astrophysical': 0, 'cannot decide': 0 };
  let parked = 0;
  let left = 0;
  for (const target of targets) {
    const standing = targetStanding(target);
    if (standing === undefined) left += 1;
    else if (standing === 'parked') parked += 1;
    else byRuling[standing] += 1;
  }
  return { total: targets.length, parked, left, byRuling };
}

export function findTarget(document: SessionDocument, targetId: string): Target | undefined {
  return document.targets.find(({ id }) => id === targetId);
}

export function findCase(document: SessionDocument, targetId: string, caseId: string): Case | undefined {
  return findTarget(document, targetId)?.cases.find(({ id }) => id === caseId);
}
