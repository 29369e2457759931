import { CaseShape } from '../plot/CaseShape.tsx';
import { useBench, useCandling } from '../store/use-candling.ts';

/** The target's cases in its head line; "new" shows the trial in their place. */
export function CaseChips() {
  const { actions } = useCandling();
  const { target, case: chosen } = useBench();
  return (
    <fieldset className="case-chips">
      <legend className="visually-hidden">Case shown</legend>
      {target?.cases.map((one) => (
        <button
          key={one.id}
          type="button"
          className="chip"
          aria-pressed={one === chosen}
          onClick={() => actions.selectCase(one.id)}
        >
          <CaseShape caseNumber={one.number} /> case {one.number}
        </button>
      ))}
      <button
        type="button"
        className="chip new"
        aria-pressed={chosen === undefined}
        onClick={() => actions.selectCase(undefined)}
      >
        new
      </button>
    </fieldset>
  );
}
