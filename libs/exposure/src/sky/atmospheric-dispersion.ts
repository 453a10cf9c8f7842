/** The atmosphere as a weak prism: images at different wavelengths lie apart along the vertical. */
import { ARCSEC_PER_RADIAN } from '../constants.js';
import { requireBetween } from './check.js';

const HPA_PER_MMHG = 1013.25 / 760;

export interface AirState {
  /** At the telescope; not reduced to sea level. */
  readonly pressureHpa: number;
  readonly temperatureCelsius: number;
  /** Partial pressure of water vapour; 0 for dry air. {@link waterVapourHpa} makes it from humidity. */
  readonly waterVapourHpa: number;
}

/**
 * Partial pressure of water vapour from relative humidity over water, hPa: Magnus' form, good to 0.5 % from −40 to 50 °C.
 *
 * @see WMO Guide to Instruments and Methods of Observation, annex 4.B (from memory)
 */
export function waterVapourHpa(relativeHumidity: number, temperatureCelsius: number): number {
  requireBetween('relativeHumidity', relativeHumidity, 0, 1);
  requireBetween('temperatureCelsius', temperatureCelsius, -60, 60, '°C');
  return relativeHumidity * 6.112 * Math.exp((17.62 * temperatureCelsius) / (243.12 + temperatureCelsius));
}

/** Air bends light of this wavelength and longer as the formula says; shorter, it absorbs. */
const LOW_NM = 300;
/** Fitted in the visible and smooth beyond; by then dispersion has all but ended. */
const HIGH_NM = 2500;

/**
 * (n − 1) 10⁶ of moist air.
 *
 *   64.328 + 29498.1/(146 − σ²) + 255.4/(41 − σ²), σ = 1/λ in µm⁻¹, at 15 °C and 760 mmHg,
 *   × P [1 + (1.049 − 0.0157 T) 10⁻⁶ P] / [720.883 (1 + 0.003661 T)] − f (0.0624 − 0.000680 σ²)/(1 + 0.003661 T)
 *
 * P and f in mmHg, T in °C. Good to some 1e-8 in n in the visible, 5e-8 in the near infrared, where water has bands of
 * its own.
 *
 * @param wavelengthNm  in vacuum, 300 to 2500
 * @throws {OutOfDomainError}
 * @see Filippenko 1982, PASP 94, 715
 */
export function refractivityPpm(wavelengthNm: number, air: AirState): number {
  requireBetween('wavelengthNm', wavelengthNm, LOW_NM, HIGH_NM, 'nm');
  requireBetween('air.pressureHpa', air.pressureHpa, 0, 1100, 'hPa');
  requireBetween('air.temperatureCelsius', air.temperatureCelsius, -60, 60, '°C');
  requireBetween('air.waterVapourHpa', air.waterVapourHpa, 0, 100, 'hPa');
  const sigma2 = (1000 / wavelengthNm) ** 2;
  const pressure = air.pressureHpa / HPA_PER_MMHG;
  const celsius = air.temperatureCelsius;
  const expansion = 1 + 0.003661 * celsius;
  const standard = 64.328 + 29498.1 / (146 - sigma2) + 255.4 / (41 - sigma2);
  const density = (pressure * (1 + (1.049 - 0.0157 * celsius) * 1e-6 * pressure)) / (720.883 * expansion);
  const water = ((air.waterVapourHpa / HPA_PER_MMHG) * (0.0624 - 0.00068 * sigma2)) / expansion;
  return standard * density - water;
}

/** Lowest look that the flat atmosphere of the shift is used for: airmass 6, some 10° above the horizon. */
const HIGHEST_AIRMASS = 6;

/**
 * How far the image at a wavelength lies above that at a reference wavelength, arcsec towards the zenith: blue is above red.
 *
 *   206265 [n(λ) − n(λ_ref)] tan z, tan z = √(X² − 1)
 *
 * Flat atmosphere: 1 % of the shift at airmass 3, some 5 % at 6. Exactly 0 at the zenith.
 *
 * @param airmass  1 to 6
 * @see Filippenko 1982, PASP 94, 715
 */
export function dispersionArcsec(wavelengthNm: number, referenceNm: number, airmass: number, air: AirState): number {
  requireBetween('airmass', airmass, 1, HIGHEST_AIRMASS);
  const difference = refractivityPpm(wavelengthNm, air) - refractivityPpm(referenceNm, air);
  return ARCSEC_PER_RADIAN * difference * 1e-6 * Math.sqrt(airmass * airmass - 1);
}
