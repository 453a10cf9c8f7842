import { Precessor } from './meeus.js';
import { normaliseDegrees, toDegrees, toRadians, type SkyPosition } from './sky-position.js';

/** The three angles that carry mean places of J2000 to the mean equator and equinox of a date, ready for many targets. */
export interface PrecessionFromJ2000 {
  readonly sinZeta: number;
  readonly cosZeta: number;
  readonly sinTheta: number;
  readonly cosTheta: number;
  readonly zDeg: number;
}

/**
 * Precession from J2000 to a date. Within 0.1″ of the IAU 2006 precession for dates within 50 years.
 *
 * @see Lieske et al. 1977, as given by Meeus, Astronomical Algorithms, eq. 21.2 and 21.3
 */
export function precessionFromJ2000(julianDate: number): PrecessionFromJ2000 {
  const { ζ, z, sθ, cθ } = new Precessor(2000, 2000 + (julianDate - 2_451_545) / 365.25);
  return { sinZeta: Math.sin(ζ), cosZeta: Math.cos(ζ), sinTheta: sθ, cosTheta: cθ, zDeg: toDegrees(z) };
}

/** Mean place of a date from a J2000 place. Proper motion, nutation and aberration (at most 30″ together) are left out. */
export function precess(position: SkyPosition, precession: PrecessionFromJ2000): SkyPosition {
  const ra = toRadians(position.raDeg);
  const dec = toRadians(position.decDeg);
  const x = Math.cos(dec) * Math.cos(ra);
  const y = Math.cos(dec) * Math.sin(ra);
  const z = Math.sin(dec);
  const forward = x * precession.cosZeta - y * precession.sinZeta;
  const a = x * precession.sinZeta + y * precession.cosZeta;
  const b = precession.cosTheta * forward - precession.sinTheta * z;
  const c = precession.sinTheta * forward + precession.cosTheta * z;
  return {
    raDeg: normaliseDegrees(toDegrees(Math.atan2(a, b)) + precession.zDeg),
    decDeg: toDegrees(Math.atan2(c, Math.hypot(a, b))),
  };
}
