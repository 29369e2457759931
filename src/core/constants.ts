/**
 * Constants as the resolutions give them. Mass ratios are always formed from the mass parameters GM, so that the
 * uncertainty of G enters nowhere but in densities.
 * Sources: IAU 2015 Resolution B3 (Prša et al. 2016, AJ 152, 41); IAU 2012 Resolution B2; CODATA 2018; SI 2019.
 */

/** Nominal solar radius, m. */
export const SOLAR_RADIUS_M = 6.957e8;
/** Nominal solar effective temperature, K. */
export const SOLAR_TEFF_K = 5772;
/** Nominal solar luminosity, W. */
export const SOLAR_LUMINOSITY_W = 3.828e26;
/** Nominal total solar irradiance, W m^-2. */
export const SOLAR_IRRADIANCE_W_M2 = 1361;
/** Nominal solar mass parameter, m^3 s^-2. */
export const SOLAR_GM_M3_S2 = 1.3271244e20;
/** Nominal terrestrial equatorial radius, m. */
export const EARTH_RADIUS_M = 6.3781e6;
/** Nominal terrestrial mass parameter, m^3 s^-2. */
export const EARTH_GM_M3_S2 = 3.986004e14;
/** Nominal jovian equatorial radius, m. */
export const JUPITER_RADIUS_M = 7.1492e7;
/** Nominal jovian mass parameter, m^3 s^-2. */
export const JUPITER_GM_M3_S2 = 1.2668653e17;
/** Astronomical unit, m (exact; IAU 2012 B2). */
export const ASTRONOMICAL_UNIT_M = 1.495978707e11;
/** Newtonian constant, m^3 kg^-1 s^-2, 6.67430(15)e-11 (CODATA 2018). */
export const GRAVITATION_M3_KG_S2 = 6.6743e-11;
/** Speed of light, m s^-1 (exact). */
export const LIGHT_SPEED_M_S = 299792458;
/** Planck constant, J s (exact). */
export const PLANCK_J_S = 6.62607015e-34;
/** Boltzmann constant, J K^-1 (exact). */
export const BOLTZMANN_J_K = 1.380649e-23;
/** Stefan-Boltzmann constant 2 pi^5 k^4 / (15 h^3 c^2), W m^-2 K^-4. */
export const STEFAN_BOLTZMANN_W_M2_K4 =
  (2 * Math.PI ** 5 * BOLTZMANN_J_K ** 4) / (15 * PLANCK_J_S ** 3 * LIGHT_SPEED_M_S ** 2);
/** Parsec, m: 648000/pi au (IAU 2015 Resolution B2). */
export const PARSEC_M = (648000 / Math.PI) * ASTRONOMICAL_UNIT_M;
/** Mean solar density 3 GM / (4 pi G R^3), g cm^-3. */
export const SOLAR_DENSITY_CGS =
  (3 * SOLAR_GM_M3_S2) / (4 * Math.PI * GRAVITATION_M3_KG_S2 * SOLAR_RADIUS_M ** 3) / 1000;
export const SECONDS_PER_DAY = 86400;
