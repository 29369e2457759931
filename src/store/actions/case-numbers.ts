import type { BoxPeak, BoxSearchResult, FalseAlarmResult } from '../../contract/search-contract.ts';
import { rankedSignalToNoise } from '../../core/box-search-settings.ts';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../core/correlated-noise.ts';
import type { Ephemeris } from '../../core/ephemeris.ts';
import { falseAlarmProbability } from '../../core/extreme-value.ts';
import { measureBox } from '../../core/measure-box.ts';
import type { CaseNumbers } from '../../session/document.ts';
import type { BenchSelection } from '../bench-selection.ts';
import { preparedKey } from '../target-keys.ts';

type Measured = Pick<BenchSelection, 'prepared' | 'target' | 'search'>;

/**
 * Depth and S/N of the box at an ephemeris, under the key of the series they were measured on. What belongs to a peak
 * of the periodogram (SDE, false-alarm probability) a box at one period does not have.
 */
export function numbersAt({ prepared, target, search }: Measured, ephemeris: Ephemeris): CaseNumbers | undefined {
  if (prepared === undefined || target === undefined) return undefined;
  const box = measureBox(prepared.time, prepared.flux, prepared.error, ephemeris);
  if (box === undefined) return undefined;
  const { depth, depthError, signalToNoise, eventCount } = box;
  const sigma = search && correlatedSigmaAt(search.correlatedNoise, ephemeris.durationDays);
  return {
    key: preparedKey(target),
    boxDepth: depth,
    boxDepthError: depthError,
    signalToNoise,
    correlatedSignalToNoise:
      sigma === undefined ? undefined : correlatedSignalToNoise(depth, depthError, sigma, eventCount),
    sde: undefined,
    falseAlarmProbability: undefined,
    eventCount,
  };
}

export function numbersOfPeak(
  search: BoxSearchResult,
  peak: BoxPeak,
  falseAlarm: FalseAlarmResult | undefined,
): CaseNumbers {
  const { boxDepth, boxDepthError, signalToNoise, correlatedSignalToNoise: correlated, sde, eventCount } = peak;
  const ranked = rankedSignalToNoise(peak, search.settings.objective);
  return {
    key: search.key,
    boxDepth,
    boxDepthError,
    signalToNoise,
    correlatedSignalToNoise: correlated,
    sde,
    falseAlarmProbability: falseAlarm && falseAlarmProbability(falseAlarm, ranked),
    eventCount,
  };
}
