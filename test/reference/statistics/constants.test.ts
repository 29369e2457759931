import { describe, expect, it } from 'vitest';
import {
  ASTRONOMICAL_UNIT_M,
  EARTH_GM_M3_S2,
  EARTH_RADIUS_M,
  GRAVITATION_M3_KG_S2,
  JUPITER_GM_M3_S2,
  JUPITER_RADIUS_M,
  PARSEC_M,
  SOLAR_DENSITY_CGS,
  SOLAR_GM_M3_S2,
  SOLAR_LUMINOSITY_W,
  SOLAR_RADIUS_M,
  SOLAR_TEFF_K,
  STEFAN_BOLTZMANN_W_M2_K4,
} from '../../../src/core/constants.ts';

describe('constants', () => {
  it('are those of IAU 2015 B3, IAU 2012 B2 and CODATA 2018 (as two unit libraries print them)', () => {
    expect(SOLAR_RADIUS_M).toBe(695700000);
    expect(SOLAR_GM_M3_S2).toBe(1.3271244e20);
    expect(EARTH_RADIUS_M).toBe(6378100);
    expect(EARTH_GM_M3_S2).toBe(3.986004e14);
    expect(JUPITER_RADIUS_M).toBe(71492000);
    expect(JUPITER_GM_M3_S2).toBe(1.2668653e17);
    expect(ASTRONOMICAL_UNIT_M).toBe(149597870700);
    expect(GRAVITATION_M3_KG_S2).toBe(6.6743e-11);
  });

  it('give the derived values: Stefan-Boltzmann (SI 2019, astropy), parsec (IAU 2015 B2), solar density (computed)', () => {
    expect(STEFAN_BOLTZMANN_W_M2_K4).toBeCloseTo(5.670374419e-8, 17);
    expect(Math.abs(PARSEC_M - 3.085677581491367e16)).toBeLessThan(8);
    expect(SOLAR_DENSITY_CGS).toBeCloseTo(1.409779824, 8);
  });

  it('agree with each other: nominal temperature from nominal luminosity and radius', () => {
    const area = 4 * Math.PI * SOLAR_RADIUS_M ** 2;
    expect(Math.abs((SOLAR_LUMINOSITY_W / (area * STEFAN_BOLTZMANN_W_M2_K4)) ** 0.25 - SOLAR_TEFF_K)).toBeLessThan(0.1);
  });
});
