import type { BoxSearchPart } from '../../src/contract/search-contract.ts';

/** Puts one column of the parts of a search, in any order, back in the order of its trials. */
export function joinParts(
  parts: readonly BoxSearchPart[],
  column: (part: BoxSearchPart) => Float64Array,
  trialCount: number,
): Float64Array {
  checkParts(parts, trialCount);
  const joined = new Float64Array(trialCount);
  for (const part of parts) {
    const values = column(part);
    for (let i = 0; i < values.length; i += 1) joined[part.trials[i]!] = values[i]!;
  }
  return joined;
}

/** Parts that do not make up the plan were searched with other settings: a fault of the caller, not of the data. */
function checkParts(parts: readonly BoxSearchPart[], trialCount: number): void {
  const numbers = new Set(parts.map((part) => part.part));
  const trials = parts.reduce((sum, part) => sum + part.trials.length, 0);
  const isComplete = numbers.size === parts.length && parts.every((_, i) => numbers.has(i)) && trials === trialCount;
  if (!isComplete) throw new Error(`The ${parts.length} parts hold ${trials} trials; the plan has ${trialCount}.`);
}
