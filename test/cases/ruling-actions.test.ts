import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest';
import { measureAgain } from '../../src/cases/measure-again.ts';
import { nextAfterRecording, recordRuling, ruleWith } from '../../src/cases/ruling-actions.ts';
import type { Candling } from '../../src/store/candling.ts';
import { preparedKey } from '../../src/store/target-keys.ts';
import { openCandling, openStars, timing } from './open-case.ts';

let candling: Candling;
const document = () => candling.document.getState().document!;
const target = (index = 0) => document().targets[index]!;

beforeEach(async () => {
  candling = openCandling();
  await openStars(candling, ['a.csv', 'b.csv']);
});
afterEach(() => candling.dispose());

describe('ruling', () => {
  it('needs a case', () => {
    ruleWith(candling, 'cannot decide');
    expect(candling.view.getState().rulingDraft).toBeUndefined();
  });

  it('records nothing until told to, then freezes what it rested on', () => {
    candling.actions.makeCaseByHand(timing);
    ruleWith(candling, 'cannot decide');
    expect(target().cases[0]!.rulings).toEqual([]);
    recordRuling(candling);
    const { numbers } = target().cases[0]!;
    expect(numbers?.boxDepth).toBeDefined();
    expect(target().cases[0]!.rulings).toMatchObject([
      { kind: 'cannot decide', confidence: 'moderate', timing, numbers, recipe: target().recipe },
    ]);
    expect(candling.view.getState().rulingDraft).toBeUndefined();
  });

  it('goes on where the button said: the next open case, then the next unruled target', () => {
    candling.actions.makeCaseByHand(timing);
    candling.actions.makeCaseByHand({ ...timing, epochDays: 0.9 });
    ruleWith(candling, 'stellar mimic');
    expect(nextAfterRecording(candling)).toBe('case 1');
    recordRuling(candling);
    expect(candling.actions.bench().case?.number).toBe(1);
    ruleWith(candling, 'stellar mimic');
    expect(nextAfterRecording(candling)).toBe(target(1).label);
    recordRuling(candling);
    expect(candling.actions.bench().target).toBe(target(1));
  });

  it('keeps the draft where the document cannot be written', () => {
    candling.actions.makeCaseByHand(timing);
    ruleWith(candling, 'stellar mimic');
    candling.document.setState({ readOnly: true });
    recordRuling(candling);
    expect(candling.view.getState().rulingDraft?.kind).toBe('stellar mimic');
    expect(target().cases[0]!.rulings).toEqual([]);
  });
});

describe('measuring again', () => {
  const changeRecipe = () =>
    candling.document.getState().run({
      kind: 'set recipe',
      targetId: target().id,
      recipe: { ...target().recipe, detrend: { kind: 'none' } },
    });

  it('takes numbers of the present recipe and keeps the timing with its errors', async () => {
    candling.actions.makeCaseByHand(timing);
    changeRecipe();
    expect(target().cases[0]!.numbers!.key).not.toBe(preparedKey(target()));
    await vi.waitFor(() => expect(candling.actions.bench().prepared).toBeDefined());
    measureAgain(candling);
    const [measured] = target().cases;
    expect(measured!.timing).toEqual(timing);
    expect(measured!.numbers!.key).toBe(preparedKey(target()));
    // The series was made with a box of 1 %.
    expect(measured!.numbers!.boxDepth).toBeCloseTo(0.01, 6);
  });

  it('keeps the old numbers and says why where no event has data', async () => {
    candling.actions.makeCaseByHand(timing);
    candling.document.getState().run({
      kind: 'time case',
      targetId: target().id,
      caseId: target().cases[0]!.id,
      timing: { ...timing, periodDays: 1000, epochDays: -300 },
      numbers: target().cases[0]!.numbers,
    });
    const before = target();
    measureAgain(candling);
    expect(target()).toBe(before);
    expect(candling.view.getState().notice?.sentence).toMatch(/was not measured again/);
  });
});
