import type { MoonClass } from '../types.js';
import { requireBetween } from './check.js';

/** Where dark ends and bright begins; every observatory draws these lines for itself. */
export interface MoonClassThresholds {
  /** Predicted brightening at the target, mag: dark below the first, bright from the second on. */
  readonly darkBelowMag: number;
  readonly brightFromMag: number;
  /** Lit part of a Moon that is up: dark below the first, bright from the second on. */
  readonly darkBelowFraction: number;
  readonly brightFromFraction: number;
}

/** Common practice. */
export const USUAL_MOON_CLASS_THRESHOLDS: MoonClassThresholds = {
  darkBelowMag: 0.2,
  brightFromMag: 1,
  darkBelowFraction: 0.4,
  brightFromFraction: 0.7,
};

export interface MoonClassification {
  /** By what the sky is predicted to be at the target; this is the one to plan with. */
  readonly moonClass: MoonClass;
  /** By the lit part of the Moon alone, as calendars label nights. */
  readonly label: MoonClass;
}

/**
 * Class of an observation from the predicted brightening of the sky, and the label of its night.
 *
 * The two differ often: a full Moon low and far away can leave the sky grey.
 *
 * @param brighteningMag       ≥ 0; 0 with the Moon down
 * @param illuminatedFraction  0 to 1
 * @throws {OutOfDomainError} also for thresholds that are not in order
 */
export function moonClassOf(
  brighteningMag: number,
  illuminatedFraction: number,
  thresholds: MoonClassThresholds = USUAL_MOON_CLASS_THRESHOLDS,
): MoonClassification {
  const { darkBelowMag, brightFromMag, darkBelowFraction, brightFromFraction } = thresholds;
  requireBetween('brighteningMag', brighteningMag, 0, 40, 'mag');
  requireBetween('illuminatedFraction', illuminatedFraction, 0, 1);
  requireBetween('thresholds.darkBelowMag', darkBelowMag, 0, brightFromMag, 'mag');
  requireBetween('thresholds.darkBelowFraction', darkBelowFraction, 0, brightFromFraction);
  return {
    moonClass: classOf(brighteningMag, darkBelowMag, brightFromMag),
    label: classOf(illuminatedFraction, darkBelowFraction, brightFromFraction),
  };
}

function classOf(value: number, darkBelow: number, brightFrom: number): MoonClass {
  if (value < darkBelow) return 'dark';
  return value < brightFrom ? 'grey' : 'bright';
}
