import { RULING_KINDS } from '../../session/document.ts';
import { type AppCommand, hasCase, hasTargets, hasTrial } from './app-command.ts';

export const CASE_COMMANDS: readonly AppCommand[] = [
  {
    title: 'What the recipe leaves of such a dip',
    room: 'case',
    keys: ['v'],
    when: hasCase,
    run: ({ actions }) => actions.measureDepthLoss(),
  },
  {
    title: 'Make a case of the trial',
    room: 'case',
    keys: ['a'],
    foot: { keys: ['a'], words: 'make a case' },
    when: hasTrial,
    run: ({ actions }) => void actions.makeCaseFromTrial(),
  },
  {
    title: 'Make a case of the marked dips',
    room: 'case',
    keys: ['Shift+A'],
    when: hasTargets,
    run: ({ actions }) => void actions.makeCaseFromMarks(),
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
];
