import { toDegrees, toRadians, type SkyPosition } from './sky-position.js';

/**
 * Angle between two directions, in degrees, 0 to 180.
 *
 * Accurate to rounding at every separation, from microarcseconds to antipodes, where the plain arc cosine loses half of its digits.
 *
 * @see Vincenty 1975, Survey Review 23, 88, the inverse formula for a sphere (page from memory)
 */
export function angularSeparationDeg(a: SkyPosition, b: SkyPosition): number {
  const deltaRa = toRadians(b.raDeg - a.raDeg);
  const decA = toRadians(a.decDeg);
  const decB = toRadians(b.decDeg);
  const sinA = Math.sin(decA);
  const cosA = Math.cos(decA);
  const sinB = Math.sin(decB);
  const cosB = Math.cos(decB);
  const cosDeltaRa = Math.cos(deltaRa);
  const across = Math.hypot(cosB * Math.sin(deltaRa), cosA * sinB - sinA * cosB * cosDeltaRa);
  return toDegrees(Math.atan2(across, sinA * sinB + cosA * cosB * cosDeltaRa));
}

/** Angle between two directions in arcseconds; see {@link angularSeparationDeg}. */
export function angularSeparationArcsec(a: SkyPosition, b: SkyPosition): number {
  return angularSeparationDeg(a, b) * 3600;
}

/**
 * Direction from one place to another, in degrees from north through east, 0 ≤ angle < 360. At a pole it is counted from the meridian of the first
 * place's right ascension; from a place to itself it is 0.
 */
export function positionAngleDeg(from: SkyPosition, to: SkyPosition): number {
  const deltaRa = toRadians(to.raDeg - from.raDeg);
  const decFrom = toRadians(from.decDeg);
  const decTo = toRadians(to.decDeg);
  const east = Math.cos(decTo) * Math.sin(deltaRa);
  const north = Math.cos(decFrom) * Math.sin(decTo) - Math.sin(decFrom) * Math.cos(decTo) * Math.cos(deltaRa);
  const angle = toDegrees(Math.atan2(east, north));
  return angle < 0 ? angle + 360 : angle;
}
