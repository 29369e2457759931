import { describe, expect, it } from 'vitest';
import {
  changeKind,
  draftAfterKey,
  openDraft,
  stepConfidence,
  toggleReasonByKey,
} from '../../src/cases/ruling-draft.ts';
import { RULING_KINDS } from '../../src/session/document.ts';
import { reasonsFor } from '../../src/session/reasons.ts';

const fresh = openDraft('stellar mimic', { rulings: [] });

describe('ruling draft', () => {
  it('begins without reasons', () => expect(fresh).toMatchObject({ reasons: [], confidence: 'moderate', note: '' }));

  it('takes and gives back a reason by its letter', () => {
    const once = toggleReasonByKey(fresh, 'W');
    expect(once.reasons).toEqual([reasonsFor('stellar mimic')[1]!.text]);
    expect(toggleReasonByKey(once, 'w')).toEqual(fresh);
    expect(toggleReasonByKey(fresh, 'z')).toBe(fresh);
  });

  it('drops the reasons of another ruling but keeps the note', () => {
    const draft = { ...toggleReasonByKey(fresh, 'q'), note: 'n' };
    expect(changeKind(draft, 'cannot decide')).toMatchObject({ kind: 'cannot decide', reasons: [], note: 'n' });
    expect(changeKind(draft, 'stellar mimic')).toBe(draft);
  });

  it('steps confidence between its ends', () => {
    expect(stepConfidence(stepConfidence(fresh, 1), 1).confidence).toBe('high');
    expect(stepConfidence(stepConfidence(fresh, -1), -1).confidence).toBe('low');
  });

  it('has letters for every reason that collide with no other key of the form', () => {
    for (const kind of RULING_KINDS) {
      const keys = reasonsFor(kind).map(({ key }) => key);
      expect(new Set(keys).size).toBe(keys.length);
      expect(keys.filter((key) => ['j', 'l', 'k', 'u'].includes(key))).toEqual([]);
    }
  });

  it('understands the keys of the form and no others', () => {
    expect(draftAfterKey(fresh, '1')?.kind).toBe('worth telescope time');
    expect(draftAfterKey(fresh, 'L')?.confidence).toBe('high');
    expect(draftAfterKey(fresh, 'j')?.confidence).toBe('low');
    expect(draftAfterKey(fresh, 'E')?.reasons).toEqual([reasonsFor('stellar mimic')[2]!.text]);
    for (const key of ['0', '5', 'k', 'u', 'Tab', 'Enter', ' ', 'ArrowDown'])
      expect(draftAfterKey(fresh, key), key).toBeUndefined();
  });
});
