import { AB_CONSTANT, JANSKY_CGS, PARSEC, SPEED_OF_LIGHT } from './constants.js';
import { requirePositive } from './domain.js';

/** Flux density of AB = 0 in jansky: 3630.78. */
export const AB_ZERO_FLUX_DENSITY_JY = 10 ** (-0.4 * AB_CONSTANT.value) / JANSKY_CGS.value;

/** Area of a sphere of 10 pc radius in cm², which ties absolute magnitudes to luminosities. */
const TEN_PARSEC_SPHERE_CM2 = 4 * Math.PI * (10 * PARSEC.value * 100) ** 2;

/**
 * Flux density of an AB magnitude, in erg s⁻¹ cm⁻² Hz⁻¹.
 *
 * Valid for any finite magnitude. Exact to rounding.
 *
 * @see Oke & Gunn 1983, ApJ 266, 713
 */
export function fluxDensityCgsFromAbMagnitude(magnitudeAb: number): number {
  return 10 ** (-0.4 * (magnitudeAb + AB_CONSTANT.value));
}

/** Flux density of an AB magnitude, in jansky. */
export function fluxDensityJyFromAbMagnitude(magnitudeAb: number): number {
  return fluxDensityCgsFromAbMagnitude(magnitudeAb) / JANSKY_CGS.value;
}

/**
 * AB magnitude of a flux density in erg s⁻¹ cm⁻² Hz⁻¹.
 *
 * @throws {OutOfDomainError} if the flux density is not positive and finite
 */
export function abMagnitudeFromFluxDensityCgs(fluxDensityCgs: number): number {
  requirePositive('fluxDensityCgs', fluxDensityCgs);
  return -2.5 * Math.log10(fluxDensityCgs) - AB_CONSTANT.value;
}

/**
 * AB magnitude of a flux density in jansky: 1 µJy is 23.9.
 *
 * @throws {OutOfDomainError} if the flux density is not positive and finite
 */
export function abMagnitudeFromFluxDensityJy(fluxDensityJy: number): number {
  requirePositive('fluxDensityJy', fluxDensityJy);
  return -2.5 * Math.log10(fluxDensityJy * JANSKY_CGS.value) - AB_CONSTANT.value;
}

/**
 * f_λ of an AB magnitude at a wavelength, in erg s⁻¹ cm⁻² Å⁻¹: f_λ = f_ν c / λ².
 *
 * @throws {OutOfDomainError} if the wavelength is not positive and finite
 */
export function fluxPerAngstromFromAbMagnitude(magnitudeAb: number, wavelengthNm: number): number {
  requirePositive('wavelengthNm', wavelengthNm);
  const wavelengthAngstrom = wavelengthNm * 10;
  return (fluxDensityCgsFromAbMagnitude(magnitudeAb) * SPEED_OF_LIGHT.value * 1e10) / wavelengthAngstrom ** 2;
}

/**
 * AB magnitude of an f_λ in erg s⁻¹ cm⁻² Å⁻¹ at a wavelength.
 *
 * @throws {OutOfDomainError} if flux or wavelength is not positive and finite
 */
export function abMagnitudeFromFluxPerAngstrom(fluxErgSCm2Angstrom: number, wavelengthNm: number): number {
  requirePositive('fluxErgSCm2Angstrom', fluxErgSCm2Angstrom);
  requirePositive('wavelengthNm', wavelengthNm);
  return abMagnitudeFromFluxDensityCgs(
    (fluxErgSCm2Angstrom * (wavelengthNm * 10) ** 2) / (SPEED_OF_LIGHT.value * 1e10),
  );
}

/** Luminosity per unit frequency, erg s⁻¹ Hz⁻¹, of an absolute AB magnitude (at the same rest wavelength). */
export function luminosityDensityFromAbsoluteMagnitude(absoluteMagnitudeAb: number): number {
  return TEN_PARSEC_SPHERE_CM2 * fluxDensityCgsFromAbMagnitude(absoluteMagnitudeAb);
}

/**
 * Absolute AB magnitude of a luminosity per unit frequency in erg s⁻¹ Hz⁻¹.
 *
 * @throws {OutOfDomainError} if the luminosity density is not positive and finite
 */
export function absoluteMagnitudeFromLuminosityDensity(luminosityErgSHz: number): number {
  requirePositive('luminosityErgSHz', luminosityErgSHz);
  return abMagnitudeFromFluxDensityCgs(luminosityErgSHz / TEN_PARSEC_SPHERE_CM2);
}

/** Error of a magnitude measured with a given signal-to-noise ratio, small-error limit: (2.5/ln 10) / (S/N). */
export function magnitudeErrorFromSignalToNoise(signalToNoise: number): number {
  requirePositive('signalToNoise', signalToNoise);
  return 2.5 / Math.LN10 / signalToNoise;
}
