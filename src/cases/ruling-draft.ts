import { type Case, CONFIDENCES, RULING_KINDS, type RulingKind } from '../session/document.ts';
import { reasonsFor } from '../session/reasons.ts';
import { standingRuling } from '../session/selectors.ts';
import type { RulingDraft } from '../store/view-store.ts';

/** A draft that begins where the standing ruling of this kind left off, or empty. */
export function openDraft(kind: RulingKind, of: Pick<Case, 'rulings'>): RulingDraft {
  const standing = standingRuling(of);
  if (standing?.kind !== kind) return { kind, reasons: [], confidence: 'moderate', note: standing?.note ?? '' };
  const { reasons, confidence, note } = standing;
  return { kind, reasons, confidence, note };
}

/** Another ruling: its own list of reasons, the note and confidence kept. */
export function changeKind(draft: RulingDraft, kind: RulingKind): RulingDraft {
  return draft.kind === kind ? draft : { ...draft, kind, reasons: [] };
}

export function toggleReason(draft: RulingDraft, text: string): RulingDraft {
  const reasons = draft.reasons.includes(text)
    ? draft.reasons.filter((reason) => reason !== text)
    : [...draft.reasons, text];
  return { ...draft, reasons };
}

/** The reason that stands beside a letter, toggled; the same draft where none does. */
export function toggleReasonByKey(draft: RulingDraft, key: string): RulingDraft {
  const reason = reasonsFor(draft.kind).find((candidate) => candidate.key === key.toLowerCase());
  return reason === undefined ? draft : toggleReason(draft, reason.text);
}

export function stepConfidence(draft: RulingDraft, step: 1 | -1): RulingDraft {
  const at = CONFIDENCES.indexOf(draft.confidence) + step;
  return { ...draft, confidence: CONFIDENCES[Math.max(0, Math.min(CONFIDENCES.length - 1, at))]! };
}

/** The draft after a key of the form: 1 to 4 rule, J and L step confidence, letters are reasons. Undefined: no such key. */
export function draftAfterKey(draft: RulingDraft, key: string): RulingDraft | undefined {
  const kind = RULING_KINDS[Number(key) - 1];
  if (kind !== undefined) return changeKind(draft, kind);
  if (key.toLowerCase() === 'j') return stepConfidence(draft, -1);
  if (key.toLowerCase() === 'l') return stepConfidence(draft, 1);
  const next = toggleReasonByKey(draft, key);
  return next === draft ? undefined : next;
}

/** What each step of confidence means, so that two analysts mean the same. */
export const CONFIDENCE_MEANING = {
  low: 'could go either way',
  moderate: 'would be surprised otherwise',
  high: 'would spend my own night on it',
} as const;
