import type { RulingKind } from '../session/document.ts';
import type { Candling } from '../store/candling.ts';
import { changeKind, openDraft } from './ruling-draft.ts';

/** Opens the ruling form with this ruling chosen, or changes the choice where it is open. */
export function ruleWith({ actions, view }: Candling, kind: RulingKind): void {
  const { case: chosen } = actions.bench();
  if (chosen === undefined) return;
  const { rulingDraft } = view.getState();
  view.setState({ rulingDraft: rulingDraft === undefined ? openDraft(kind, chosen) : changeKind(rulingDraft, kind) });
}

/** Records the draft and goes on: to the target's next case without a ruling, else to the next unruled target. */
export function recordRuling({ actions, document, view }: Candling): void {
  const { target, case: chosen } = actions.bench();
  const { rulingDraft } = view.getState();
  if (target === undefined || chosen === undefined || rulingDraft === undefined) return;
  const { run } = document.getState();
  if (!run({ kind: 'rule', targetId: target.id, caseId: chosen.id, ruling: rulingDraft })) return;
  view.setState({ rulingDraft: undefined });
  const open = actions.bench().target?.cases.find(({ rulings, parked }) => rulings.length === 0 && !parked);
  if (open !== undefined) actions.selectCase(open.id);
  else actions.goToNextUnruled();
}

/** Where recording leads, for the words on the button. */
export function nextAfterRecording({ actions }: Candling): string | undefined {
  const { target, case: chosen } = actions.bench();
  const open = target?.cases.find((one) => one !== chosen && one.rulings.length === 0 && !one.parked);
  if (open !== undefined) return `case ${open.number}`;
  return actions.nextUnruledLabel();
}
