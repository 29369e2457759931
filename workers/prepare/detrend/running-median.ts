import { medianInPlace } from '../../../src/core/robust-statistics.ts';
import type { Locate } from './sliding-trend.ts';

/** The median of a window; of an even number of points the mean of the middle two. */
export const locateByMedian: Locate = ({ flux, count }) => (count === 0 ? Number.NaN : medianInPlace(flux, count));
