import { nextUnruledTarget } from '../../session/selectors.ts';
import { FRESH_CASE_VIEW, FRESH_TARGET_VIEW } from '../view-store.ts';
import type { ActionKit } from './action-stores.ts';

/** Going from target to target and from case to case. */
export function createSelectionActions({ document, view, bench, shown, say }: ActionKit) {
  function selectTarget(targetId: string | undefined): void {
    if (targetId === view.getState().targetId) return;
    const target = document.getState().document?.targets.find(({ id }) => id === targetId);
    view.setState({ targetId, ...FRESH_TARGET_VIEW, caseId: target?.cases[0]?.id });
  }

  function stepTarget(step: 1 | -1): void {
    const targets = shown();
    const at = targets.findIndex(({ id }) => id === view.getState().targetId);
    const next = targets[at + step];
    if (next !== undefined) selectTarget(next.id);
  }

  function goToNextUnruled(): void {
    const next = nextUnruledTarget(shown(), view.getState().targetId);
    if (next !== undefined) selectTarget(next.id);
    else if (view.getState().filter === '') say('Every target of the docket is ruled or parked.');
    else say('Every target that the docket shows is ruled or parked.');
  }

  function selectCase(caseId: string | undefined): void {
    view.setState({ ...FRESH_CASE_VIEW, caseId });
  }

  function stepCase(): void {
    const { target, case: chosen } = bench();
    const cases = target?.cases ?? [];
    const at = chosen === undefined ? -1 : cases.indexOf(chosen);
    if (cases.length > 0) selectCase(cases[(at + 1) % cases.length]!.id);
  }

  /** What the next unruled target is called, where there is one. */
  const nextUnruledLabel = () => nextUnruledTarget(shown(), view.getState().targetId)?.label;

  return { nextUnruledLabel, selectTarget, stepTarget, goToNextUnruled, selectCase, stepCase };
}
