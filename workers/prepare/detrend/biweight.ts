import { iterateBiweight } from '../../../src/core/biweight.ts';
import type { Locate } from './sliding-trend.ts';

/** Cut of the biweight in MADs, as usual for transits: Hippke et al. (2019), AJ 158, 143. */
const CUT = 5;
/** A window with fewer points has no location of its own. */
const LEAST_POINTS = 3;

/** Tukey's biweight location, iterated. Hippke et al. (2019), AJ 158, 143, compare such filters and prefer this one. */
export const locateByBiweight: Locate = ({ flux, scratch, count }) =>
  count < LEAST_POINTS ? Number.NaN : iterateBiweight(flux, scratch, count, CUT);
