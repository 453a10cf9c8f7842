/** How long each exposure is, how many there are, and what the night pays besides. */
import {
  effectivePixelCount,
  exposureCountFor,
  openShutterSecondsFor,
  readNoiseBoundSeconds,
  readVariance,
  wholeExposures,
  type NoiseBudget,
} from './ccd-equation.js';
import { DITHER_MINIMUM_COUNT, READ_NOISE_COST, SATURATION_FRACTION } from './constants.js';
import type {
  Aperture,
  ElectronRates,
  ExposureBound,
  InfeasibleReason,
  InstrumentMode,
  Overhead,
  Overheads,
  SkySubtraction,
} from './types.js';

export interface ExposureSeries {
  exposureSeconds: number;
  exposureCount: number;
}

/** Rounds of N ← N(sky penalty of N); each shrinks the error by about N, and N is at least 2. */
const SKY_PENALTY_ROUNDS = 60;

/**
 * The noise of the sum as a function of how many exposures there are: with sky from the series itself, few exposures know
 * the sky badly.
 */
export function noiseBudgetOf(
  rates: ElectronRates,
  aperture: Aperture,
  mode: InstrumentMode,
): (exposureCount: number) => NoiseBudget {
  const { detector } = mode;
  const readVarianceElectrons2 = readVariance(detector.readNoiseElectrons, detector.gainElectronsPerAdu);
  return (exposureCount) => {
    const pixels = aperture.pixelCount * skyPenalty(mode.skySubtraction, aperture.pixelCount, exposureCount);
    return {
      sourceElectronsPerSecond: rates.sourceElectronsPerSecond,
      // The continuum under a line is noise, but the sky's uncertainty does not multiply it.
      backgroundElectronsPerSecondPerPixel:
        rates.skyElectronsPerSecondPerPixel +
        detector.darkElectronsPerSecond +
        rates.continuumElectronsPerSecond / pixels,
      readVarianceElectrons2,
      effectivePixelCount: pixels,
    };
  };
}

function skyPenalty(sky: SkySubtraction | undefined, pixelCount: number, exposureCount: number): number {
  switch (sky?.kind) {
    case undefined:
    case 'wideArea':
      return 1;
    case 'annulus':
      return effectivePixelCount(pixelCount, pixelCount * sky.backgroundPixelRatio) / pixelCount;
    case 'ditheredFrames':
      return 1 + 1 / (Math.max(2, exposureCount) - 1);
  }
}

/** Fewest exposures the mode takes. */
export function fewestExposures(mode: InstrumentMode): number {
  const fewest = mode.minimumExposureCount ?? 1;
  return mode.skySubtraction?.kind === 'ditheredFrames' ? Math.max(fewest, DITHER_MINIMUM_COUNT.value) : fewest;
}

/** Real number of exposures of a given length for a S/N, with the sky penalty that this number brings. */
export function realExposureCount(
  budgetOf: (exposureCount: number) => NoiseBudget,
  wantedSignalToNoise: number,
  exposureSeconds: number,
): number {
  let count = exposureCountFor(budgetOf(Infinity), wantedSignalToNoise, exposureSeconds);
  for (let round = 0; round < SKY_PENALTY_ROUNDS; round++) {
    const next = exposureCountFor(budgetOf(count), wantedSignalToNoise, exposureSeconds);
    if (Math.abs(next - count) <= 1e-13 * next) return next;
    count = next;
  }
  return count;
}

/** Shortest exposure that would overfill the brightest pixel. */
export function saturationSeconds(rates: ElectronRates, mode: InstrumentMode): number {
  return (SATURATION_FRACTION.value * mode.detector.fullWellElectrons) / rates.peakElectronsPerSecondPerPixel;
}

export function exposureBounds(rates: ElectronRates, mode: InstrumentMode): ExposureBound[] {
  const { detector, exposureLimits } = mode;
  const saturation = saturationSeconds(rates, mode);
  const readNoise = readNoiseBoundSeconds(
    readVariance(detector.readNoiseElectrons, detector.gainElectronsPerAdu),
    rates.skyElectronsPerSecondPerPixel + detector.darkElectronsPerSecond,
    READ_NOISE_COST.value,
  );
  return [
    {
      id: 'saturation',
      side: 'upper',
      seconds: Number.isFinite(saturation) ? saturation : null,
      reason: `The brightest pixel reaches ${100 * SATURATION_FRACTION.value} % of the full well.`,
    },
    {
      id: 'maximumExposure',
      side: 'upper',
      seconds: exposureLimits.maximumExposureSeconds,
      reason: 'Cosmic rays, the changing sky or guiding: longest exposure of this mode.',
    },
    {
      id: 'readNoise',
      side: 'lower',
      seconds: Number.isFinite(readNoise) ? readNoise : null,
      reason: `Below, read noise costs more than ${100 * READ_NOISE_COST.value} % of the S/N against the background.`,
    },
    {
      id: 'minimumExposure',
      side: 'lower',
      seconds: exposureLimits.minimumExposureSeconds,
      reason: 'Shutter and electronics: shortest exposure of this mode.',
    },
  ];
}

/**
 * The series that reaches a S/N with the least reading-out: exposures as long as saturation and the mode allow, then all
 * made equal and just long enough. With a given length, only their number is free.
 *
 * `exposureCount` may exceed any limit (it is Infinity when the rate is too small for arithmetic); the caller decides.
 */
export function seriesFor(
  budgetOf: (exposureCount: number) => NoiseBudget,
  wantedSignalToNoise: number,
  longestSeconds: number,
  mode: InstrumentMode,
  givenExposureSeconds: number | undefined,
): ExposureSeries {
  const fewest = fewestExposures(mode);
  const lengthSeconds = givenExposureSeconds ?? longestSeconds;
  const exposureCount = Math.max(
    fewest,
    wholeExposures(realExposureCount(budgetOf, wantedSignalToNoise, lengthSeconds)),
  );
  if (givenExposureSeconds !== undefined || !Number.isFinite(exposureCount)) {
    return { exposureSeconds: lengthSeconds, exposureCount };
  }
  const openShutterSeconds = openShutterSecondsFor(budgetOf(exposureCount), wantedSignalToNoise, exposureCount);
  // Rounding the count in our favour may leave the length one part in 1e9 above the limit.
  const exposureSeconds = Math.min(
    longestSeconds,
    Math.max(mode.exposureLimits.minimumExposureSeconds, openShutterSeconds / exposureCount),
  );
  return { exposureSeconds, exposureCount };
}

/**
 * S/N when a fraction f of the signal is uncertain however long one looks: 1/SN² = 1/SN_statistical² + f².
 */
export function withSystematicError(statisticalSignalToNoise: number, fraction: number): number {
  if (fraction === 0 || statisticalSignalToNoise === 0) return statisticalSignalToNoise;
  return 1 / Math.sqrt(1 / statisticalSignalToNoise ** 2 + fraction ** 2);
}

/** Statistical S/N needed for a total S/N; a reason when the systematic error alone forbids it. */
export function statisticalSignalToNoiseFor(wanted: number, fraction: number): number | InfeasibleReason {
  if (fraction === 0) return wanted;
  const left = 1 / wanted ** 2 - fraction ** 2;
  if (left > 0) return 1 / Math.sqrt(left);
  return {
    code: 'signalToNoiseUnreachable',
    message: `A systematic error of ${100 * fraction} % limits the S/N to ${(1 / fraction).toFixed(1)}, however long the exposure.`,
  };
}

/**
 * What the night pays besides open shutter. Acquisition repeats whenever a block of exposures is full; an exposure longer
 * than a block is a block of its own.
 */
export function overheadsOf(series: ExposureSeries, overheads: Overheads): Overhead[] {
  const { acquisitionSeconds, setupSeconds, readoutSeconds, ditherSeconds, maximumBlockSeconds } = overheads;
  const { exposureSeconds, exposureCount } = series;
  const cycleSeconds = exposureSeconds + readoutSeconds + ditherSeconds;
  const exposuresPerBlock = Math.max(1, Math.floor((maximumBlockSeconds / cycleSeconds) * (1 + 1e-9)));
  const blockCount = Math.ceil(exposureCount / exposuresPerBlock);
  return [
    { id: 'acquisition', title: 'Acquisition', seconds: blockCount * acquisitionSeconds, count: blockCount },
    { id: 'setup', title: 'Set-up', seconds: setupSeconds, count: 1 },
    { id: 'readout', title: 'Read-out', seconds: exposureCount * readoutSeconds, count: exposureCount },
    { id: 'dither', title: 'Dither', seconds: exposureCount * ditherSeconds, count: exposureCount },
  ];
}
