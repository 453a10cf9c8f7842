import { requireRedshift } from './domain.js';

/** α of f_ν ∝ ν^α for β of f_λ ∝ λ^β, and the other way round: α = −2 − β. */
export function frequencySlopeFromWavelengthSlope(slopeBeta: number): number {
  return -2 - slopeBeta;
}

/** β of f_λ ∝ λ^β for α of f_ν ∝ ν^α. */
export function wavelengthSlopeFromFrequencySlope(slopeAlpha: number): number {
  return -2 - slopeAlpha;
}

/**
 * K-correction of a power law f_ν ∝ ν^α for the same band in both frames: −2.5 (1 + α) log10(1 + z).
 *
 * Valid where one power law covers the band in both frames: not across the Lyman break, the 4000 Å break or strong
 * lines. Exact otherwise, whatever the band's shape. Not to be applied to a magnitude that is already quoted at a
 * rest wavelength: use {@link apparentMagnitudeAtRestWavelength}.
 *
 * @param slopeAlpha  α of f_ν ∝ ν^α; a flat f_ν has 0
 * @param redshift    ≥ 0
 * @throws {OutOfDomainError} if redshift is negative or not finite
 * @see Hogg, Baldry, Blanton & Eisenstein 2002, astro-ph/0210394
 */
export function powerLawKCorrectionMag(slopeAlpha: number, redshift: number): number {
  requireRedshift(redshift);
  return -2.5 * (1 + slopeAlpha) * Math.log10(1 + redshift);
}

/**
 * The bandwidth term −2.5 log10(1 + z): what is left of the K-correction of an AB magnitude when the rest wavelength
 * that was quoted is the one that is observed.
 */
export function redshiftBandwidthMag(redshift: number): number {
  requireRedshift(redshift);
  return -2.5 * Math.log10(1 + redshift);
}

/**
 * Apparent AB magnitude at λ_e (1 + z) of a source with absolute AB magnitude M at rest wavelength λ_e:
 * m = M + DM − 2.5 log10(1 + z). No colour enters.
 */
export function apparentMagnitudeAtRestWavelength(
  absoluteMagnitudeAb: number,
  distanceModulusMag: number,
  redshift: number,
): number {
  return absoluteMagnitudeAb + distanceModulusMag + redshiftBandwidthMag(redshift);
}

/**
 * Apparent AB magnitude in the band the absolute magnitude is quoted in: m = M + DM + K, power law f_ν ∝ ν^α.
 *
 * @see {@link powerLawKCorrectionMag} for its validity
 */
export function apparentMagnitudeInSameBand(
  absoluteMagnitudeAb: number,
  distanceModulusMag: number,
  slopeAlpha: number,
  redshift: number,
): number {
  return absoluteMagnitudeAb + distanceModulusMag + powerLawKCorrectionMag(slopeAlpha, redshift);
}

/**
 * Change of the AB magnitude from one wavelength to another along f_λ ∝ λ^β, both in the same frame:
 * −2.5 (β + 2) log10(λ_to / λ_from).
 */
export function powerLawMagnitudeChange(slopeBeta: number, fromNm: number, toNm: number): number {
  return -2.5 * (slopeBeta + 2) * Math.log10(toNm / fromNm);
}
