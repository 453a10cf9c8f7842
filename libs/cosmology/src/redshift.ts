import { SPEED_OF_LIGHT } from './constants.js';
import type { Cosmology } from './cosmology.js';
import { OutOfDomainError } from './errors.js';

/**
 * Observed redshift from its parts: 1 + z_obs = Π (1 + z_i). Redshifts multiply; adding them is wrong in second order.
 *
 * @param parts  for example cosmological, peculiar and observer's; each above −1
 * @throws {OutOfDomainError} if a part is not a finite number above −1
 * @see Davis et al. 2011, ApJ 741, 67, eq. 2
 */
export function combineRedshifts(...parts: readonly number[]): number {
  let sum = 0;
  for (const part of parts) {
    if (!(part > -1 && part < Infinity)) {
      throw new OutOfDomainError('redshift', part, { minimum: -1, maximum: Infinity }, 'both ends excluded');
    }
    // (1 + a)(1 + b) − 1 without losing the digits of small parts.
    sum = sum + part + sum * part;
  }
  return sum;
}

/**
 * Cosmological redshift when the other parts are known: (1 + z_obs)/Π(1 + z_i) − 1.
 *
 * @throws {OutOfDomainError} if a part is not a finite number above −1
 */
export function removeRedshifts(observed: number, ...parts: readonly number[]): number {
  const other = combineRedshifts(...parts);
  if (!(observed > -1 && observed < Infinity)) {
    throw new OutOfDomainError('observed', observed, { minimum: -1, maximum: Infinity }, 'both ends excluded');
  }
  return (observed - other) / (1 + other);
}

/**
 * Luminosity distance in Mpc of a nearby source, (1 + z_hel) D_M(z_cmb): the distance belongs to the redshift in the frame of
 * the microwave background, the dimming factor to the redshift as observed from the Sun.
 *
 * @throws {OutOfDomainError} if a redshift is out of range
 * @see Davis et al. 2011, ApJ 741, 67
 */
export function luminosityDistanceWithFramesMpc(
  cosmology: Cosmology,
  redshiftCmb: number,
  redshiftHeliocentric: number,
): number {
  if (!(redshiftHeliocentric > -1 && redshiftHeliocentric < Infinity)) {
    throw new OutOfDomainError('redshiftHeliocentric', redshiftHeliocentric, { minimum: -1, maximum: Infinity });
  }
  return cosmology.transverseComovingDistanceMpc(redshiftCmb) * (1 + redshiftHeliocentric);
}

/**
 * Scatter of the distance modulus in magnitudes from a line-of-sight velocity scatter in km/s: the change of modulus for a
 * change of (1+z) σ_v/c in redshift; (5/ln 10) σ_v/(cz) for z ≪ 1. Undefined at z = 0.
 *
 * First order in σ_v/(cz): an underestimate where the velocity is not small against cz.
 *
 * @throws {OutOfDomainError} if the velocity is negative or not below the speed of light, or the redshift is out of range
 */
export function distanceModulusScatterMag(
  cosmology: Cosmology,
  redshift: number,
  velocityScatterKmS: number,
): number | undefined {
  if (!(velocityScatterKmS >= 0 && velocityScatterKmS < SPEED_OF_LIGHT.value)) {
    throw new OutOfDomainError('velocityScatterKmS', velocityScatterKmS, { minimum: 0, maximum: SPEED_OF_LIGHT.value });
  }
  const slope = cosmology.distanceModulusSlopeMag(redshift);
  return slope === undefined ? undefined : (slope * (1 + redshift) * velocityScatterKmS) / SPEED_OF_LIGHT.value;
}
