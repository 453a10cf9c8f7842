import { DIGITISATION_ERROR_ADU } from './constants.js';

/** What the CCD equation needs, in electrons. Rates are per second, of the background per pixel. */
export interface NoiseBudget {
  /** Electrons per second of the source in the aperture. */
  sourceElectronsPerSecond: number;
  /** Sky, dark and any other unwanted light, per pixel. */
  backgroundElectronsPerSecondPerPixel: number;
  /** Read noise variance per pixel and exposure, e⁻². See {@link readVariance}. */
  readVarianceElectrons2: number;
  /** Pixels in the aperture times the penalty of an uncertain sky. See {@link effectivePixelCount}. */
  effectivePixelCount: number;
}

/** n_pix (1 + n_pix/n_B): pixels in the aperture, with the noise of a sky taken from n_B pixels. */
export function effectivePixelCount(pixelCount: number, backgroundPixelCount = Infinity): number {
  return pixelCount * (1 + pixelCount / backgroundPixelCount);
}

/** Read noise variance with the error of digitisation: N_R² + (G σ_f)². */
export function readVariance(
  readNoiseElectrons: number,
  gainElectronsPerAdu = 0,
  digitisationErrorAdu: number = DIGITISATION_ERROR_ADU.value,
): number {
  return readNoiseElectrons ** 2 + (gainElectronsPerAdu * digitisationErrorAdu) ** 2;
}

/**
 * Variance of the counted signal in e⁻²: R T + n [B T + N N_R²].
 *
 * @param openShutterSeconds  total over all exposures
 * @param exposureCount       the read noise counts so often
 * @see Merline & Howell 1995, Experimental Astronomy 6, 163; Howell, Handbook of CCD Astronomy, 2nd ed., section 4.4
 */
export function noiseVariance(budget: NoiseBudget, openShutterSeconds: number, exposureCount: number): number {
  return (
    budget.sourceElectronsPerSecond * openShutterSeconds +
    budget.effectivePixelCount *
      (budget.backgroundElectronsPerSecondPerPixel * openShutterSeconds + exposureCount * budget.readVarianceElectrons2)
  );
}

/**
 * Signal-to-noise ratio of `exposureCount` equal exposures of `openShutterSeconds` in total.
 *
 * Poisson noise of source, sky and dark current, Gaussian read noise; no flat-field or calibration error. 0 when there
 * is neither signal nor noise.
 */
export function signalToNoise(budget: NoiseBudget, openShutterSeconds: number, exposureCount: number): number {
  const signal = budget.sourceElectronsPerSecond * openShutterSeconds;
  if (signal === 0) return 0;
  return signal / Math.sqrt(noiseVariance(budget, openShutterSeconds, exposureCount));
}

/**
 * Open-shutter time that reaches a signal-to-noise ratio in a fixed number of exposures: the positive root of
 * R² T² − s² (R + n B) T − s² n N N_R² = 0.
 *
 * @returns seconds over all exposures; 0 for s = 0; Infinity when the source rate is 0 (callers answer that in words)
 */
export function openShutterSecondsFor(budget: NoiseBudget, wantedSignalToNoise: number, exposureCount: number): number {
  const s2 = wantedSignalToNoise * wantedSignalToNoise;
  if (s2 === 0) return 0;
  const r = budget.sourceElectronsPerSecond;
  const linear = s2 * (r + budget.effectivePixelCount * budget.backgroundElectronsPerSecondPerPixel);
  const constant = s2 * budget.effectivePixelCount * exposureCount * budget.readVarianceElectrons2;
  return (linear + Math.sqrt(linear * linear + 4 * r * r * constant)) / (2 * r * r);
}

/**
 * Number of exposures of a given length that reach a signal-to-noise ratio, before rounding up:
 * s² [R + n B + n N_R²/t] / (R² t).
 */
export function exposureCountFor(budget: NoiseBudget, wantedSignalToNoise: number, exposureSeconds: number): number {
  const s2 = wantedSignalToNoise * wantedSignalToNoise;
  const r = budget.sourceElectronsPerSecond;
  const noisePerSecond =
    r +
    budget.effectivePixelCount *
      (budget.backgroundElectronsPerSecondPerPixel + budget.readVarianceElectrons2 / exposureSeconds);
  return (s2 * noisePerSecond) / (r * r * exposureSeconds);
}

/**
 * Rounds a real number of exposures up, at least to 1. A value that exceeds a whole number by less than 1e-9 of itself
 * is that number: rounding in the last digits must not cost an exposure.
 */
export function wholeExposures(exposureCount: number): number {
  return Math.max(1, Math.ceil(exposureCount * (1 - 1e-9)));
}

/**
 * Source rate that gives a signal-to-noise ratio in a given time, e⁻/s: the positive root of
 * (R T)² − s² R T − s² V = 0 with the background variance V.
 */
export function sourceRateFor(
  budget: Omit<NoiseBudget, 'sourceElectronsPerSecond'>,
  wantedSignalToNoise: number,
  openShutterSeconds: number,
  exposureCount: number,
): number {
  const s2 = wantedSignalToNoise * wantedSignalToNoise;
  const background = noiseVariance({ ...budget, sourceElectronsPerSecond: 0 }, openShutterSeconds, exposureCount);
  return (s2 + Math.sqrt(s2 * s2 + 4 * s2 * background)) / 2 / openShutterSeconds;
}

/**
 * Magnitude at which a source of known magnitude and rate would just reach a signal-to-noise ratio.
 *
 * @param magnitudeAb                 of a source with the rate in `budget`
 */
export function limitingMagnitude(
  magnitudeAb: number,
  budget: NoiseBudget,
  wantedSignalToNoise: number,
  openShutterSeconds: number,
  exposureCount: number,
): number {
  const rate = sourceRateFor(budget, wantedSignalToNoise, openShutterSeconds, exposureCount);
  return magnitudeAb - 2.5 * Math.log10(rate / budget.sourceElectronsPerSecond);
}

/**
 * Shortest exposure for which read noise costs less than the part `cost` of the S/N of a background-limited
 * observation: B t ≥ N_R² / [(1 + p)² − 1].
 *
 * @returns seconds; Infinity without background
 */
export function readNoiseBoundSeconds(
  readVarianceElectrons2: number,
  backgroundElectronsPerSecondPerPixel: number,
  cost: number,
): number {
  return readVarianceElectrons2 / ((1 + cost) ** 2 - 1) / backgroundElectronsPerSecondPerPixel;
}

/** Collecting area of a round mirror with a round hole, m²: (π/4)(D² − d²). */
export function collectingAreaM2(diameterM: number, obstructionDiameterM: number): number {
  return (Math.PI / 4) * (diameterM ** 2 - obstructionDiameterM ** 2);
}
