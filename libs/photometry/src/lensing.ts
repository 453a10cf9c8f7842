import { requirePositive } from './domain.js';

/**
 * What a lensing magnification μ of the total flux adds to a magnitude: −2.5 log10 μ.
 *
 * Surface brightness is conserved: the image's solid angle grows by μ with its flux. Below 1 the image is demagnified.
 *
 * @throws {OutOfDomainError} if the magnification is not positive and finite (give the absolute value of the parity)
 */
export function lensingMag(magnification: number): number {
  requirePositive('magnification', magnification);
  return -2.5 * Math.log10(magnification);
}
