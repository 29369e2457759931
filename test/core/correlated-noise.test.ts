import { describe, expect, it } from 'vitest';
import { correlatedSigmaAt, correlatedSignalToNoise } from '../../src/core/correlated-noise.ts';

describe('S/N with correlated noise', () => {
  it('is that of Pont, Zucker & Queloz (2006), MNRAS 373, 231, eqs. 5-8 (worked here: depth 0.01, 90 points, 3 events)', () => {
    const depthError = 0.005 / Math.sqrt(90);
    expect(correlatedSignalToNoise(0.01, depthError, 0.003, 3)).toBeCloseTo(5.523447707, 8);
    expect(correlatedSignalToNoise(0.01, depthError, 0, 3)).toBeCloseTo(18.97366596, 7);
  });

  it('reads sigma between the measured durations, and flat beyond', () => {
    const noise = { durationsDays: [0.1, 0.4], sigma: [1, 3] };
    expect(correlatedSigmaAt(noise, 0.2)).toBeCloseTo(2, 12);
    expect(correlatedSigmaAt(noise, 0.01)).toBe(1);
    expect(correlatedSigmaAt(noise, 9)).toBe(3);
    expect(correlatedSigmaAt({ durationsDays: [], sigma: [] }, 1)).toBe(0);
  });
});
