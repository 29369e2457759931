import type { BoxSearchSettings } from '../../core/box-search-settings.ts';
import { MOST_ROUNDS } from '../../core/box-search-settings.ts';
import { modeSetOf } from '../common-modes-results.ts';
import type { ActionKit } from './action-stores.ts';

/** Rounds of the iterated search, and what is asked about its signals. */
export function createSearchActions({ document, view, bench, run, say, signals }: ActionKit) {
  function setSearch(change: Partial<BoxSearchSettings>): void {
    const { target } = bench();
    if (target !== undefined) run({ kind: 'set search', targetId: target.id, search: { ...target.search, ...change } });
  }

  /** Masks the strongest signal of this round and searches again; held back where it looks like two stars. */
  function nextRound(anyway = false): void {
    const { target, search } = bench();
    const [strongest] = search?.peaks ?? [];
    if (target === undefined || search === undefined || strongest === undefined) return;
    const masked = target.search.masked ?? [];
    if (masked.length + 1 >= MOST_ROUNDS) {
      say(`The search ends after ${MOST_ROUNDS} rounds.`);
      return;
    }
    if (search.holdBack !== undefined && !anyway) {
      say(search.holdBack);
      return;
    }
    const { periodDays, epochDays, durationDays, boxDepth, signalToNoise, sde } = strongest;
    setSearch({ masked: [...masked, { periodDays, epochDays, durationDays, boxDepth, signalToNoise, sde }] });
    view.setState({ trial: undefined, trialSource: undefined });
  }

  /** Gives up the last masked signal, or all from a round on. */
  function backToRound(round: number): void {
    const masked = bench().target?.search.masked ?? [];
    if (round >= 1 && round <= masked.length) setSearch({ masked: masked.slice(0, round - 1) });
  }

  const withTarget =
    (ask: (target: NonNullable<ReturnType<typeof bench>['target']>) => void): (() => void) =>
    () => {
      const { target } = bench();
      if (target !== undefined) ask(target);
    };

  return {
    setSearch,
    nextRound,
    backToRound,
    previousRound: () => backToRound(bench().target?.search.masked?.length ?? 0),
    estimateFalseAlarms: withTarget((target) => void signals.falseAlarms(target)),
    findSingles: withTarget((target) => void signals.singles(target)),
    findSines: withTarget((target) => void signals.sines(target)),
    showPeriodogram(periodogram: 'box' | 'sines') {
      view.setState({ periodogram });
      const { target } = bench();
      if (periodogram === 'sines' && target !== undefined) void signals.sines(target);
    },
    /** Freezes which stars the common modes are found from: the whole docket as it is now, its cases masked. */
    findModeSet(): void {
      const current = document.getState().document;
      if (current !== undefined) run({ kind: 'use mode set', modeSet: modeSetOf(current) });
    },
    measureDepthLoss(): void {
      const { target, ephemeris, case: chosen } = bench();
      const depth = chosen?.numbers?.boxDepth;
      if (target !== undefined && ephemeris !== undefined && depth !== undefined && depth > 0)
        void signals.depthLoss(target, ephemeris, depth);
    },
  };
}
