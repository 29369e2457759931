import { type AppCommand, hasEphemeris, hasMark, hasTargets } from './app-command.ts';

export const BENCH_COMMANDS: readonly AppCommand[] = [
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
];
