export { estimate } from './estimate.js';
export {
  COSMIC_RAY_MINIMUM_COUNT,
  DITHER_MINIMUM_COUNT,
  ENGINE_VERSION,
  MAXIMUM_EXPOSURE_COUNT,
  OPTIMUM_RADIUS_OVER_FWHM,
  READ_NOISE_COST,
  SATURATION_FRACTION,
  SEMESTER_NIGHT_SECONDS,
  THIN_CLOUD,
} from './constants.js';
export { STEP_TEXTS } from './light-budget.js';
export type * from './types.js';
export { OutOfDomainError } from '@faintward/photometry';
export {
  collectingAreaM2,
  effectivePixelCount,
  exposureCountFor,
  limitingMagnitude,
  noiseVariance,
  openShutterSecondsFor,
  readNoiseBoundSeconds,
  readVariance,
  signalToNoise,
  sourceRateFor,
  wholeExposures,
} from './ccd-equation.js';
export type { NoiseBudget } from './ccd-equation.js';
export {
  GAUSSIAN_NOISE_EQUIVALENT_AREA_OVER_FWHM2,
  GAUSSIAN_SIGMA_OVER_FWHM,
  gaussianEncircledFraction,
  gaussianPeakPixelFraction,
  gaussianRectangleFraction,
  gaussianSlitFraction,
  moffatAlphaOverFwhm,
  moffatEncircledFraction,
  moffatNoiseEquivalentAreaOverFwhm2,
  moffatSlitFraction,
  optimumRadiusOverFwhm,
} from './point-spread.js';
export { tabulatedDistances } from './distances.js';
export { deliveredSeeing } from './seeing.js';
export type { DeliveredSeeing } from './seeing.js';
export { bestApertureRadiusArcsec, enclosedFractionAfterSeeing } from './sersic-image.js';
