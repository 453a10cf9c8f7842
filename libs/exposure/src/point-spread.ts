import { erf, findRoot, gaussLegendre, logGamma } from '@faintward/numerics';

const FOUR_LN2 = 4 * Math.LN2;
const TWO_SQRT_LN2 = 2 * Math.sqrt(Math.LN2);

/** σ over FWHM of a Gaussian. */
export const GAUSSIAN_SIGMA_OVER_FWHM = 1 / (2 * Math.sqrt(2 * Math.LN2));

/**
 * Fraction of a Gaussian image inside a circle: 1 − exp(−4 ln 2 x²).
 *
 * @param radiusOverFwhm  x, ≥ 0
 */
export function gaussianEncircledFraction(radiusOverFwhm: number): number {
  return -Math.expm1(-FOUR_LN2 * radiusOverFwhm * radiusOverFwhm);
}

/**
 * Fraction of a Moffat image I ∝ (1 + r²/α²)^−β inside a circle, FWHM = 2α √(2^(1/β) − 1).
 *
 * @param radiusOverFwhm  ≥ 0
 * @param beta            β > 1; 2.5 has strong wings, 4.765 is the turbulence limit
 * @see Moffat 1969, A&A 3, 455
 */
export function moffatEncircledFraction(radiusOverFwhm: number, beta: number): number {
  return 1 - (1 + radiusOverFwhm * radiusOverFwhm * 4 * (2 ** (1 / beta) - 1)) ** (1 - beta);
}

/** α over FWHM of a Moffat image. */
export function moffatAlphaOverFwhm(beta: number): number {
  return 1 / (2 * Math.sqrt(2 ** (1 / beta) - 1));
}

/**
 * Fraction of a Gaussian image through a long slit (or along one side of a box).
 *
 * Closed form; relative error below 1e-14.
 *
 * @param widthOverFwhm   full width of the slit
 * @param offsetOverFwhm  distance of the image's centre from the slit's middle
 */
export function gaussianSlitFraction(widthOverFwhm: number, offsetOverFwhm = 0): number {
  if (offsetOverFwhm === 0) return erf((TWO_SQRT_LN2 * widthOverFwhm) / 2);
  const near = erf(TWO_SQRT_LN2 * (widthOverFwhm / 2 - offsetOverFwhm));
  const far = erf(TWO_SQRT_LN2 * (widthOverFwhm / 2 + offsetOverFwhm));
  return (near + far) / 2;
}

/**
 * Fraction of a Moffat image through a long slit.
 *
 * The image summed along the slit is ∝ (1 + x²/α²)^(1/2 − β); integrated with x = α sinh u, which makes the integrand
 * smooth. Relative error below 1e-12 for widths up to 20 FWHM.
 */
export function moffatSlitFraction(widthOverFwhm: number, beta: number, offsetOverFwhm = 0): number {
  const alpha = moffatAlphaOverFwhm(beta);
  const norm = Math.exp(logGamma(beta - 0.5) - logGamma(beta - 1)) / Math.sqrt(Math.PI);
  const low = Math.asinh((offsetOverFwhm - widthOverFwhm / 2) / alpha);
  const high = Math.asinh((offsetOverFwhm + widthOverFwhm / 2) / alpha);
  return norm * gaussLegendre((u) => Math.cosh(u) ** (2 - 2 * beta), low, high, 48);
}

/** Fraction of a centred Gaussian image inside a rectangle. */
export function gaussianRectangleFraction(widthOverFwhm: number, heightOverFwhm: number): number {
  return gaussianSlitFraction(widthOverFwhm) * gaussianSlitFraction(heightOverFwhm);
}

/** Fraction of a Gaussian image in the pixel it is centred on. */
export function gaussianPeakPixelFraction(pixelOverFwhm: number): number {
  return gaussianSlitFraction(pixelOverFwhm) ** 2;
}

/** Noise-equivalent area of a Gaussian image in FWHM²: 4πσ². @see King 1983, PASP 95, 163 */
export const GAUSSIAN_NOISE_EQUIVALENT_AREA_OVER_FWHM2 = Math.PI / (2 * Math.LN2);

/** Noise-equivalent area of a Moffat image in FWHM²: πα² (2β − 1)/(β − 1)². */
export function moffatNoiseEquivalentAreaOverFwhm2(beta: number): number {
  return (Math.PI * moffatAlphaOverFwhm(beta) ** 2 * (2 * beta - 1)) / (beta - 1) ** 2;
}

/**
 * Radius, in FWHM, at which encircled fraction over radius is largest: best S/N against sky or read noise, because the
 * noise grows with the radius.
 *
 * @param encircled  encircled fraction as a function of radius over FWHM, smooth, with its maximum of fraction/radius
 *                   between 0.2 and 3
 */
export function optimumRadiusOverFwhm(encircled: (radiusOverFwhm: number) => number): number {
  const step = 1e-4;
  // Five-point derivative: error step⁴/30 times the fifth derivative, below 1e-13 for the profiles here.
  const slope = (x: number): number =>
    (8 * (encircled(x + step) - encircled(x - step)) - (encircled(x + 2 * step) - encircled(x - 2 * step))) /
    (12 * step);
  return findRoot((x) => slope(x) * x - encircled(x), 0.2, 3, { absoluteTolerance: 1e-12 });
}
