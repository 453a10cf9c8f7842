import { requireBetween } from './argument-out-of-range.js';
import { toRadians } from './sky-position.js';

/** The published formulas that are offered, each under its authors. */
export type AirmassFormula =
  | 'secant'
  | 'hardie-1962'
  | 'rozenberg-1966'
  | 'kasten-young-1989'
  | 'krisciunas-schaefer-1991'
  | 'young-1994'
  | 'pickering-2002';

/** Plane-parallel airmass 1 / sin h. Good to 0.3 % down to 30° (X = 2); infinite at the horizon. Domain: 0 to 90°. */
export function airmassSecant(altitudeDeg: number): number {
  requireBetween('altitudeDeg', altitudeDeg, 0, 90);
  const sine = Math.sin(toRadians(altitudeDeg));
  return sine === 0 ? Number.POSITIVE_INFINITY : 1 / sine;
}

/**
 * Hardie's polynomial in sec z − 1. Good to about X = 6; it turns over and goes to minus infinity near the horizon, so the domain ends at 5°.
 *
 * @see Hardie 1962, in Astronomical Techniques, ed. Hiltner, 178
 */
export function airmassHardie(altitudeDeg: number): number {
  requireBetween('altitudeDeg', altitudeDeg, 5, 90);
  const excess = 1 / Math.sin(toRadians(altitudeDeg)) - 1;
  return 1 + excess * (1 - 0.0018167 - excess * (0.002875 + excess * 0.0008083));
}

/** Rozenberg's formula, 40 at the horizon. Domain: 0 to 90°. @see Rozenberg 1966, Twilight: A Study in Atmospheric Optics, 160 */
export function airmassRozenberg(altitudeDeg: number): number {
  requireBetween('altitudeDeg', altitudeDeg, 0, 90);
  const sine = Math.sin(toRadians(altitudeDeg));
  return 1 / (sine + 0.025 * Math.exp(-11 * sine));
}

/**
 * Kasten & Young's fit, 37.9 at the horizon. The altitude is the apparent (refracted) one; using the airless one changes the result by less than 0.1 % above 15°.
 * At the zenith the fit gives 0.99971: see {@link airmass} for the value that is never below 1. Domain: 0 to 90°.
 *
 * @see Kasten & Young 1989, Applied Optics 28, 4735
 */
export function airmassKastenYoung(apparentAltitudeDeg: number): number {
  requireBetween('apparentAltitudeDeg', apparentAltitudeDeg, 0, 90);
  return 1 / (Math.sin(toRadians(apparentAltitudeDeg)) + 0.50572 * (apparentAltitudeDeg + 6.07995) ** -1.6364);
}

/**
 * Scattering path length for sky glow and moonlight, 5 at the horizon. Not an airmass for extinction. Domain: 0 to 90°.
 *
 * @see Krisciunas & Schaefer 1991, PASP 103, 1033, eq. 3
 */
export function airmassKrisciunasSchaefer(altitudeDeg: number): number {
  requireBetween('altitudeDeg', altitudeDeg, 0, 90);
  return 1 / Math.sqrt(1 - 0.96 * Math.cos(toRadians(altitudeDeg)) ** 2);
}

/**
 * Young's rational function of the true (airless) altitude, 31.7 at the horizon. Domain: 0 to 90°.
 *
 * @see Young 1994, Applied Optics 33, 1108 (coefficients from memory)
 */
export function airmassYoung(trueAltitudeDeg: number): number {
  requireBetween('trueAltitudeDeg', trueAltitudeDeg, 0, 90);
  const c = Math.sin(toRadians(trueAltitudeDeg));
  return ((1.002432 * c + 0.148386) * c + 0.0096467) / (((c + 0.149864) * c + 0.0102963) * c + 0.000303978);
}

/**
 * Pickering's interpolation in the apparent altitude, 38.7 at the horizon and smooth there. Domain: 0 to 90°.
 *
 * @see Pickering 2002, DIO 12, 3
 */
export function airmassPickering(apparentAltitudeDeg: number): number {
  requireBetween('apparentAltitudeDeg', apparentAltitudeDeg, 0, 90);
  return 1 / Math.sin(toRadians(apparentAltitudeDeg + 244 / (165 + 47 * apparentAltitudeDeg ** 1.1)));
}

const formulas = {
  secant: airmassSecant,
  'hardie-1962': airmassHardie,
  'rozenberg-1966': airmassRozenberg,
  'kasten-young-1989': airmassKastenYoung,
  'krisciunas-schaefer-1991': airmassKrisciunasSchaefer,
  'young-1994': airmassYoung,
  'pickering-2002': airmassPickering,
} as const satisfies Record<AirmassFormula, (altitudeDeg: number) => number>;

/** Airmass by a named formula; each formula's own domain holds. */
export function airmassBy(formula: AirmassFormula, altitudeDeg: number): number {
  return formulas[formula](altitudeDeg);
}

/**
 * The airmass that is used for extinction and for limits: Kasten & Young's, never below 1.
 *
 * @param altitudeDeg apparent altitude, 0 to 90°
 * @throws {ArgumentOutOfRange} outside; below the horizon there is no airmass
 */
export function airmass(altitudeDeg: number): number {
  return Math.max(1, airmassKastenYoung(altitudeDeg));
}

/**
 * Altitude at which {@link airmass} reaches a value, in degrees: the lower limit that "airmass at most X" means. For X = 1 it is the zenith.
 * Exact to 1e-10 degrees, except within 3e-4 of X = 1, where the formula itself is flat.
 *
 * @param airmassValue 1 to 37.9
 * @throws {ArgumentOutOfRange} outside
 */
export function altitudeAtAirmassDeg(airmassValue: number): number {
  requireBetween('airmassValue', airmassValue, 1, airmassKastenYoung(0));
  if (airmassValue === 1) return 90;
  let below = 0;
  let above = 90;
  // Kasten & Young's formula falls steadily with altitude, so halving the bracket always converges; 50 steps reach the spacing of doubles.
  for (let step = 0; step < 50; step += 1) {
    const middle = (below + above) / 2;
    if (airmassKastenYoung(middle) > airmassValue) below = middle;
    else above = middle;
  }
  return (below + above) / 2;
}
