import { numberLabel } from '../plot/number-label.ts';
import type { RunningJob } from '../store/results-store.ts';

/** What runs, how far it is, and what cancelling keeps. */
export function SearchProgress({ job }: { readonly job: RunningJob }) {
  const { done, total } = job.progress;
  const percent = total === 0 ? 0 : (100 * done) / total;
  return (
    <div className="search-progress" role="status">
      <p>
        {job.title}: <span className="number">{numberLabel(done)}</span> of{' '}
        <span className="number">{numberLabel(total)}</span> {job.unit}
      </p>
      <div className="progress-bar" role="progressbar" aria-label={job.title} aria-valuenow={Math.round(percent)}>
        <i style={{ width: `${percent}%` }} />
      </div>
      <button type="button" className="button compact" onClick={job.cancel}>
        <kbd>Esc</kbd> cancel; flux and cases stay
      </button>
    </div>
  );
}
