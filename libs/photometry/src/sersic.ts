import { inverseRegularizedGammaP, logGamma, regularizedGammaP } from '@faintward/numerics';
import { OutOfDomainError, requirePositive } from './domain.js';

/** Accepted Sérsic indices. Below 0.3 no galaxy lies; above 8 the central cusp makes every aperture depend on the seeing. */
export const SERSIC_INDEX_RANGE = { lowest: 0.3, highest: 8 } as const;

function requireIndex(index: number): void {
  if (!(index >= SERSIC_INDEX_RANGE.lowest && index <= SERSIC_INDEX_RANGE.highest)) {
    throw new OutOfDomainError(
      'index',
      index,
      `between ${SERSIC_INDEX_RANGE.lowest} and ${SERSIC_INDEX_RANGE.highest}`,
    );
  }
}

/**
 * b_n of the Sérsic profile I(R) = I_e exp{−b_n [(R/R_e)^(1/n) − 1]}, which makes R_e enclose half of the light:
 * P(2n, b_n) = 1/2, solved by the inverse incomplete gamma function.
 *
 * Relative error below 1e-12; the usual series 2n − 1/3 + 4/(405 n) + … is 2.5e-4 off at n = 0.5.
 *
 * @param index  n, 0.3 to 8
 * @throws {OutOfDomainError} outside that range
 * @see Graham & Driver 2005, PASA 22, 118, eq. 1–4; the series: Ciotti & Bertin 1999, A&A 352, 447
 */
export function sersicB(index: number): number {
  requireIndex(index);
  return inverseRegularizedGammaP(2 * index, 0.5);
}

/**
 * Fraction of the total light inside an ellipse of the given radius: P(2n, b_n (R/R_e)^(1/n)).
 *
 * @param index         n, 0.3 to 8
 * @param radiusOverRe  R/R_e, ≥ 0; both along the same axis
 * @throws {OutOfDomainError} if the index is outside its range or the radius negative
 */
export function sersicEnclosedFraction(index: number, radiusOverRe: number): number {
  if (!(radiusOverRe >= 0)) throw new OutOfDomainError('radiusOverRe', radiusOverRe, '0 or more');
  return regularizedGammaP(2 * index, sersicB(index) * radiusOverRe ** (1 / index));
}

/** Circularised half-light radius of an ellipse: R_e √q, the radius of the circle of equal area. */
export function circularisedRadius(halfLightRadius: number, axisRatio: number): number {
  return halfLightRadius * Math.sqrt(axisRatio);
}

/**
 * Mean surface brightness inside the half-light ellipse: m + 2.5 log10(2π q R_e²).
 *
 * @param halfLightRadiusArcsec  along the major axis
 * @param axisRatio              minor over major axis
 */
export function meanEffectiveSurfaceBrightness(
  magnitudeAb: number,
  halfLightRadiusArcsec: number,
  axisRatio = 1,
): number {
  requirePositive('halfLightRadiusArcsec', halfLightRadiusArcsec);
  requirePositive('axisRatio', axisRatio);
  return magnitudeAb + 2.5 * Math.log10(2 * Math.PI * axisRatio * halfLightRadiusArcsec ** 2);
}

/** μ_e − ⟨μ⟩_e = 2.5 log10[n e^b b^(−2n) Γ(2n)]: the surface brightness at R_e against the mean inside it. */
export function effectiveMinusMeanSurfaceBrightness(index: number): number {
  const b = sersicB(index);
  return (2.5 / Math.LN10) * (Math.log(index) + b - 2 * index * Math.log(b) + logGamma(2 * index));
}

/** μ_0 − μ_e = −2.5 b / ln 10: the centre against R_e. Negative: the centre is brighter. */
export function centralMinusEffectiveSurfaceBrightness(index: number): number {
  return (-2.5 / Math.LN10) * sersicB(index);
}
