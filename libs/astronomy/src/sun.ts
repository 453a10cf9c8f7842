import { apparentSun } from './meeus.js';
import { normaliseDegrees, toDegrees, type SkyPosition } from './sky-position.js';
import { ephemerisDateFromJulianDate } from './time.js';

/**
 * Apparent geocentric place of the Sun, referred to the equinox of date (not J2000). Within 0.01° between 1900 and 2100.
 *
 * @see Meeus, Astronomical Algorithms, ch. 25, lower accuracy
 */
export function sunPosition(julianDateUtc: number): SkyPosition {
  const { ra, dec } = apparentSun(ephemerisDateFromJulianDate(julianDateUtc));
  return { raDeg: normaliseDegrees(toDegrees(ra)), decDeg: toDegrees(dec) };
}
