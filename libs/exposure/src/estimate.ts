import { arrivingLight, circularisedRadius, meanEffectiveSurfaceBrightness } from '@faintward/photometry';
import { noiseVariance, signalToNoise } from './ccd-equation.js';
import { collect, type Collection, type Image } from './collection.js';
import {
  COSMIC_RAY_MINIMUM_COUNT,
  ENGINE_VERSION,
  MAXIMUM_EXPOSURE_COUNT,
  SEMESTER_NIGHT_SECONDS,
} from './constants.js';
import { targetDistance, type TargetDistance } from './distances.js';
import {
  exposureBounds,
  noiseBudgetOf,
  overheadsOf,
  saturationSeconds,
  seriesFor,
  statisticalSignalToNoiseFor,
  withSystematicError,
  type ExposureSeries,
} from './exposure-series.js';
import { LightBudget } from './light-budget.js';
import { TESTED_OUTER_SCALE_RATIO, deliveredSeeing } from './seeing.js';
import { countedRange } from './counted-range.js';
import type {
  Estimate,
  EstimateInput,
  EstimateWarning,
  ExposureBound,
  Goal,
  InfeasibleReason,
  NoiseKind,
  NoiseShares,
  SignalToNoisePer,
} from './types.js';
import { validateAngleOfKpc, validateInput } from './validate.js';

/** A source below this part of the sky is at the mercy of how well the sky is known. */
const FAR_BELOW_SKY = 1e-3;
const HIGH_AIRMASS = 2;
/** Single exposures shorter than this rarely meet a cosmic ray where it matters. */
const COSMIC_RAY_CONCERN_SECONDS = 60;
const NIGHT_SECONDS = 10 * 3600;
const LONG_REQUEST_NIGHTS = 3;

/**
 * From a target to exposures: how bright it arrives, how many electrons that makes, how long it takes.
 *
 * Pure: the same input and {@link ENGINE_VERSION} give the same answer. Apart from steps, formulas are named at their
 * functions. Left out: the sky's dependence on airmass and lunar distance, lines in the sky's spectrum.
 *
 * What cannot be reached is an answer (`outcome: 'infeasible'` with a reason), never NaN or Infinity.
 *
 * @throws {OutOfDomainError} if a field of the input cannot be computed with; `field` is its path
 */
export function estimate(input: EstimateInput): Estimate {
  validateInput(input);
  const { target, mode, site, conditions, goal } = input;
  const warnings: EstimateWarning[] = [];
  const budget = new LightBudget();

  const range = countedRange(target, mode, input.wavelengthNm);
  const wavelengthNm = 'code' in range ? Math.sqrt(mode.wavelengthLowNm * mode.wavelengthHighNm) : range.wavelengthNm;
  const seeing = deliveredSeeing(
    conditions.seeingArcsec ?? site.zenithSeeingArcsec,
    wavelengthNm,
    conditions.airmass,
    site.outerScaleM,
    mode.imageQualityFwhmArcsec,
  );
  const fwhmArcsec = seeing.deliveredFwhmArcsec;
  const basics = { engineVersion: ENGINE_VERSION, steps: budget.steps, warnings, fwhmArcsec, wavelengthNm };
  const infeasible = (reason: InfeasibleReason, apparentMagnitudeAb: number | null): Estimate => ({
    outcome: 'infeasible',
    reason,
    apparentMagnitudeAb,
    ...basics,
  });

  if ('code' in range) return infeasible(range, null);
  if (site.outerScaleM !== undefined && site.outerScaleM / seeing.friedParameterM < TESTED_OUTER_SCALE_RATIO) {
    warnings.push({
      code: 'outerScaleOutsideModel',
      message: 'The outer scale is less than 20 times the Fried parameter: the delivered seeing is uncertain.',
    });
  }
  if (conditions.airmass > HIGH_AIRMASS) {
    warnings.push({ code: 'highAirmass', message: 'Above airmass 2 extinction and seeing become uncertain.' });
  }

  let distance: TargetDistance | undefined;
  const distanceOf = (): TargetDistance => (distance ??= targetDistance(input.cosmology, target.redshift));
  const arriving = arrivingLight(target.light, target.redshift, input.cosmology, target.extent.kind === 'uniform');
  const noLight = arriving.addSteps(budget, range.response);
  if (noLight !== undefined) return infeasible(noLight, null);
  warnings.push(...arriving.cautions(range.response));
  const apparentMagnitudeAb = budget.totalMag;
  const continuumMag = arriving.kind === 'line' ? arriving.continuumMagnitudeAb() : undefined;

  const image = imageOf(input, distanceOf);
  const per = perOf(goal);
  const collection = collect(budget, input, range, continuumMag, image, fwhmArcsec, per, warnings);
  const { rates, aperture } = collection;
  const budgetOf = noiseBudgetOf(rates, aperture, mode);
  const systematicErrorFraction = mode.systematicErrorFraction ?? 0;

  const series = planSeries(input, collection, systematicErrorFraction);
  if ('code' in series) return infeasible(series, apparentMagnitudeAb);
  const { exposureSeconds, exposureCount } = series;
  const openShutterSeconds = exposureSeconds * exposureCount;
  const overheads = overheadsOf(series, mode.overheads);
  const totalSeconds = overheads.reduce((sum, each) => sum + each.seconds, openShutterSeconds);
  const longest = input.limits?.maximumTotalSeconds ?? SEMESTER_NIGHT_SECONDS.value;
  if (totalSeconds > longest) {
    return infeasible(
      {
        code: 'longerThanSemester',
        message: `It would take ${hours(totalSeconds)} h with overheads; at most ${hours(longest)} h can be asked for.`,
      },
      apparentMagnitudeAb,
    );
  }

  const noise = budgetOf(exposureCount);
  const statistical = signalToNoise(noise, openShutterSeconds, exposureCount);
  const variance = noiseVariance(noise, openShutterSeconds, exposureCount);
  const skyPixels = noise.effectivePixelCount;
  const noiseShares: NoiseShares = {
    source: ((rates.sourceElectronsPerSecond + rates.continuumElectronsPerSecond) * openShutterSeconds) / variance,
    sky: (skyPixels * rates.skyElectronsPerSecondPerPixel * openShutterSeconds) / variance,
    dark: (skyPixels * mode.detector.darkElectronsPerSecond * openShutterSeconds) / variance,
    readNoise: (skyPixels * exposureCount * noise.readVarianceElectrons2) / variance,
  };
  const bounds = exposureBounds(rates, mode);
  warnOfSeries(warnings, series, bounds, collection, totalSeconds);

  return {
    outcome: 'feasible',
    ...basics,
    signalToNoise: withSystematicError(statistical, systematicErrorFraction),
    signalToNoisePer: per,
    exposureSeconds,
    exposureCount,
    openShutterSeconds,
    overheads,
    totalSeconds,
    apparentMagnitudeAb,
    apertureMagnitudeAb: collection.apertureMagnitudeAb,
    surfaceBrightnessAbMagPerArcsec2: surfaceBrightnessOf(image, apparentMagnitudeAb),
    aperture,
    rates,
    peakElectronsPerPixel: rates.peakElectronsPerSecondPerPixel * exposureSeconds,
    limitedBy: largestShare(noiseShares),
    noiseShares,
    exposureBounds: bounds,
  };
}

function perOf(goal: Goal): SignalToNoisePer {
  return goal.kind === 'lineSignificance' ? 'aperture' : (goal.per ?? 'aperture');
}

/**
 * The source on the sky. An angle is taken as observed; a size in kpc is that of the source, and lensing stretches it by
 * √μ, because its solid angle grows by μ.
 */
function imageOf({ target }: EstimateInput, distanceOf: () => TargetDistance): Image {
  const { extent } = target;
  switch (extent.kind) {
    case 'point':
      return { kind: 'point' };
    case 'uniform':
      return { kind: 'uniform', areaArcsec2: extent.areaArcsec2 ?? 1 };
    case 'sersic': {
      const { halfLightRadiusArcsec, halfLightRadiusKpc = NaN } = extent;
      const radiusArcsec =
        halfLightRadiusArcsec ??
        (halfLightRadiusKpc / distanceOf().kpcPerArcsec) * Math.sqrt(target.light.magnification);
      if (halfLightRadiusArcsec === undefined) validateAngleOfKpc(halfLightRadiusKpc, radiusArcsec);
      return {
        kind: 'sersic',
        index: extent.index,
        circularisedRadiusArcsec: circularisedRadius(radiusArcsec, extent.axisRatio ?? 1),
      };
    }
  }
}

function surfaceBrightnessOf(image: Image, magnitudeAb: number): number | null {
  if (image.kind === 'point') return null;
  if (image.kind === 'uniform') return magnitudeAb;
  return meanEffectiveSurfaceBrightness(magnitudeAb, image.circularisedRadiusArcsec);
}

function planSeries(
  input: EstimateInput,
  { rates, aperture }: Collection,
  systematicErrorFraction: number,
): ExposureSeries | InfeasibleReason {
  const { mode, goal } = input;
  const { minimumExposureSeconds, maximumExposureSeconds } = mode.exposureLimits;
  const saturatesAtSeconds = saturationSeconds(rates, mode);
  if (saturatesAtSeconds < minimumExposureSeconds) {
    return {
      code: 'saturatesAtMinimumExposure',
      message: `The brightest pixel fills in ${inWords(saturatesAtSeconds)} s; the shortest exposure is ${minimumExposureSeconds} s.`,
    };
  }
  if (goal.exposureSeconds !== undefined && goal.exposureSeconds > saturatesAtSeconds) {
    return {
      code: 'exposureSaturates',
      message: `The brightest pixel fills in ${inWords(saturatesAtSeconds)} s: ask for shorter exposures than ${goal.exposureSeconds} s.`,
    };
  }
  if (goal.kind === 'exposureTime') {
    return { exposureSeconds: goal.exposureSeconds, exposureCount: goal.exposureCount };
  }
  const wanted = goal.kind === 'lineSignificance' ? goal.sigma : goal.value;
  const statistical = statisticalSignalToNoiseFor(wanted, systematicErrorFraction);
  if (typeof statistical !== 'number') return statistical;
  const series = seriesFor(
    noiseBudgetOf(rates, aperture, mode),
    statistical,
    Math.min(saturatesAtSeconds, maximumExposureSeconds),
    mode,
    goal.exposureSeconds,
  );
  const most = input.limits?.maximumExposureCount ?? MAXIMUM_EXPOSURE_COUNT.value;
  if (series.exposureCount > most) {
    const needed = Number.isFinite(series.exposureCount) ? inWords(series.exposureCount) : 'more than can be counted';
    return {
      code: 'tooManyExposures',
      message: `Exposures needed: ${needed}, of ${inWords(series.exposureSeconds)} s each; at most ${most} are allowed.`,
    };
  }
  return series;
}

function warnOfSeries(
  warnings: EstimateWarning[],
  { exposureSeconds, exposureCount }: ExposureSeries,
  bounds: readonly ExposureBound[],
  { rates }: Collection,
  totalSeconds: number,
): void {
  const boundOf = (id: ExposureBound['id']): number | null => bounds.find((bound) => bound.id === id)?.seconds ?? null;
  const readNoiseSeconds = boundOf('readNoise');
  if (exposureCount > 1 && readNoiseSeconds !== null && exposureSeconds < readNoiseSeconds) {
    warnings.push({
      code: 'readNoiseLimited',
      message: `Exposures shorter than ${inWords(readNoiseSeconds, 2)} s lose S/N to read noise.`,
    });
  }
  const saturatesAtSeconds = boundOf('saturation');
  if (saturatesAtSeconds !== null && exposureSeconds > 0.9 * saturatesAtSeconds) {
    warnings.push({
      code: 'nearSaturation',
      message: 'The brightest pixel is near saturation: better seeing than asked for would saturate it.',
    });
  }
  if (exposureCount < COSMIC_RAY_MINIMUM_COUNT.value && exposureSeconds > COSMIC_RAY_CONCERN_SECONDS) {
    warnings.push({
      code: 'fewExposures',
      message: `Fewer than ${COSMIC_RAY_MINIMUM_COUNT.value} exposures: cosmic rays cannot be told from the source.`,
    });
  }
  if (rates.sourceElectronsPerSecond < FAR_BELOW_SKY * rates.skyElectronsPerSecond) {
    warnings.push({
      code: 'sourceFarBelowSky',
      message: 'The source is fainter than a thousandth of the sky under it: how well the sky is subtracted decides.',
    });
  }
  if (totalSeconds > LONG_REQUEST_NIGHTS * NIGHT_SECONDS) {
    warnings.push({
      code: 'longRequest',
      message: `More than ${LONG_REQUEST_NIGHTS} nights of ten hours: consider a wider band, a lower S/N or a brighter target.`,
    });
  }
}

function largestShare(shares: NoiseShares): NoiseKind {
  let largest: NoiseKind = 'source';
  for (const kind of ['sky', 'dark', 'readNoise'] as const) if (shares[kind] > shares[largest]) largest = kind;
  return largest;
}

function hours(seconds: number): string {
  return inWords(seconds / 3600);
}

/** A number for a sentence: few digits and, unlike `toPrecision`, never an exponent: 1100 instead of 1.1e+3. */
function inWords(value: number, significantDigits = 3): string {
  return String(Number(value.toPrecision(significantDigits)));
}
