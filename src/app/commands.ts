import { isNarrow } from '../bench/narrow.ts';
import { RULING_KINDS } from '../session/document.ts';
import type { Candling } from '../store/candling.ts';
import type { RoomActions } from './room-actions.ts';
import { cycleTheme, focusFind, goToRegion } from './screen-actions.ts';

/** One thing the analyst can do, reachable from the palette and by its key. */
export interface AppCommand {
  readonly title: string;
  readonly room: 'files' | 'docket' | 'strip' | 'fold' | 'search' | 'case' | 'ruling' | 'session' | 'screen';
  /** In the syntax of tinykeys. */
  readonly keys: readonly string[];
  /** Where it is one of the few on the key line at the foot: its word there. */
  readonly foot?: { readonly keys: readonly string[]; readonly words: string };
  /** Absent: always. */
  readonly when?: (candling: Candling) => boolean;
  readonly run: (candling: Candling, rooms: RoomActions) => void;
}

const isEmpty = (candling: Candling) => (candling.document.getState().document?.targets.length ?? 0) === 0;
const hasTargets = (candling: Candling) => !isEmpty(candling);
const hasEphemeris = (candling: Candling) => candling.actions.bench().ephemeris !== undefined;
const hasCase = (candling: Candling) => candling.actions.bench().case !== undefined;
const hasTrial = (candling: Candling) => candling.view.getState().trial !== undefined && !hasCase(candling);
const hasSession = (candling: Candling) => candling.document.getState().document !== undefined;
const hasMark = (candling: Candling) => candling.view.getState().selectedMarkId !== undefined;
const isRunning = (candling: Candling) => candling.actions.bench().running !== undefined;

export const COMMANDS: readonly AppCommand[] = [
  {
    title: 'Open files',
    room: 'files',
    keys: ['o'],
    foot: { keys: ['o'], words: 'open' },
    run: (_, rooms) => rooms.openFiles(),
  },
  { title: 'Open a folder', room: 'files', keys: ['Shift+O'], run: (_, rooms) => rooms.openFolder() },
  {
    title: 'Reopen the last session',
    room: 'files',
    keys: ['r'],
    when: isEmpty,
    run: (candling) => void candling.reopenLast(),
  },
  {
    title: 'Import a session',
    room: 'session',
    keys: ['i'],
    run: (_, rooms) => rooms.importSession(),
  },
  {
    title: 'Try the demo docket',
    room: 'files',
    keys: ['d'],
    foot: { keys: ['d'], words: 'demo docket' },
    when: isEmpty,
    run: (_, rooms) => rooms.loadDemo(),
  },
  {
    title: 'Next unruled target',
    room: 'docket',
    keys: ['n'],
    foot: { keys: ['n'], words: 'next unruled' },
    when: hasTargets,
    run: ({ actions }) => actions.goToNextUnruled(),
  },
  {
    title: 'Next target',
    room: 'docket',
    keys: ['ArrowDown'],
    when: hasTargets,
    run: ({ actions }, rooms) => actions.stepTarget(1, rooms.shownTargets()),
  },
  {
    title: 'Previous target',
    room: 'docket',
    keys: ['ArrowUp'],
    when: hasTargets,
    run: ({ actions }, rooms) => actions.stepTarget(-1, rooms.shownTargets()),
  },
  { title: 'Find a target', room: 'docket', keys: ['/'], when: hasTargets, run: focusFind },
  {
    title: 'Search the whole docket',
    room: 'search',
    keys: ['Shift+S'],
    when: hasTargets,
    run: ({ sweep }) => void sweep.start(),
  },
  {
    title: 'Raw, trend or prepared flux',
    room: 'strip',
    keys: ['t'],
    foot: { keys: ['t'], words: 'flux shown' },
    when: hasTargets,
    run: ({ view }) => {
      const next = { raw: 'trend', trend: 'prepared', prepared: 'raw' } as const;
      view.setState({ fluxView: next[view.getState().fluxView] });
    },
  },
  {
    title: 'Show the whole series',
    room: 'strip',
    keys: ['f'],
    when: hasTargets,
    run: ({ view }) => view.setState({ stripSpan: undefined }),
  },
  {
    title: 'Next event',
    room: 'strip',
    keys: ['Shift+ArrowRight'],
    foot: { keys: ['Shift+ArrowRight'], words: 'event' },
    when: hasEphemeris,
    run: ({ actions }) => actions.stepEvent(1),
  },
  {
    title: 'Previous event',
    room: 'strip',
    keys: ['Shift+ArrowLeft'],
    when: hasEphemeris,
    run: ({ actions }) => actions.stepEvent(-1),
  },
  {
    title: 'Mark tool on or off',
    room: 'strip',
    keys: ['m'],
    foot: { keys: ['m'], words: 'mark' },
    when: hasTargets,
    run: ({ view }) => view.setState({ tool: view.getState().tool === 'mark' ? 'pan' : 'mark' }),
  },
  {
    title: 'Delete the selected mark',
    room: 'strip',
    keys: ['Delete', 'Backspace'],
    when: hasMark,
    run: ({ actions, view }) => actions.deleteMark(view.getState().selectedMarkId!),
  },
  {
    title: 'Edit the selected mark',
    room: 'strip',
    keys: ['Shift+M'],
    when: hasMark,
    run: ({ view, actions }) => {
      const mark = actions.bench().target?.marks.find(({ id }) => id === view.getState().selectedMarkId);
      if (mark !== undefined) view.setState({ markDraft: { ...mark, markId: mark.id } });
    },
  },
  {
    title: 'Recipe',
    room: 'strip',
    keys: ['g'],
    when: hasTargets,
    run: ({ view }) => view.setState({ dialog: 'recipe' }),
  },
  {
    title: 'Period a step longer',
    room: 'fold',
    keys: ['ArrowRight'],
    foot: { keys: ['ArrowLeft', 'ArrowRight'], words: 'period' },
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('period', 1),
  },
  {
    title: 'Period a step shorter',
    room: 'fold',
    keys: ['ArrowLeft'],
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('period', -1),
  },
  {
    title: 'Epoch a step later',
    room: 'fold',
    keys: [']'],
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('epoch', 1),
  },
  {
    title: 'Epoch a step earlier',
    room: 'fold',
    keys: ['['],
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('epoch', -1),
  },
  {
    title: 'Duration a step longer',
    room: 'fold',
    keys: ['.'],
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('duration', 1),
  },
  {
    title: 'Duration a step shorter',
    room: 'fold',
    keys: [','],
    when: hasEphemeris,
    run: ({ actions }) => actions.nudge('duration', -1),
  },
  {
    title: 'Halve the period',
    room: 'fold',
    keys: ['h'],
    foot: { keys: ['h'], words: 'halve' },
    when: hasEphemeris,
    run: ({ actions }) => actions.scalePeriod(0.5),
  },
  {
    title: 'Double the period',
    room: 'fold',
    keys: ['d'],
    foot: { keys: ['d'], words: 'double' },
    when: (candling) => hasTargets(candling) && hasEphemeris(candling),
    run: ({ actions }) => actions.scalePeriod(2),
  },
  {
    title: 'Search again',
    room: 'search',
    keys: ['r'],
    when: hasTargets,
    run: (candling) => candling.targetResults.searchAgain(candling.actions.bench().target!),
  },
  {
    title: 'Search settings',
    room: 'search',
    keys: ['Shift+R'],
    when: hasTargets,
    run: ({ view }) => view.setState({ dialog: 'search settings' }),
  },
  {
    title: 'Show or hide the periodogram',
    room: 'search',
    keys: ['y'],
    when: hasTargets,
    run: ({ view }) => view.setState({ periodogramHidden: !(view.getState().periodogramHidden ?? isNarrow()) }),
  },
  {
    title: 'Arrange for folding or for searching',
    room: 'search',
    keys: ['b'],
    when: hasTargets,
    run: ({ view }) => view.setState({ arrangement: view.getState().arrangement === 'fold' ? 'search' : 'fold' }),
  },
  {
    title: 'Make a case of the trial',
    room: 'case',
    keys: ['a'],
    foot: { keys: ['a'], words: 'make a case' },
    when: hasTrial,
    run: ({ actions }) => actions.makeCaseFromTrial(),
  },
  {
    title: 'Make a case of the marked dips',
    room: 'case',
    keys: ['Shift+A'],
    when: hasTargets,
    run: ({ actions }) => actions.makeCaseFromMarks(),
  },
  {
    title: 'Make a case by hand',
    room: 'case',
    keys: ['Shift+H'],
    when: hasTargets,
    run: ({ view }) => view.setState({ dialog: 'timing by hand' }),
  },
  {
    title: 'Next case of this target',
    room: 'case',
    keys: ['c'],
    when: hasTargets,
    run: ({ actions }) => actions.stepCase(),
  },
  {
    title: 'Strongest peak of the search',
    room: 'search',
    keys: ['p'],
    when: (candling) => candling.actions.bench().search?.peaks[0] !== undefined,
    run: ({ actions }) => actions.pickPeak(actions.bench().search!.peaks[0]!, 1),
  },
  ...RULING_KINDS.map(
    (kind, index): AppCommand => ({
      title: `Rule: ${kind}`,
      room: 'ruling',
      keys: [String(index + 1)],
      when: hasCase,
      run: (_, rooms) => rooms.ruleWith(kind),
    }),
  ),
  {
    title: 'Park until…',
    room: 'ruling',
    keys: ['k'],
    foot: { keys: ['k'], words: 'park' },
    when: hasCase,
    run: ({ view }) => view.setState({ dialog: 'park' }),
  },
  {
    title: 'Session',
    room: 'session',
    keys: ['w'],
    when: hasSession,
    run: ({ view }) => view.setState({ dialog: 'session' }),
  },
  {
    title: 'Export the session',
    room: 'session',
    keys: ['Shift+W'],
    when: hasSession,
    run: (_, rooms) => rooms.exportSession(),
  },
  {
    title: 'Export the vetting log as CSV',
    room: 'session',
    keys: ['x'],
    when: hasSession,
    run: (_, rooms) => rooms.exportVettingLog('csv'),
  },
  {
    title: 'Export the vetting log as JSON',
    room: 'session',
    keys: ['Shift+X'],
    when: hasSession,
    run: (_, rooms) => rooms.exportVettingLog('json'),
  },
  {
    title: 'Undo',
    room: 'session',
    keys: ['$mod+z'],
    when: hasSession,
    run: ({ document }) => document.getState().undo(),
  },
  {
    title: 'Redo',
    room: 'session',
    keys: ['$mod+Shift+Z', '$mod+y'],
    when: hasSession,
    run: ({ document }) => document.getState().redo(),
  },
  {
    title: 'All commands',
    room: 'screen',
    keys: ['$mod+k'],
    run: ({ view }) => view.setState({ dialog: view.getState().dialog === 'palette' ? undefined : 'palette' }),
  },
  { title: 'All keys', room: 'screen', keys: ['Shift+?'], run: ({ view }) => view.setState({ dialog: 'keys' }) },
  { title: 'System, dark or light theme', room: 'screen', keys: ['Shift+L'], run: cycleTheme },
  {
    title: 'Show or hide the docket',
    room: 'screen',
    keys: ['Shift+D'],
    run: ({ view }) => view.setState({ docketHidden: !view.getState().docketHidden }),
  },
  {
    title: 'Show or hide the case sheet',
    room: 'screen',
    keys: ['Shift+C'],
    run: ({ view }) => view.setState({ sheetHidden: !view.getState().sheetHidden }),
  },
  { title: 'Go to the next region', room: 'screen', keys: ['F6'], run: () => goToRegion(1) },
  { title: 'Go to the previous region', room: 'screen', keys: ['Shift+F6'], run: () => goToRegion(-1) },
  {
    title: 'Cancel what runs',
    room: 'screen',
    keys: ['Escape'],
    when: (candling) =>
      isRunning(candling) ||
      candling.results.getState().sweep !== undefined ||
      candling.view.getState().tool === 'mark',
    run: (candling) => {
      if (candling.view.getState().tool === 'mark') candling.view.setState({ tool: 'pan' });
      else if (isRunning(candling)) candling.actions.bench().running!.cancel();
      else candling.sweep.cancel();
    },
  },
];

/** The commands that would work now, in the order of the list. */
export function availableCommands(candling: Candling): readonly AppCommand[] {
  return COMMANDS.filter(({ when }) => when === undefined || when(candling));
}
