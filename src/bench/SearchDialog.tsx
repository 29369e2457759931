import { useBench } from '../store/use-candling.ts';
import { SearchFields } from './SearchFields.tsx';
import { SheetDialog } from './SheetDialog.tsx';

/** What the box search of the selected target tries; every change is one undoable step and searches again. */
export function SearchDialog({ onLeave }: { readonly onLeave: () => void }) {
  const { target } = useBench();
  if (target === undefined) return null;
  return (
    <SheetDialog title={`Search of ${target.label}`} onLeave={onLeave}>
      <SearchFields />
    </SheetDialog>
  );
}
