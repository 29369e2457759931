import { Fragment, useState } from 'react';
import type { BoxPeak, BoxSignal } from '../contract/search-contract.ts';
import { rankedSignalToNoise } from '../core/box-search-settings.ts';
import { falseAlarmProbability } from '../core/extreme-value.ts';
import { formatNumber } from '../core/number-format.ts';
import { isSameSignal } from '../core/same-signal.ts';
import { CaseShape } from '../plot/CaseShape.tsx';
import { useBench, useCandling, useView } from '../store/use-candling.ts';
import { chanceWords } from './chance-words.ts';

/** The separate signals of the search, and under each the other periods that it makes; one press folds there. */
export function PeakTable() {
  const { search, target, prepared } = useBench();
  const [opened, setOpened] = useState<number>();
  if (search === undefined || target === undefined) return null;
  const inSigma = prepared?.fluxUnit === 'sigma';
  const { round } = search.settings;
  return (
    <section className="sheet-section" aria-label="Peaks of the search">
      <h3>
        Peaks <small>box search{round > 1 && `, round ${round}`}, strongest first</small>
      </h3>
      {search.peaks.length === 0 ? (
        <p className="quiet">The search found no dip.</p>
      ) : (
        <table className="peaks">
          <thead>
            <tr>
              <th scope="col">
                <span className="visually-hidden">rank</span>
              </th>
              <th scope="col">period /&nbsp;d</th>
              <th scope="col">depth /&nbsp;{inSigma ? 'σ' : 'ppm'}</th>
              <th scope="col">hours</th>
              <th scope="col">SDE</th>
              <th scope="col">S/N</th>
              <th scope="col" title="with correlated noise, Pont, Zucker & Queloz (2006)">
                S/N<sub>corr</sub>
              </th>
              <th scope="col">events</th>
            </tr>
          </thead>
          <tbody>
            {search.peaks.map((peak, index) => (
              <SignalRows
                key={peak.periodDays}
                signal={peak}
                rank={index + 1}
                isOpen={opened === index}
                onOpen={() => setOpened(opened === index ? undefined : index)}
                factor={inSigma ? 1 : 1e6}
              />
            ))}
          </tbody>
        </table>
      )}
      {search.peaks.length > 0 && <ChanceLine />}
    </section>
  );
}

function SignalRows(props: {
  readonly signal: BoxSignal;
  readonly rank: number;
  readonly isOpen: boolean;
  readonly onOpen: () => void;
  readonly factor: number;
}) {
  const { signal, rank, isOpen, onOpen, factor } = props;
  const { actions } = useCandling();
  const { target, prepared } = useBench();
  const source = useView((state) => state.trialSource);
  const related = source?.kind === 'peak' && source.rank === rank ? source.related : Number.NaN;
  const claimed = target?.cases.find(
    ({ timing }) => timing.kind === 'linear' && isSameSignal(timing, signal, prepared?.spanDays ?? 0),
  );
  const others = signal.relatives.length;
  return (
    <Fragment>
      <PeakRow
        peak={signal}
        factor={factor}
        isAt={related === undefined}
        onPick={() => actions.pickPeak(signal, rank)}
        head={
          <>
            {rank}
            {claimed && (
              <span className="claimed" title={`case ${claimed.number}`}>
                <CaseShape caseNumber={claimed.number} sizePx={10} />
                <span className="visually-hidden">case {claimed.number}</span>
              </span>
            )}
            {others > 0 && (
              <button
                type="button"
                className="link more"
                aria-expanded={isOpen}
                aria-label={`${others} other ${others === 1 ? 'period' : 'periods'} of signal ${rank}`}
                title={`${isOpen ? 'close' : 'show'} ${others} other ${others === 1 ? 'period' : 'periods'} of this signal`}
                onClick={onOpen}
              >
                {isOpen ? '−' : '+'}
                {others}
              </button>
            )}
          </>
        }
      />
      {isOpen &&
        signal.relatives.map((relative, index) => (
          <Fragment key={relative.periodDays}>
            <PeakRow
              peak={relative}
              factor={factor}
              isAt={related === index}
              onPick={() => actions.pickPeak(relative, rank, index)}
              head={<span className="symbol relation">{relative.relation}</span>}
            />
            <tr className="reason-row">
              <td />
              <td colSpan={7} className="small quiet">
                {relative.reason}
              </td>
            </tr>
          </Fragment>
        ))}
    </Fragment>
  );
}

function PeakRow(props: {
  readonly peak: BoxPeak;
  readonly head: React.ReactNode;
  readonly factor: number;
  readonly isAt: boolean;
  readonly onPick: () => void;
}) {
  const { peak, head, factor, isAt, onPick } = props;
  return (
    <tr className={isAt ? 'at' : undefined}>
      <td>{head}</td>
      <td>
        <button type="button" className="link number" onClick={onPick}>
          {formatNumber(peak.periodDays, 5)}
          <span className="visually-hidden"> days: fold at this peak</span>
        </button>
      </td>
      <td>{formatNumber(peak.boxDepth * factor)}</td>
      <td>{formatNumber(peak.durationDays * 24, 1)}</td>
      <td>{formatNumber(peak.sde, 1)}</td>
      <td>{formatNumber(peak.signalToNoise, 1)}</td>
      <td>{formatNumber(peak.correlatedSignalToNoise, 1)}</td>
      <td>{peak.eventCount}</td>
    </tr>
  );
}

/** How often noise of this very series would make so strong a peak; asked for, as it searches many surrogates. */
function ChanceLine() {
  const { actions } = useCandling();
  const { search, falseAlarm, runningFalseAlarm } = useBench();
  const [best] = search?.peaks ?? [];
  if (best === undefined) return null;
  if (runningFalseAlarm !== undefined) {
    const { done, total } = runningFalseAlarm.progress;
    return (
      <p className="small" role="status">
        False alarms: {formatNumber(done)} of {formatNumber(total)} surrogates searched.{' '}
        <button type="button" className="link" onClick={runningFalseAlarm.cancel}>
          cancel
        </button>
      </p>
    );
  }
  if (falseAlarm === undefined)
    return (
      <p className="small">
        <button type="button" className="button compact" onClick={() => actions.estimateFalseAlarms()}>
          <kbd>Q</kbd> false-alarm probability
        </button>{' '}
        <span className="quiet">by searching this series with its blocks of time permuted and inverted</span>
      </p>
    );
  const chance = falseAlarmProbability(falseAlarm, rankedSignalToNoise(best, search!.settings.objective));
  return (
    <p className="small">
      False-alarm probability of the strongest: <b>{chanceWords(chance)}</b>.{' '}
      <span className="quiet">
        Highest peaks of {falseAlarm.maxima.length} surrogates (blocks of {formatNumber(falseAlarm.blockDays, 1)} d
        permuted and inverted; Süveges 2014). It speaks of chance in this series, not of a planet.
      </span>
    </p>
  );
}
