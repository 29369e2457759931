import { useMemo } from 'react';
import { expectedFalseAlarms, falseDiscoveryRates } from '../core/false-discovery.ts';
import { formatNumber } from '../core/number-format.ts';
import { useResults } from '../store/use-candling.ts';

/** Signals as unlikely as this by chance are counted. */
const LEVEL = 0.01;
const DISCOVERY_RATE = 0.05;

/** What chance alone makes of a whole docket, once its false-alarm probabilities are known. */
export function ChanceWords() {
  const summaries = useResults((state) => state.summaries);
  const words = useMemo(() => {
    const known = [...summaries.values()].flatMap(({ falseAlarmProbability: p }) => (p === undefined ? [] : [p]));
    if (known.length < 2) return undefined;
    const low = known.filter((p) => p <= LEVEL).length;
    const found = falseDiscoveryRates(known).filter((rate) => rate <= DISCOVERY_RATE).length;
    return (
      `${formatNumber(low)} of ${formatNumber(known.length)} strongest signals have a false-alarm probability under 1 %, ` +
      `${formatNumber(expectedFalseAlarms(known.length, LEVEL), 1)} expected by chance; ${formatNumber(found)} at a false-discovery rate of 5 %.`
    );
  }, [summaries]);
  return words === undefined ? null : <p className="small quiet chance-words">{words}</p>;
}
