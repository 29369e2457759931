import { useCandling, useView } from '../store/use-candling.ts';
import { Toggle } from './Toggle.tsx';

/** How the bench is arranged, in the head of its first pane. */
export function ArrangementToggle() {
  const { view } = useCandling();
  const arrangement = useView((state) => state.arrangement);
  return (
    <Toggle
      legend="Arrangement of the bench"
      value={arrangement}
      options={['fold', 'search']}
      onChoose={(chosen) => view.setState({ arrangement: chosen })}
    />
  );
}
