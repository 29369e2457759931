import type { Outcome } from '../../src/contract/outcome.ts';
import type { SweptSignal, TargetResult } from './target-result.ts';

/** "3/24 SR-007.fits: 2 cases, 8.13462 d (S/N 41.0), 3.21903 d (S/N 29.4)". */
export function progressLine(progress: {
  readonly ended: number;
  readonly total: number;
  readonly fileName: string;
  readonly outcome: Outcome<TargetResult>;
  readonly isKnown: boolean;
}): string {
  const { ended, total, fileName, outcome, isKnown } = progress;
  return `${ended}/${total} ${fileName}: ${isKnown ? 'known from before, ' : ''}${outcomeWords(outcome)}`;
}

function outcomeWords(outcome: Outcome<TargetResult>): string {
  if (outcome.kind === 'failed') return `FAILED. ${detailed(outcome.error)}`;
  if (outcome.kind === 'cancelled') return 'cancelled';
  const { signals, ending } = outcome.value;
  return signals.length === 0
    ? `no case. ${ending}`
    : `${counted(signals.length, 'case')}, ${signals.map(signalWords).join(', ')}`;
}

const detailed = ({ sentence, detail }: { readonly sentence: string; readonly detail?: string | undefined }): string =>
  detail === undefined ? sentence : `${sentence}\n${detail}`;

function signalWords({ timing, numbers }: SweptSignal): string {
  const strength = numbers.correlatedSignalToNoise ?? numbers.signalToNoise;
  const signalToNoise = strength === undefined ? '' : ` (S/N ${strength.toFixed(1)})`;
  return `${Number(timing.periodDays.toPrecision(6))} d${signalToNoise}`;
}

export function summaryLines(
  out: string,
  results: readonly TargetResult[],
  failures: readonly string[],
  skipped: number,
): readonly string[] {
  const cases = results.reduce((sum, { signals }) => sum + signals.length, 0);
  const passed = skipped === 0 ? '' : `, ${counted(skipped, 'file')} passed over`;
  const failed = failures.length === 0 ? 'none failed' : `${counted(failures.length, 'file')} failed:`;
  return [
    `${out}: ${counted(results.length, 'target')} with ${counted(cases, 'case')}${passed}, ${failed}`,
    ...failures.map((sentence) => `  ${sentence}`),
  ];
}

const counted = (count: number, what: string): string => `${count} ${what}${count === 1 ? '' : 's'}`;
