import { apparentSiderealTimeSeconds, meanSiderealTimeSeconds } from './meeus.js';
import { requireBetween } from './argument-out-of-range.js';
import { normaliseDegrees } from './sky-position.js';

const julianDateOfUnixEpoch = 2_440_587.5;
const modifiedJulianDateZero = 2_400_000.5;
const msPerDay = 86_400_000;

/** TT − UTC since the leap second of 2017, in seconds. None has been announced after it. */
export const terrestrialMinusUtcSeconds = 69.184;

/** Julian date (UTC) of an instant in milliseconds since 1970-01-01T00:00Z. Good to 20 µs, the spacing of doubles. */
export function julianDateFromUnixMs(unixMs: number): number {
  return unixMs / msPerDay + julianDateOfUnixEpoch;
}

/** Instant in milliseconds since 1970-01-01T00:00Z of a Julian date (UTC), rounded to a millisecond. */
export function unixMsFromJulianDate(julianDate: number): number {
  return Math.round((julianDate - julianDateOfUnixEpoch) * msPerDay);
}

export function modifiedJulianDateFromJulianDate(julianDate: number): number {
  return julianDate - modifiedJulianDateZero;
}

export function julianDateFromModified(modifiedJulianDate: number): number {
  return modifiedJulianDate + modifiedJulianDateZero;
}

/** Julian ephemeris date (TT) of a Julian date (UTC), with the present number of leap seconds. */
export function ephemerisDateFromJulianDate(julianDateUtc: number): number {
  return julianDateUtc + terrestrialMinusUtcSeconds / 86_400;
}

/**
 * Mean sidereal time at Greenwich in degrees, 0 ≤ θ < 360. UT1 is taken equal to UTC, which is wrong by less than 0.9 s of time (13.5″).
 * Within 0.1″ of the IAU 2006 expression between 2000 and 2050.
 *
 * @see IAU 1982 expression, Meeus, Astronomical Algorithms, ch. 12
 */
export function greenwichMeanSiderealTimeDeg(julianDateUtc: number): number {
  return normaliseDegrees(meanSiderealTimeSeconds(julianDateUtc) / 240);
}

/** Apparent sidereal time at Greenwich in degrees: the mean one with nutation. Same assumption on UT1. */
export function greenwichApparentSiderealTimeDeg(julianDateUtc: number): number {
  return normaliseDegrees(apparentSiderealTimeSeconds(julianDateUtc) / 240);
}

/** Apparent sidereal time at a longitude (east positive) in degrees. */
export function localSiderealTimeDeg(julianDateUtc: number, longitudeDegEast: number): number {
  requireBetween('longitudeDegEast', longitudeDegEast, -360, 360);
  return normaliseDegrees(greenwichApparentSiderealTimeDeg(julianDateUtc) + longitudeDegEast);
}
