import { cycleTheme, goToRegion } from '../screen-actions.ts';
import { type AppCommand, hasSession, isRunning } from './app-command.ts';

export const SCREEN_COMMANDS: readonly AppCommand[] = [
  {
    title: 'Import a session',
    room: 'session',
    keys: ['i'],
    run: (_, rooms) => rooms.importSession(),
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
