import { measureBox } from '../core/measure-box.ts';
import type { Candling } from '../store/candling.ts';
import { preparedKey } from '../store/target-keys.ts';

/** Measures the selected case on the series as it is prepared now; its timing and the errors of it stay. */
export function measureAgain({ actions, document, view }: Candling): void {
  const { target, case: chosen, ephemeris, prepared } = actions.bench();
  if (target === undefined || chosen === undefined || ephemeris === undefined || prepared === undefined) return;
  const box = measureBox(prepared.time, prepared.flux, prepared.error, ephemeris);
  if (box === undefined) {
    const sentence = `Case ${chosen.number} was not measured again: the prepared flux has no points in and beside its events. Its old numbers stay.`;
    view.setState({ notice: { kind: 'notice', sentence } });
    return;
  }
  const { depth, depthError, signalToNoise, eventCount } = box;
  const numbers = {
    key: preparedKey(target),
    boxDepth: depth,
    boxDepthError: depthError,
    signalToNoise,
    // A measure of the whole periodogram, which a box at one period does not have.
    sde: undefined,
    eventCount,
  };
  const { timing } = chosen;
  document.getState().run({ kind: 'time case', targetId: target.id, caseId: chosen.id, timing, numbers });
}
