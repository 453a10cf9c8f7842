import { requireBetween } from './argument-out-of-range.js';
import { normaliseDegrees, toDegrees, toRadians } from './sky-position.js';
import { sunPosition } from './sun.js';
import { julianDateFromUnixMs, localSiderealTimeDeg, unixMsFromJulianDate } from './time.js';

/** Where a telescope stands, as far as rising and setting need it. */
export interface ObservingSite {
  /** Geodetic, north positive, −90 to 90. */
  readonly latitudeDeg: number;
  /** East positive, −180 to 180. */
  readonly longitudeDegEast: number;
}

/** The dark part of one night. */
export interface Darkness {
  /** Local mean date of the evening, YYYY-MM-DD. */
  readonly eveningDate: string;
  /** `none`: the Sun never gets low enough. `whole-day`: it never gets higher; then the 24 hours around local midnight are given. */
  readonly kind: 'part' | 'none' | 'whole-day';
  /** Start and end as Julian dates (UTC), equal if there is no darkness. */
  readonly startJulianDate: number;
  readonly endJulianDate: number;
  readonly hours: number;
}

/** Sun's altitude at the three twilights; the last is where astronomical darkness begins. */
export const twilightAltitudeDeg = { civil: -6, nautical: -12, astronomical: -18 } as const;

const siderealDegreesPerDay = 360.985_647_366;

/**
 * When the Sun is below an altitude in the night that begins on an evening.
 *
 * Airless, from the apparent Sun; within 5 s below 60° of latitude, and within two minutes where the Sun only just reaches the altitude.
 *
 * @param eveningDate local mean date of the evening, YYYY-MM-DD
 * @param sunAltitudeDeg default −18, −90 to 0
 * @throws {ArgumentOutOfRange} if a number is out of range
 * @throws {RangeError} if the date is not a calendar date
 */
export function darknessOfNight(
  site: ObservingSite,
  eveningDate: string,
  sunAltitudeDeg: number = twilightAltitudeDeg.astronomical,
): Darkness {
  requireSite(site);
  requireBetween('sunAltitudeDeg', sunAltitudeDeg, -90, 0);
  const midnight = localMeanMidnight(site, eveningDate);
  const dusk = timeOfSunAltitude(site, midnight, sunAltitudeDeg, 'setting');
  const dawn = timeOfSunAltitude(site, midnight, sunAltitudeDeg, 'rising');
  if (dusk === 'always-above' || dawn === 'always-above') {
    return { eveningDate, kind: 'none', startJulianDate: midnight, endJulianDate: midnight, hours: 0 };
  }
  if (dusk === 'always-below' || dawn === 'always-below') {
    return {
      eveningDate,
      kind: 'whole-day',
      startJulianDate: midnight - 0.5,
      endJulianDate: midnight + 0.5,
      hours: 24,
    };
  }
  return { eveningDate, kind: 'part', startJulianDate: dusk, endJulianDate: dawn, hours: (dawn - dusk) * 24 };
}

/** Local mean midnight of the night that begins on an evening, as a Julian date (UTC). */
export function localMeanMidnight(site: ObservingSite, eveningDate: string): number {
  const unixMs = Date.parse(`${eveningDate}T00:00:00Z`);
  if (!/^\d{4}-\d{2}-\d{2}$/.test(eveningDate) || Number.isNaN(unixMs) || isoDate(unixMs) !== eveningDate) {
    throw new RangeError(`"${eveningDate}" is not a calendar date written YYYY-MM-DD.`);
  }
  return julianDateFromUnixMs(unixMs) + 1 - site.longitudeDegEast / 360;
}

/** Local mean date of the evening to which an instant belongs: a night runs from local mean noon to noon. */
export function eveningDateOf(site: ObservingSite, julianDateUtc: number): string {
  return isoDate(unixMsFromJulianDate(julianDateUtc + site.longitudeDegEast / 360 - 0.5));
}

/** Airless altitude of a direction at an hour angle, in degrees. */
export function altitudeDeg(hourAngleDeg: number, decDeg: number, latitudeDeg: number): number {
  const latitude = toRadians(latitudeDeg);
  const dec = toRadians(decDeg);
  const sine =
    Math.sin(latitude) * Math.sin(dec) + Math.cos(latitude) * Math.cos(dec) * Math.cos(toRadians(hourAngleDeg));
  return toDegrees(Math.asin(Math.min(1, Math.max(-1, sine))));
}

/** Half of the arc, in degrees of hour angle, during which a declination is above an altitude: 0 if never, 180 if always. */
export function semiArcDeg(latitudeDeg: number, decDeg: number, altitudeLimitDeg: number): number {
  const latitude = toRadians(latitudeDeg);
  const dec = toRadians(decDeg);
  return semiArc(
    Math.sin(latitude),
    Math.cos(latitude),
    Math.sin(dec),
    Math.cos(dec),
    Math.sin(toRadians(altitudeLimitDeg)),
  );
}

/** {@link semiArcDeg} from sines and cosines, for loops over many targets. */
export function semiArc(
  sinLatitude: number,
  cosLatitude: number,
  sinDec: number,
  cosDec: number,
  sinLimit: number,
): number {
  const height = sinLimit - sinLatitude * sinDec;
  const swing = cosLatitude * cosDec;
  // At a pole of the Earth or of the sky nothing rises or sets: the altitude does not depend on the hour angle.
  if (swing < 1e-12) return height <= 0 ? 180 : 0;
  const cosine = height / swing;
  return cosine >= 1 ? 0 : cosine <= -1 ? 180 : toDegrees(Math.acos(cosine));
}

export function siderealDegreesOf(days: number): number {
  return days * siderealDegreesPerDay;
}

export function requireSite({ latitudeDeg, longitudeDegEast }: ObservingSite): void {
  requireBetween('latitudeDeg', latitudeDeg, -90, 90);
  requireBetween('longitudeDegEast', longitudeDegEast, -180, 180);
}

type SunCrossing = number | 'always-above' | 'always-below';

function timeOfSunAltitude(
  site: ObservingSite,
  midnight: number,
  sunAltitudeDeg: number,
  direction: 'setting' | 'rising',
): SunCrossing {
  let time = midnight;
  // The Sun moves a degree a day, so each pass gains a factor of several hundred; the third changes less than a second except at grazing altitudes.
  for (let pass = 0; pass < 5; pass += 1) {
    const sun = sunPosition(time);
    const arc = semiArcDeg(site.latitudeDeg, sun.decDeg, sunAltitudeDeg);
    if (arc === 0) return 'always-below';
    if (arc === 180) return 'always-above';
    const hourAngle = normaliseDegrees(localSiderealTimeDeg(time, site.longitudeDegEast) - sun.raDeg);
    const wanted = direction === 'setting' ? arc : 360 - arc;
    // The Sun's own hour angle turns by 360 degrees in a day, within the equation of time's daily change.
    time += (((wanted - hourAngle + 540) % 360) - 180) / 360;
  }
  return time;
}

function isoDate(unixMs: number): string {
  return new Date(unixMs).toISOString().slice(0, 10);
}
