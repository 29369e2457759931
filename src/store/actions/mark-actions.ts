import type { Interval } from '../../core/interval.ts';
import type { Mark } from '../../session/document.ts';
import type { ActionKit, DragPhase } from './action-stores.ts';

/** Intervals of time that the analyst labels. */
export function createMarkActions({ view, bench, run, drag, newId }: ActionKit) {
  function saveMark(interval: Interval, fields: Omit<Mark, 'id' | 'interval'>, markId?: string): void {
    const { target } = bench();
    if (target === undefined) return;
    const mark = { interval, ...fields };
    if (markId !== undefined) run({ kind: 'edit mark', targetId: target.id, markId, mark });
    else {
      const id = newId();
      if (run({ kind: 'add mark', targetId: target.id, markId: id, mark })) view.setState({ selectedMarkId: id });
    }
    view.setState({ markDraft: undefined, tool: 'pan' });
  }

  function moveMark(markId: string, interval: Interval, phase: DragPhase): void {
    const { target } = bench();
    if (target !== undefined) drag(phase, { kind: 'edit mark', targetId: target.id, markId, mark: { interval } });
  }

  function deleteMark(markId: string): void {
    const { target } = bench();
    if (target !== undefined) run({ kind: 'delete mark', targetId: target.id, markId });
    view.setState({ selectedMarkId: undefined, markDraft: undefined });
  }

  return { saveMark, moveMark, deleteMark };
}
