import { SPEED_OF_LIGHT_KM_S } from './constants.js';
import { OutOfDomainError, requirePositive, requireRedshift } from './domain.js';

/** A published formula of the refractive index of air. */
export type AirFormula = 'ciddor1996' | 'morton1991' | 'morton2000';

/** Shortest vacuum wavelength for which the refractivity fits are used: below, air absorbs and the fits were not made. */
export const SHORTEST_AIR_WAVELENGTH_NM = 200;

/** n − 1 = base + Σ strength / (resonance − σ²), σ = 1/λ_vacuum in µm⁻¹. */
const REFRACTIVITY: Record<
  AirFormula,
  { base: number; terms: readonly (readonly [number, number])[]; reference: string }
> = {
  ciddor1996: {
    base: 0,
    terms: [
      [0.05792105, 238.0185],
      [0.00167917, 57.362],
    ],
    reference: 'Ciddor 1996, Applied Optics 35, 1566: standard air, 15 °C, 101 325 Pa, 450 ppm CO2',
  },
  morton1991: {
    base: 6.4328e-5,
    terms: [
      [2.94981e-2, 146],
      [2.554e-4, 41],
    ],
    reference: 'Morton 1991, ApJS 77, 119 (the form of Edlén 1953)',
  },
  morton2000: {
    base: 8.34254e-5,
    terms: [
      [2.406147e-2, 130],
      [1.5998e-4, 38.9],
    ],
    reference: 'Morton 2000, ApJS 130, 403 (the form of Birch & Downs 1994)',
  },
};

/**
 * Refractive index of standard air at a vacuum wavelength.
 *
 * Valid from 200 nm; the fits were made up to 1.7 µm and stay smooth beyond. The three formulas agree to 1e-8 in n
 * in the visible.
 *
 * @throws {OutOfDomainError} below 200 nm
 */
export function refractiveIndexOfAir(vacuumWavelengthNm: number, formula: AirFormula = 'ciddor1996'): number {
  if (!(vacuumWavelengthNm >= SHORTEST_AIR_WAVELENGTH_NM) || !Number.isFinite(vacuumWavelengthNm)) {
    throw new OutOfDomainError('vacuumWavelengthNm', vacuumWavelengthNm, `${SHORTEST_AIR_WAVELENGTH_NM} or longer`);
  }
  const { base, terms } = REFRACTIVITY[formula];
  const sigma2 = (1000 / vacuumWavelengthNm) ** 2;
  let index = 1 + base;
  for (const [strength, resonance] of terms) index += strength / (resonance - sigma2);
  return index;
}

/** Wavelength in standard air of a vacuum wavelength. */
export function airFromVacuumNm(vacuumWavelengthNm: number, formula: AirFormula = 'ciddor1996'): number {
  return vacuumWavelengthNm / refractiveIndexOfAir(vacuumWavelengthNm, formula);
}

/**
 * Vacuum wavelength of a wavelength in standard air, by iterating λ = λ_air n(λ).
 *
 * Each round shrinks the error by about 1e-5, so four reach rounding.
 */
export function vacuumFromAirNm(airWavelengthNm: number, formula: AirFormula = 'ciddor1996'): number {
  requirePositive('airWavelengthNm', airWavelengthNm);
  let vacuumNm = airWavelengthNm * 1.0003;
  for (let round = 0; round < 5; round++) vacuumNm = airWavelengthNm * refractiveIndexOfAir(vacuumNm, formula);
  return vacuumNm;
}

/** Observed wavelength of a rest wavelength, both in vacuum: λ (1 + z). */
export function observedWavelengthNm(restWavelengthNm: number, redshift: number): number {
  requireRedshift(redshift);
  return restWavelengthNm * (1 + redshift);
}

/** Redshift at which a rest wavelength is observed at another, both in vacuum. Negative for a blueshift. */
export function redshiftOfObservedWavelength(restWavelengthNm: number, observedNm: number): number {
  requirePositive('restWavelengthNm', restWavelengthNm);
  return observedNm / restWavelengthNm - 1;
}

/** Difference in observed redshift of two sources at one distance with a rest-frame velocity difference, first order in v/c. */
export function redshiftDifferenceOfVelocity(velocityKmS: number, redshift: number): number {
  return (velocityKmS / SPEED_OF_LIGHT_KM_S) * (1 + redshift);
}

/** FWHM in km/s of a resolution element: c / R. */
export function resolutionFwhmKmS(resolvingPower: number): number {
  requirePositive('resolvingPower', resolvingPower);
  return SPEED_OF_LIGHT_KM_S / resolvingPower;
}

/** σ of a Gaussian of the given FWHM. */
export function gaussianSigmaFromFwhm(fwhm: number): number {
  return fwhm / (2 * Math.sqrt(2 * Math.LN2));
}

/**
 * v/c of a source whose Doppler shift alone makes the redshift, special relativity, motion along the line of sight:
 * ((1+z)² − 1) / ((1+z)² + 1). For peculiar velocities only; a cosmological redshift is not a velocity.
 */
export function velocityFractionOfDopplerRedshift(redshift: number): number {
  const square = (1 + redshift) ** 2;
  return (square - 1) / (square + 1);
}
