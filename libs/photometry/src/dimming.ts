import { requireRedshift } from './domain.js';

/**
 * The four ways in which a source of fixed intrinsic surface brightness fades with redshift.
 *
 * - `bolometric`: energy, over all frequencies or over one line: (1+z)⁻⁴;
 * - `perUnitFrequency`: I_ν at the same rest frequency, so AB mag/arcsec²: (1+z)⁻³, because a fixed observed dν
 *   takes in (1+z) dν of the source;
 * - `perUnitWavelength`: I_λ: (1+z)⁻⁵;
 * - `photonRate`: photons over all frequencies or over one line: (1+z)⁻³.
 */
export type DimmingConvention = 'bolometric' | 'perUnitFrequency' | 'perUnitWavelength' | 'photonRate';

const MAG_PER_LOG10: Record<DimmingConvention, number> = {
  bolometric: 10,
  perUnitFrequency: 7.5,
  perUnitWavelength: 12.5,
  photonRate: 7.5,
};

/**
 * Surface-brightness dimming in magnitudes per arcsec².
 *
 * Exact in any metric theory in which photons are conserved. It is already contained in a magnitude derived from D_L
 * together with a size derived from D_A: adding it there counts it twice.
 *
 * @param redshift  ≥ 0
 * @throws {OutOfDomainError} if redshift is negative or not finite
 * @see Tolman 1930, PNAS 16, 511; Hubble & Tolman 1935, ApJ 82, 302 (pages cited from memory)
 */
export function surfaceBrightnessDimmingMag(redshift: number, convention: DimmingConvention): number {
  requireRedshift(redshift);
  return MAG_PER_LOG10[convention] * Math.log10(1 + redshift);
}

/** Mean surface brightness of a magnitude spread over a solid angle: m + 2.5 log10(Ω). */
export function meanSurfaceBrightness(magnitudeAb: number, solidAngleArcsec2: number): number {
  return magnitudeAb + 2.5 * Math.log10(solidAngleArcsec2);
}
