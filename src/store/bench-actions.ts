import { type ActionStores, makeActionKit } from './actions/action-stores.ts';
import { createCaseActions } from './actions/case-actions.ts';
import { createFoldActions } from './actions/fold-actions.ts';
import { createMarkActions } from './actions/mark-actions.ts';
import { createSearchActions } from './actions/search-actions.ts';
import { createSelectionActions } from './actions/selection-actions.ts';

/** What the analyst does with the selected target: every action that a key, a click or a drag can reach. */
export type BenchActions = ReturnType<typeof createBenchActions>;

export function createBenchActions(stores: ActionStores) {
  const kit = makeActionKit(stores);
  return {
    bench: kit.bench,
    ...createSelectionActions(kit),
    ...createFoldActions(kit),
    ...createMarkActions(kit),
    ...createCaseActions(kit),
    ...createSearchActions(kit),
  };
}
