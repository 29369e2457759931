export interface Lehmer {
  uniform(): number;
  between(low: number, high: number): number;
  normal(): number;
}
export function createLehmerStates(seed: number): () => number;
export function createLehmer(seedText: string): Lehmer;
