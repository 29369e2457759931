import type { Candling } from '../store/candling.ts';
import type { AppCommand } from './commands/app-command.ts';
import { BENCH_COMMANDS } from './commands/bench-commands.ts';
import { CASE_COMMANDS } from './commands/case-commands.ts';
import { DOCKET_COMMANDS } from './commands/docket-commands.ts';
import { SCREEN_COMMANDS } from './commands/screen-commands.ts';
import { SEARCH_COMMANDS } from './commands/search-commands.ts';

/** All commands, in the order of the palette. Where two share a key, they never work at the same time. */
export const COMMANDS: readonly AppCommand[] = [
  ...DOCKET_COMMANDS,
  ...BENCH_COMMANDS,
  ...SEARCH_COMMANDS,
  ...CASE_COMMANDS,
  ...SCREEN_COMMANDS,
];

/** The commands that would work now, in the order of the list. */
export function availableCommands(candling: Candling): readonly AppCommand[] {
  return COMMANDS.filter(({ when }) => when === undefined || when(candling));
}
