import { ARCSEC_PER_RADIAN, KOLMOGOROV_FWHM_COEFFICIENT } from './constants.js';

/** The outer-scale formula is a fit for L0 well above r0; the argument of its root is not let below this. */
const LOWEST_ROOT_ARGUMENT = 0.05;

/** Below this L0/r0 the outer-scale formula has not been tested. */
export const TESTED_OUTER_SCALE_RATIO = 20;

export interface DeliveredSeeing {
  /** Kolmogorov turbulence: ε_500 (λ/500 nm)^−0.2 X^0.6. */
  kolmogorovFwhmArcsec: number;
  /** r0 at the wavelength and airmass of the observation. */
  friedParameterM: number;
  /** With the outer scale, if there is one; without the instrument. */
  atmosphereFwhmArcsec: number;
  /** With the image quality of telescope and instrument in quadrature. */
  deliveredFwhmArcsec: number;
}

/**
 * FWHM of a long exposure's point source from the zenith seeing at 500 nm.
 *
 * Kolmogorov: ε(λ, X) = ε_500 (λ/500 nm)^−0.2 X^0.6. With an outer scale L0: FWHM ≈ ε √[1 − 2.183 (r0/L0)^0.356], a
 * few per cent for L0/r0 > 20. Image quality adds in quadrature, exact for Gaussians only.
 *
 * @param zenithSeeingArcsec        at 500 nm, infinite outer scale, > 0
 * @param outerScaleM               L0; absent for infinite
 * @param imageQualityFwhmArcsec    blur by telescope and instrument, ≥ 0
 * @see Fried 1966, JOSA 56, 1372; Tokovinin 2002, PASP 114, 1156, eq. 19; tested by Martinez et al. 2010, A&A 516, A90
 */
export function deliveredSeeing(
  zenithSeeingArcsec: number,
  wavelengthNm: number,
  airmass: number,
  outerScaleM?: number,
  imageQualityFwhmArcsec = 0,
): DeliveredSeeing {
  const kolmogorovFwhmArcsec = zenithSeeingArcsec * (wavelengthNm / 500) ** -0.2 * airmass ** 0.6;
  const friedParameterM =
    (KOLMOGOROV_FWHM_COEFFICIENT.value * wavelengthNm * 1e-9 * ARCSEC_PER_RADIAN) / kolmogorovFwhmArcsec;
  const atmosphereFwhmArcsec =
    outerScaleM === undefined
      ? kolmogorovFwhmArcsec
      : kolmogorovFwhmArcsec *
        Math.sqrt(Math.max(LOWEST_ROOT_ARGUMENT, 1 - 2.183 * (friedParameterM / outerScaleM) ** 0.356));
  return {
    kolmogorovFwhmArcsec,
    friedParameterM,
    atmosphereFwhmArcsec,
    deliveredFwhmArcsec: Math.hypot(atmosphereFwhmArcsec, imageQualityFwhmArcsec),
  };
}
