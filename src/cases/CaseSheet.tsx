import { CaseShape } from '../plot/CaseShape.tsx';
import { RulingSign } from '../plot/RulingSign.tsx';
import type { Case } from '../session/document.ts';
import { caseStanding, standingRuling } from '../session/selectors.ts';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import { Journal } from './Journal.tsx';
import { MarkList } from './MarkList.tsx';
import { NumbersSection } from './Numbers.tsx';
import { PeakTable } from './PeakTable.tsx';
import { RulingBar } from './RulingBar.tsx';
import { RulingForm } from './RulingForm.tsx';
import { ruleWith } from './ruling-actions.ts';
import { SingleEvents } from './SingleEvents.tsx';
import { TimingSection } from './Timing.tsx';
import './cases.css';

/** One signal: its timing, what was measured, and the ruling; or the trial that may become a case. */
export function CaseSheet() {
  const { case: chosen, target } = useBench();
  const ruling = useView((state) => state.rulingDraft !== undefined);
  return (
    <section className="case-sheet" aria-label="Case sheet" data-region="sheet" tabIndex={-1}>
      <header className="head-line">{chosen ? <CaseLine one={chosen} /> : <h2>{target ? 'Trial' : 'Case'}</h2>}</header>
      <div className="sheet-scroll">
        {chosen ? <Origin one={chosen} /> : <TrialWords />}
        <TimingSection key={chosen?.id ?? target?.id} />
        {!ruling && <NumbersSection />}
        {!ruling && <TrialActions />}
        {!ruling && <PeakTable />}
        {!ruling && <SingleEvents />}
        {!ruling && <MarkList />}
        {!ruling && <Journal />}
      </div>
      {ruling ? <RulingForm /> : chosen && <StandingRuling one={chosen} />}
    </section>
  );
}

function CaseLine({ one }: { readonly one: Case }) {
  const { target } = useBench();
  const standing = caseStanding(one);
  return (
    <>
      <CaseShape caseNumber={one.number} />
      <h2>
        {target?.label} case {one.number}
      </h2>
      <span className="spread" />
      {standing && (
        <span className="standing">
          <RulingSign kind={standing} /> {standing}
        </span>
      )}
    </>
  );
}

function Origin({ one }: { readonly one: Case }) {
  const { document } = useCandling();
  const { target } = useBench();
  const words = originWords(one.origin);
  return (
    <p className="origin small">
      {words}{' '}
      {one.rulings.length === 0 && (
        <button
          type="button"
          className="link"
          onClick={() => document.getState().run({ kind: 'delete case', targetId: target!.id, caseId: one.id })}
        >
          delete case {one.number}
        </button>
      )}
    </p>
  );
}

function originWords(origin: Case['origin']): string {
  switch (origin.kind) {
    case 'search':
      return `From box search${origin.round === undefined ? '' : `, round ${origin.round}`}, peak ${origin.rank}${
        origin.relation === undefined ? '' : `, its ${origin.relation}`
      }.`;
    case 'marks':
      return `From ${origin.markIds.length} marked ${origin.markIds.length === 1 ? 'dip' : 'dips'}.`;
    case 'single event':
      return `From the search for single events, number ${origin.rank}.`;
    default:
      return 'Made by hand.';
  }
}

function TrialWords() {
  const { target, ephemeris, search, failure, searchCancelled } = useBench();
  if (target === undefined) return <p className="origin">Select a target in the docket.</p>;
  if (ephemeris !== undefined) return <p className="origin small">Not a case yet. A makes it one.</p>;
  return (
    <p className="origin">
      {search !== undefined
        ? 'Press P for the strongest peak, or pick a period in the periodogram.'
        : failure !== undefined
          ? 'No search of this series. Mark its dips, or set a timing by hand.'
          : searchCancelled
            ? 'The search was cancelled.'
            : 'The search has not finished.'}
    </p>
  );
}

/** The ways to a case: from the trial, from marked dips, by hand. */
function TrialActions() {
  const { actions, view } = useCandling();
  const { target, case: chosen, ephemeris } = useBench();
  if (target === undefined || chosen !== undefined) return null;
  const dips = target.marks.filter(({ kind }) => kind === 'dip').length;
  return (
    <section className="sheet-section trial-actions" aria-label="Make a case">
      <button
        type="button"
        className={ephemeris === undefined ? 'button' : 'button primary'}
        disabled={ephemeris === undefined}
        onClick={() => void actions.makeCaseFromTrial()}
      >
        <kbd>A</kbd> Make a case
      </button>
      <button type="button" className="button" disabled={dips === 0} onClick={() => void actions.makeCaseFromMarks()}>
        of {dips} marked {dips === 1 ? 'dip' : 'dips'}
      </button>
      <button type="button" className="button" onClick={() => view.setState({ dialog: 'timing by hand' })}>
        by hand
      </button>
    </section>
  );
}

function StandingRuling({ one }: { readonly one: Case }) {
  const candling = useCandling();
  const { target } = useBench();
  const ruling = standingRuling(one);
  return (
    <section className="standing-ruling" aria-label="Ruling">
      <h3>
        Ruling{' '}
        {ruling && (
          <small>
            {ruling.confidence} confidence, {ruling.at.slice(0, 16).replace('T', ' ')} UTC
          </small>
        )}
        <span className="spread" />
        <button type="button" className="link" onClick={() => candling.view.setState({ dialog: 'park' })}>
          <kbd>K</kbd> park until…
        </button>
      </h3>
      {one.parked && (
        <p className="notice">
          <span>
            Parked{one.parked.until && ` until ${one.parked.until}`}: {one.parked.reason}
          </span>
          <span className="spread" />
          <button
            type="button"
            className="button compact"
            onClick={() => candling.document.getState().run({ kind: 'unpark', targetId: target!.id, caseId: one.id })}
          >
            take up again
          </button>
        </p>
      )}
      <RulingBar chosen={ruling?.kind} onChoose={(kind) => ruleWith(candling, kind)} />
      {ruling && (
        <p className="why small">
          <b>Reasons:</b> {ruling.reasons.join('; ') || 'none given'}
          {ruling.note && `. ${ruling.note}`}
          {one.rulings.length > 1 && ` Supersedes ${one.rulings.at(-2)!.kind}.`}
        </p>
      )}
      <p className="why small quiet">
        A ruling is the analyst’s judgement of these data, not a confirmation of a planet.
      </p>
    </section>
  );
}
