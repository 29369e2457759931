import { formatNumber, formatValueWithError } from '../core/number-format.ts';
import { describeRecipe } from '../session/describe-recipe.ts';
import { depthLossKey } from '../store/signal-results.ts';
import { preparedKey, roundKeys } from '../store/target-keys.ts';
import { useBench, useCandling, useResults } from '../store/use-candling.ts';
import { chanceWords } from './chance-words.ts';
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
  const stale = numbers !== undefined && ![preparedKey(target), ...roundKeys(target)].includes(numbers.key);
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
          <span>These numbers are of an earlier recipe or search.</span>
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
        {numbers?.correlatedSignalToNoise !== undefined && (
          <Plain name="with correlated noise" value={formatNumber(numbers.correlatedSignalToNoise, 1)} />
        )}
        {numbers?.sde !== undefined && (
          <Plain name="signal detection efficiency" value={formatNumber(numbers.sde, 1)} />
        )}
        {numbers?.falseAlarmProbability !== undefined && (
          <Plain name="false-alarm probability" value={chanceWords(numbers.falseAlarmProbability)} />
        )}
        <Plain name="events with data" value={formatNumber(numbers?.eventCount)} />
      </div>
      <DepthKept />
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

/** What the recipe leaves of such a dip, measured by injection; asked for. */
function DepthKept() {
  const { actions } = useCandling();
  const { target, case: chosen, ephemeris } = useBench();
  const loss = useResults(({ depthLosses }) =>
    target === undefined || ephemeris === undefined ? undefined : depthLosses.get(depthLossKey(target, ephemeris)),
  );
  if (chosen?.numbers === undefined || !(chosen.numbers.boxDepth > 0) || target?.recipe.detrend.kind === 'none')
    return null;
  if (loss === undefined)
    return (
      <p className="small">
        <button type="button" className="link" onClick={() => actions.measureDepthLoss()}>
          <kbd>V</kbd> what does this recipe leave of such a dip?
        </button>
      </p>
    );
  const { keptFraction, keptFractionError, injections } = loss;
  return (
    <p className="small">
      This recipe leaves {formatNumber(keptFraction * 100, 1)} ± {formatNumber(keptFractionError * 100, 1)} % of the
      depth: {injections} injections of the same period, duration and depth at other phases.
    </p>
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
