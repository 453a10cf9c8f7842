/** Heat of telescope and sky, which matters from 2 µm on. */
import { AB_ZERO_PHOTONS_PER_M2_S, BOLTZMANN_CONSTANT, PLANCK_CONSTANT, SPEED_OF_LIGHT } from '@faintward/photometry';
import { ARCSEC_PER_RADIAN } from '../constants.js';
import { magOfLight, requireBetween } from './check.js';

const ZERO_CELSIUS_K = 273.15;
const ARCSEC2_STERADIAN = 1 / ARCSEC_PER_RADIAN ** 2;

/** One warm layer in the beam. */
export interface ThermalSource {
  /** 1 − reflectance of mirrors together, or 1 − transmission of the air; 0 to 1. */
  readonly emissivity: number;
  readonly temperatureCelsius: number;
}

/** Emissivities by common practice, for planning where nothing is measured. */
export const USUAL_EMISSIVITY = {
  /** Three clean mirrors and their surroundings. */
  telescope: 0.15,
  /** The air in the middle of the K window, at the zenith; near 1 at its edges. */
  skyInK: 0.05,
} as const;

/**
 * Heat of one layer as photons s⁻¹ m⁻² arcsec⁻² nm⁻¹: ε B_λ(T) λ/(hc), B_λ(T) λ/(hc) = 2c λ⁻⁴ / (e^(hc/λkT) − 1).
 *
 * Exact for a grey body. At 2.15 µm and 5 °C it grows by 0.094 mag per degree; a K sky, of which airglow is a part, was found
 * to grow by 0.08 (Sánchez et al. 2008, arXiv:0809.4988).
 *
 * @param wavelengthNm  800 to 30,000
 */
export function thermalPhotonRate({ emissivity, temperatureCelsius }: ThermalSource, wavelengthNm: number): number {
  requireBetween('emissivity', emissivity, 0, 1);
  requireBetween('temperatureCelsius', temperatureCelsius, -100, 60, '°C');
  requireBetween('wavelengthNm', wavelengthNm, 800, 30_000, 'nm');
  const wavelengthM = wavelengthNm * 1e-9;
  const exponent =
    (PLANCK_CONSTANT.value * SPEED_OF_LIGHT.value) /
    (wavelengthM * BOLTZMANN_CONSTANT.value * (temperatureCelsius + ZERO_CELSIUS_K));
  const perMetrePerSteradian = (2 * SPEED_OF_LIGHT.value) / wavelengthM ** 4 / Math.expm1(exponent);
  return emissivity * perMetrePerSteradian * ARCSEC2_STERADIAN * 1e-9;
}

/** The same as AB mag/arcsec², of all layers together; `null` without any emissivity. */
export function thermalAbMag(layers: readonly ThermalSource[], wavelengthNm: number): number | null {
  const photonsPerNm = layers.reduce((sum, layer) => sum + thermalPhotonRate(layer, wavelengthNm), 0);
  return magOfLight((photonsPerNm * wavelengthNm) / AB_ZERO_PHOTONS_PER_M2_S);
}
