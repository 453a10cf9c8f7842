import { OutOfDomainError, requirePositive } from './domain.js';

/**
 * Half-light radius of a Sérsic profile after Gaussian seeing: √(R_e² + (FWHM/2)²), both in the same unit.
 *
 * Too small, against the convolution, by (R_e/FWHM: 0.25, 0.5, 1, 2)
 *
 *     n = 1   3.4 %   3.9 %   2.3 %   0.7 %
 *     n = 4    14 %    13 %     6 %     1 %
 *
 * and exact for n = 0.5. Good for planning when n is 2 or less.
 *
 * @param halfLightRadius  R_e, 0 or more; circularised
 * @param fwhm             of the seeing, above 0
 */
export function halfLightRadiusAfterSeeing(halfLightRadius: number, fwhm: number): number {
  requireRadius(halfLightRadius);
  requirePositive('fwhm', fwhm);
  return Math.hypot(halfLightRadius, fwhm / 2);
}

/** What an image shows of a source. */
export type ImageRegime = 'point' | 'resolvedBySeeing' | 'extended';

/** R_e/FWHM below which the seeing alone makes the image, and above which the source alone does. */
const POINT_LIMIT = 1 / 5;
const EXTENDED_LIMIT = 2;

/**
 * How a source is to be treated: as a point (R_e below FWHM/5, or no size), by surface brightness (R_e above 2 FWHM), or between,
 * where both shape the image. A usual rule.
 *
 * @param halfLightRadiusArcsec  `null` for a point source
 */
export function imageRegime(halfLightRadiusArcsec: number | null, fwhmArcsec: number): ImageRegime {
  requirePositive('fwhmArcsec', fwhmArcsec);
  if (halfLightRadiusArcsec === null) return 'point';
  requireRadius(halfLightRadiusArcsec);
  const ratio = halfLightRadiusArcsec / fwhmArcsec;
  if (ratio < POINT_LIMIT) return 'point';
  return ratio > EXTENDED_LIMIT ? 'extended' : 'resolvedBySeeing';
}

function requireRadius(halfLightRadius: number): void {
  if (!(halfLightRadius >= 0 && halfLightRadius < Infinity)) {
    throw new OutOfDomainError('halfLightRadius', halfLightRadius, 'a finite number, 0 or more');
  }
}
