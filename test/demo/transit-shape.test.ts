import { describe, expect, it } from 'vitest';
import { createLehmerStates } from './lehmer.mjs';
import {
  contactDuration,
  createEclipses,
  createSeparation,
  createTransit,
  occultedFlux,
  scaledAxis,
  secondaryDelay,
  smearOverExposure,
} from './transit-shape.mjs';

const LIMB = [0.4, 0.25] as const;

describe('the flux behind a disc', () => {
  // Computed here: three brute-force routes (adaptive annuli, 30-digit annuli, two-dimensional) agree to 1e-14.
  it.each([
    [0, 0.01, 0, 0, 0.9999],
    [0, 0.1, 0.4, 0.3, 0.987767398151],
    [0.5, 0.1, 0.4, 0.3, 0.988500287457],
    [0.9, 0.1, 0.4, 0.3, 0.991938860636],
    [1, 0.1, 0.4, 0.3, 0.996743323913],
    [1.099, 0.1, 0.4, 0.3, 0.999997717661],
    [0.95, 0.2, 0.6, 0, 0.979267525893],
    [0.2, 0.5, 0.4, 0.3, 0.705932822473],
    [0.95, 0.5, 0.4, 0.3, 0.880978048345],
  ])('z = %d, k = %d, u = (%d, %d)', (z, k, u1, u2, flux) => {
    expect(occultedFlux(z, k, [u1, u2])).toBeCloseTo(flux, 9);
  });

  it('is 1 where the discs miss, and 0 where all is covered', () => {
    expect(occultedFlux(1.2, 0.1, LIMB)).toBe(1);
    expect(occultedFlux(0.2, 1.3, LIMB)).toBe(0);
    expect(occultedFlux(0, 1, [0, 0])).toBeCloseTo(0, 12);
  });
});

describe('an orbit', () => {
  const orbit = { periodDays: 5, epochDays: 1, axis: 12, impact: 0.4 };

  it('has the size that Kepler gives it', () => {
    // a = 1 au about the Sun in one year is 215.03 solar radii (IAU 2012 B2 and 2015 B3: 149597870.7 / 695700 km).
    expect(scaledAxis(1.409779824, 365.2568983)).toBeCloseTo(149597870.7 / 695700, 2);
  });

  it('passes the star at the impact parameter, and lasts as long as the closed form says', () => {
    expect(createSeparation(orbit)(1).separation).toBeCloseTo(0.4, 12);
    // Seager & Mallen-Ornelas (2003), eq. 3, circular orbit.
    const k = 0.1;
    const sinInclination = Math.sqrt(1 - (0.4 / 12) ** 2);
    const chord = Math.sqrt((1 + k) ** 2 - 0.4 ** 2) / (12 * sinInclination);
    expect(contactDuration(orbit, k, 1)).toBeCloseTo((5 / Math.PI) * Math.asin(chord), 9);
  });

  it('puts the secondary of an eccentric orbit where first order has it', () => {
    expect(secondaryDelay(orbit)).toBeCloseTo(2.5, 12);
    const eccentric = { ...orbit, eccentricity: 0.01, omegaDegrees: 60 };
    // Winn (2010), eq. 33: delay = P/2 (1 + 4 e cos(omega) / pi).
    expect(secondaryDelay(eccentric)).toBeCloseTo(2.5 * (1 + (4 * 0.01 * 0.5) / Math.PI), 4);
  });

  it('hides nothing but during transit, and the companion only behind the star', () => {
    const transit = createTransit(orbit, 0.1, LIMB);
    expect(transit(1)).toBeCloseTo(occultedFlux(0.4, 0.1, LIMB), 12);
    expect(transit(3.5)).toBe(1);
    const eclipses = createEclipses(orbit, { radiusRatio: 0.1, surfaceRatio: 0.5 }, LIMB);
    expect(eclipses(3.5)).toBeCloseTo(1 / 1.005, 12);
  });
});

it('an exposure records the mean', () => {
  const ramp = smearOverExposure((t) => t, 0.5);
  expect(ramp(2)).toBeCloseTo(2, 12);
  expect(smearOverExposure((t) => (t < 0 ? 0 : 1), 1, 10)(0)).toBeCloseTo(0.5, 12);
});

it('the generator passes its published self-test', () => {
  // Park & Miller (1988): from 1, the 10 000th state is 1043618065.
  const next = createLehmerStates(1);
  let state = 1;
  for (let i = 0; i < 10000; i += 1) state = next();
  expect(state).toBe(1043618065);
});
