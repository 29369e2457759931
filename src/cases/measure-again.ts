import { numbersAt } from '../store/actions/case-numbers.ts';
import type { Candling } from '../store/candling.ts';

/** Measures the selected case on the series as it is prepared now; its timing and the errors of it stay. */
export function measureAgain({ actions, document, view }: Candling): void {
  const selection = actions.bench();
  const { target, case: chosen, ephemeris, prepared } = selection;
  if (target === undefined || chosen === undefined || ephemeris === undefined || prepared === undefined) return;
  const numbers = numbersAt(selection, ephemeris);
  if (numbers === undefined) {
    const sentence = `Case ${chosen.number} was not measured again: the prepared flux has no points in and beside its events. Its old numbers stay.`;
    view.setState({ notice: { kind: 'notice', sentence } });
    return;
  }
  const { timing } = chosen;
  document.getState().run({ kind: 'time case', targetId: target.id, caseId: chosen.id, timing, numbers });
}
