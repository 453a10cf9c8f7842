import type { Cosmology } from './cosmology.js';

/**
 * Distance modulus in one cosmology minus that in another, in magnitudes. At z = 0 the limit, 5 log₁₀ of the ratio of the
 * Hubble distances.
 *
 * @throws {OutOfDomainError} if the redshift is out of range
 */
export function distanceModulusDifferenceMag(to: Cosmology, from: Cosmology, redshift: number): number {
  const ratio =
    redshift === 0
      ? to.hubbleDistanceMpc / from.hubbleDistanceMpc
      : to.transverseComovingDistanceMpc(redshift) / from.transverseComovingDistanceMpc(redshift);
  return 5 * Math.log10(ratio);
}

/**
 * A published absolute magnitude carried from the cosmology it was derived with to another, so that the same apparent
 * magnitude comes out: M_to = M_from − (μ_to − μ_from).
 *
 * @throws {OutOfDomainError} if the redshift is out of range
 */
export function convertAbsoluteMagnitude(
  absoluteMagnitude: number,
  from: Cosmology,
  to: Cosmology,
  redshift: number,
): number {
  return absoluteMagnitude - distanceModulusDifferenceMag(to, from, redshift);
}
