import { formatNumber, formatValueWithError } from '../core/number-format.ts';
import { describeRecipe } from '../session/describe-recipe.ts';
import { preparedKey, searchKey } from '../store/target-keys.ts';
import { useBench, useCandling } from '../store/use-candling.ts';
import { measureAgain } from './measure-again.ts';

/** What was measured of the case, on which series, and whether that series still stands. */
export function NumbersSection() {
  const candling = useCandling();
  const { files, view } = candling;
  const { target, case: chosen, ephemeris, prepared } = useBench();
  if (target === undefined || chosen === undefined) return null;
  const { numbers } = chosen;
  const inSigma = prepared?.fluxUnit === 'sigma';
  const factor = inSigma ? 1 : 1e6;
  const stale = numbers !== undefined && numbers.key !== preparedKey(target) && numbers.key !== searchKey(target);
  const depth = formatValueWithError(
    numbers && numbers.boxDepth * factor,
    numbers?.boxDepthError === undefined ? undefined : numbers.boxDepthError * factor,
    0,
  );
  return (
    <section className="sheet-section" aria-label="Parameters">
      <h3>
        Parameters <small>box at this timing, white noise</small>
      </h3>
      {stale && (
        <p className="notice">
          <span>These numbers are of an earlier recipe.</span>
          <span className="spread" />
          <button
            type="button"
            className="button compact"
            disabled={ephemeris === undefined || prepared === undefined}
            onClick={() => measureAgain(candling)}
          >
            measure again
          </button>
        </p>
      )}
      <div className={`numbers${stale ? ' stale' : ''}`}>
        <span />
        <span className="name">box depth</span>
        <span className="value number">{depth.value}</span>
        <span className="error number">{depth.error}</span>
        <span className="unit">{inSigma ? 'σ' : 'ppm'}</span>
        <Plain name="signal to noise" value={formatNumber(numbers?.signalToNoise, 1)} />
        {numbers?.sde !== undefined && (
          <Plain name="signal detection efficiency" value={formatNumber(numbers.sde, 1)} />
        )}
        <Plain name="events with data" value={formatNumber(numbers?.eventCount)} />
      </div>
      <p className="small series-words">
        <button type="button" className="link" onClick={() => view.setState({ dialog: 'recipe' })}>
          {describeRecipe(target.recipe)}
        </button>
        <br />
        <button type="button" className="link" onClick={() => void files.reviseColumns(target)}>
          columns of {target.files[0]?.name}
        </button>
      </p>
    </section>
  );
}

function Plain({ name, value }: { readonly name: string; readonly value: string }) {
  return (
    <>
      <span />
      <span className="name">{name}</span>
      <span className="value number">{value}</span>
      <span className="error" />
      <span className="unit" />
    </>
  );
}
