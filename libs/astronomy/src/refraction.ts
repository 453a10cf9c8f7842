import { requireBetween } from './argument-out-of-range.js';
import { toRadians } from './sky-position.js';

export interface AirConditions {
  /** Air pressure at the telescope; default 1010. */
  readonly pressureHpa?: number;
  /** Default 10. */
  readonly temperatureCelsius?: number;
}

/**
 * Refraction at an apparent altitude, in arcminutes: what to subtract to get the airless altitude. 34.5′ at the horizon; 0.07′ accurate at sea level in
 * yellow light. At the zenith it gives −0.0014′ instead of 0.
 *
 * @param apparentAltitudeDeg 0 to 90
 * @see Bennett 1982, Journal of Navigation 35, 255 (from memory), as given by Meeus, Astronomical Algorithms, eq. 16.3
 */
export function refractionFromApparentArcmin(apparentAltitudeDeg: number, air: AirConditions = {}): number {
  requireBetween('apparentAltitudeDeg', apparentAltitudeDeg, 0, 90);
  return cotangent(apparentAltitudeDeg + 7.31 / (apparentAltitudeDeg + 4.4)) * densityRatio(air);
}

/**
 * Refraction at an airless altitude, in arcminutes: what to add to get the apparent altitude. Consistent with {@link refractionFromApparentArcmin} within 0.1′.
 *
 * @param trueAltitudeDeg 0 to 90
 * @see Sæmundsson 1986, Sky and Telescope 72, 70 (from memory), as given by Meeus, Astronomical Algorithms, eq. 16.4
 */
export function refractionFromTrueArcmin(trueAltitudeDeg: number, air: AirConditions = {}): number {
  requireBetween('trueAltitudeDeg', trueAltitudeDeg, 0, 90);
  return 1.02 * cotangent(trueAltitudeDeg + 10.3 / (trueAltitudeDeg + 5.11)) * densityRatio(air);
}

function densityRatio({ pressureHpa = 1010, temperatureCelsius = 10 }: AirConditions): number {
  requireBetween('pressureHpa', pressureHpa, 0, 1100);
  requireBetween('temperatureCelsius', temperatureCelsius, -90, 60);
  return (pressureHpa / 1010) * (283 / (273 + temperatureCelsius));
}

function cotangent(degrees: number): number {
  return 1 / Math.tan(toRadians(degrees));
}
