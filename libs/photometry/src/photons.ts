import { PLANCK_CONSTANT, SPEED_OF_LIGHT } from './constants.js';
import { requireOrdered, requirePositive } from './domain.js';
import { fluxDensityCgsFromAbMagnitude } from './magnitudes.js';

/** erg s⁻¹ cm⁻² Hz⁻¹ → W m⁻² Hz⁻¹. */
const SI_PER_CGS_FLUX_DENSITY = 1e-3;

/** Photons s⁻¹ m⁻² per unit Δλ/λ of AB = 0: f_ν / h, 5.4795e10. A flat f_ν gives the same number at every wavelength. */
export const AB_ZERO_PHOTONS_PER_M2_S =
  (fluxDensityCgsFromAbMagnitude(0) * SI_PER_CGS_FLUX_DENSITY) / PLANCK_CONSTANT.value;

/**
 * Photons s⁻¹ m⁻² of a flat-f_ν source through a box band: (f_ν/h) ln(λ₂/λ₁), the exact ∫ f_ν dν / (hν).
 *
 * @param magnitudeAb       AB magnitude
 * @param wavelengthLowNm   blue edge
 * @param wavelengthHighNm  red edge
 * @throws {OutOfDomainError} if the edges are not positive and in order
 */
export function photonRateBoxBandPerM2(magnitudeAb: number, wavelengthLowNm: number, wavelengthHighNm: number): number {
  requireOrdered('wavelengthLowNm', wavelengthLowNm, 'wavelengthHighNm', wavelengthHighNm);
  return AB_ZERO_PHOTONS_PER_M2_S * 10 ** (-0.4 * magnitudeAb) * Math.log(wavelengthHighNm / wavelengthLowNm);
}

/**
 * The usual approximation f_ν Δλ / (h λ_mid) to {@link photonRateBoxBandPerM2}.
 *
 * Too low by (Δλ/λ)²/12 of itself: 0.3 % for V, 0.8 % for a band of Δλ/λ = 0.3. Kept to compare with hand calculations.
 */
export function photonRateNarrowBandPerM2(
  magnitudeAb: number,
  wavelengthLowNm: number,
  wavelengthHighNm: number,
): number {
  requireOrdered('wavelengthLowNm', wavelengthLowNm, 'wavelengthHighNm', wavelengthHighNm);
  const middleNm = (wavelengthLowNm + wavelengthHighNm) / 2;
  return (AB_ZERO_PHOTONS_PER_M2_S * 10 ** (-0.4 * magnitudeAb) * (wavelengthHighNm - wavelengthLowNm)) / middleNm;
}

/** Photons s⁻¹ m⁻² nm⁻¹ of an AB magnitude at a wavelength: f_ν / (h λ). */
export function photonRatePerM2PerNm(magnitudeAb: number, wavelengthNm: number): number {
  requirePositive('wavelengthNm', wavelengthNm);
  return (AB_ZERO_PHOTONS_PER_M2_S * 10 ** (-0.4 * magnitudeAb)) / wavelengthNm;
}

/**
 * Photons s⁻¹ m⁻² of a flat-f_ν source through a tabulated response: (f_ν/h) ∫ S dλ/λ, by the trapezoid rule in ln λ.
 *
 * Exact when S is linear in ln λ between the nodes; otherwise second order in the node spacing.
 *
 * @param wavelengthsNm  increasing, at least two
 * @param responses      photons counted per photon, same length
 * @throws {OutOfDomainError} if the table is shorter than two rows, of unequal lengths or not increasing
 */
export function photonRateThroughResponsePerM2(
  magnitudeAb: number,
  wavelengthsNm: ArrayLike<number>,
  responses: ArrayLike<number>,
): number {
  let integral = 0;
  forEachInterval(wavelengthsNm, responses, (lowNm, highNm, lowResponse, highResponse) => {
    integral += (Math.log(highNm / lowNm) * (lowResponse + highResponse)) / 2;
  });
  return AB_ZERO_PHOTONS_PER_M2_S * 10 ** (-0.4 * magnitudeAb) * integral;
}

function forEachInterval(
  wavelengthsNm: ArrayLike<number>,
  responses: ArrayLike<number>,
  visit: (lowNm: number, highNm: number, lowResponse: number, highResponse: number) => void,
): void {
  requirePositive('wavelengthsNm.length - 1', wavelengthsNm.length - 1);
  requirePositive('responses.length === wavelengthsNm.length', responses.length === wavelengthsNm.length ? 1 : 0);
  for (let i = 1; i < wavelengthsNm.length; i++) {
    const lowNm = wavelengthsNm[i - 1] ?? NaN;
    const highNm = wavelengthsNm[i] ?? NaN;
    requireOrdered(`wavelengthsNm[${i - 1}]`, lowNm, `wavelengthsNm[${i}]`, highNm);
    visit(lowNm, highNm, responses[i - 1] ?? NaN, responses[i] ?? NaN);
  }
}

/**
 * Photons s⁻¹ m⁻² of an emission line: F λ / (h c).
 *
 * @param lineFluxErgSCm2  integrated flux, erg s⁻¹ cm⁻²
 * @param wavelengthNm     observed wavelength in vacuum
 */
export function photonRateOfLinePerM2(lineFluxErgSCm2: number, wavelengthNm: number): number {
  requirePositive('wavelengthNm', wavelengthNm);
  return (lineFluxErgSCm2 * 1e-3 * wavelengthNm * 1e-9) / (PLANCK_CONSTANT.value * SPEED_OF_LIGHT.value);
}

/** Pivot wavelength of a box band for photon counting: λ_p² = ∫λ dλ / ∫dλ/λ = (λ₂² − λ₁²) / (2 ln(λ₂/λ₁)). */
export function pivotWavelengthOfBoxNm(wavelengthLowNm: number, wavelengthHighNm: number): number {
  requireOrdered('wavelengthLowNm', wavelengthLowNm, 'wavelengthHighNm', wavelengthHighNm);
  return Math.sqrt((wavelengthHighNm ** 2 - wavelengthLowNm ** 2) / (2 * Math.log(wavelengthHighNm / wavelengthLowNm)));
}

/**
 * Wavelength at which half of a flat-f_ν source's photons in a box band lie bluer: √(λ₁ λ₂).
 *
 * It is the natural reference for photon counting, because photons of a flat spectrum are uniform in ln λ.
 */
export function logMiddleOfBoxNm(wavelengthLowNm: number, wavelengthHighNm: number): number {
  return Math.sqrt(wavelengthLowNm * wavelengthHighNm);
}

/**
 * AB magnitude averaged over a box band, minus the AB magnitude at one wavelength, for f_λ ∝ λ^β.
 *
 * The photon-counting average is ∫ f_ν dλ/λ / ∫ dλ/λ with f_ν ∝ λ^(2+β), in closed form. Exactly 0 for β = −2.
 *
 * @param slopeBeta      β of f_λ ∝ λ^β
 * @param referenceNm    wavelength the magnitude is known at, in the same frame as the band
 */
export function powerLawColourMag(
  slopeBeta: number,
  referenceNm: number,
  wavelengthLowNm: number,
  wavelengthHighNm: number,
): number {
  const exponent = 2 + slopeBeta;
  if (exponent === 0) return 0;
  const logMiddle = 0.5 * Math.log((wavelengthLowNm * wavelengthHighNm) / (referenceNm * referenceNm));
  const halfWidth = 0.5 * Math.log(wavelengthHighNm / wavelengthLowNm);
  const curvature = exponent * halfWidth;
  // sinh(x)/x is 1 to rounding below 1e-8, where the quotient would lose digits.
  const widthTerm = Math.abs(curvature) < 1e-8 ? 0 : Math.log(Math.sinh(curvature) / curvature);
  return (-2.5 / Math.LN10) * (exponent * logMiddle + widthTerm);
}
