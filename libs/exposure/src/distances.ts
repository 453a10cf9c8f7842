import { luminosityDistancesMpc, type Cosmology } from '@faintward/cosmology';
import { OutOfDomainError } from '@faintward/photometry';
import type { DistanceModel } from './types.js';

const KPC_PER_MPC = 1000;
const RADIAN_PER_ARCSEC = Math.PI / 648_000;

/** What an estimate uses of a distance: all of it follows from the luminosity distance at the redshift. */
export interface TargetDistance {
  luminosityDistanceMpc: number;
  distanceModulusMag: number;
  kpcPerArcsec: number;
}

/**
 * Luminosity distance, modulus and scale from one call of the model.
 *
 * @throws {OutOfDomainError} if the model gives no positive distance there, as at redshift 0
 * @see Hogg 1999, astro-ph/9905116, sections 6, 7 and 9
 */
export function targetDistance(model: DistanceModel, redshift: number): TargetDistance {
  const luminosityDistanceMpc = model.luminosityDistanceMpc(redshift);
  if (!(luminosityDistanceMpc > 0 && luminosityDistanceMpc < Infinity)) {
    throw new OutOfDomainError('target.redshift', redshift, 'a redshift at which the cosmology has a distance');
  }
  return {
    luminosityDistanceMpc,
    distanceModulusMag: 5 * Math.log10(luminosityDistanceMpc) + 25,
    kpcPerArcsec: (luminosityDistanceMpc / (1 + redshift) ** 2) * KPC_PER_MPC * RADIAN_PER_ARCSEC,
  };
}

/**
 * A model whose distances come from the cosmology's table instead of an integration each: for lists of thousands.
 *
 * Within 1e-9 of the integration, see `luminosityDistancesMpc` of `@faintward/cosmology`.
 */
export function tabulatedDistances(cosmology: Cosmology): DistanceModel {
  const one = new Float64Array(1);
  return {
    luminosityDistanceMpc(redshift) {
      one[0] = redshift;
      return luminosityDistancesMpc(cosmology, one)[0] ?? NaN;
    },
  };
}
