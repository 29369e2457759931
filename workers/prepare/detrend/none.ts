import type { Detrender } from './trend-input.ts';

export const none: Detrender<'none'> = {
  scaleDays: () => undefined,
  scaleName: 'none',
  leastCadences: () => 0,
  fit: async (_, { time }) => new Float64Array(time.length).fill(1),
};
