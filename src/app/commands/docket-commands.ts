import { focusFind } from '../screen-actions.ts';
import { type AppCommand, hasTargets, isEmpty } from './app-command.ts';

export const DOCKET_COMMANDS: readonly AppCommand[] = [
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
    run: ({ actions }) => actions.stepTarget(1),
  },
  {
    title: 'Previous target',
    room: 'docket',
    keys: ['ArrowUp'],
    when: hasTargets,
    run: ({ actions }) => actions.stepTarget(-1),
  },
  { title: 'Find a target', room: 'docket', keys: ['/'], when: hasTargets, run: focusFind },
];
