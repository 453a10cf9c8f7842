import { OutOfDomainError, SERSIC_INDEX_RANGE, type SourceLight } from '@faintward/photometry';
import { DITHER_MINIMUM_COUNT } from './constants.js';
import type { EstimateInput, Extent, Goal, InstrumentMode, Target } from './types.js';

/** Refuses a number outside [lowest, highest]; NaN and infinities always. */
function inRange(field: string, value: number, lowest: number, highest: number, unit = ''): void {
  if (typeof value !== 'number' || !(value >= lowest && value <= highest)) {
    throw new OutOfDomainError(field, value, `between ${lowest} and ${highest}${unit === '' ? '' : ` ${unit}`}`);
  }
}

function ordered(lowField: string, low: number, highField: string, high: number): void {
  if (!(high > low)) throw new OutOfDomainError(highField, high, `above ${lowField} = ${low}`);
}

function unknownChoice(field: string, value: never, allowed: string): never {
  throw new OutOfDomainError(field, value, allowed);
}

function oneOf(field: string, value: unknown, allowed: readonly string[]): void {
  if (!allowed.some((each) => each === value)) throw new OutOfDomainError(field, value, `one of ${allowed.join(', ')}`);
}

function whole(field: string, value: number, lowest: number, highest: number): void {
  if (!Number.isInteger(value)) throw new OutOfDomainError(field, value, 'a whole number');
  inRange(field, value, lowest, highest);
}

/** Below this (a distance of some 4 kpc) a redshift says nothing about distance: any motion is larger. */
const LOWEST_REDSHIFT_WITH_DISTANCE = 1e-6;
/** Half-light radii beyond this are typing errors. */
const LARGEST_HALF_LIGHT_RADIUS_ARCSEC = 3600;

/** The faintest and brightest magnitudes that are taken seriously; keeps every later power of ten finite. */
const MAGNITUDES = [-50, 60] as const;
const SECONDS = [1e-6, 1e7] as const;

/**
 * Refuses an input in which some number could not be computed with, naming the field.
 *
 * Bounds are wide: they exclude nonsense, not unusual requests. What is sensible is said by warnings.
 *
 * @throws {OutOfDomainError}
 */
export function validateInput(input: EstimateInput): void {
  validateTarget(input.target);
  const { site, telescope, conditions, goal, mode, limits } = input;
  inRange('site.zenithSeeingArcsec', site.zenithSeeingArcsec, 0.05, 10, 'arcsec');
  if (site.outerScaleM !== undefined) inRange('site.outerScaleM', site.outerScaleM, 1, 1e4, 'm');
  inRange('telescope.diameterM', telescope.diameterM, 0.01, 200, 'm');
  inRange('telescope.obstructionDiameterM', telescope.obstructionDiameterM, 0, 200, 'm');
  ordered('telescope.obstructionDiameterM', telescope.obstructionDiameterM, 'telescope.diameterM', telescope.diameterM);
  if (conditions.seeingArcsec !== undefined)
    inRange('conditions.seeingArcsec', conditions.seeingArcsec, 0.05, 10, 'arcsec');
  inRange('conditions.airmass', conditions.airmass, 1, 10);
  oneOf('conditions.moonClass', conditions.moonClass, ['dark', 'grey', 'bright']);
  oneOf('conditions.transparency', conditions.transparency, ['clear', 'thinCloud']);
  validateMode(mode);
  validateGoal(goal, input);
  if (limits?.maximumExposureCount !== undefined) {
    whole('limits.maximumExposureCount', limits.maximumExposureCount, 1, 1e9);
  }
  if (limits?.maximumTotalSeconds !== undefined) {
    inRange('limits.maximumTotalSeconds', limits.maximumTotalSeconds, 1, 1e10, 's');
  }
  if (input.apertureRadiusArcsec !== undefined) {
    inRange('apertureRadiusArcsec', input.apertureRadiusArcsec, 1e-3, 1e4, 'arcsec');
  }
  if (input.wavelengthNm !== undefined) inRange('wavelengthNm', input.wavelengthNm, 100, 1e5, 'nm');
}

function validateTarget(target: Target): void {
  const { light, extent } = target;
  inRange('target.redshift', target.redshift, 0, 1100);
  validateLight(light);
  validateExtent(extent);
  const isIntrinsic = light.frame === 'rest';
  if (extent.kind === 'uniform' && isIntrinsic) {
    throw new OutOfDomainError('target.light.kind', light.kind, 'an observed surface brightness for a uniform extent');
  }
  const needsDistance = isIntrinsic || (extent.kind === 'sersic' && extent.halfLightRadiusKpc !== undefined);
  if (needsDistance && target.redshift < LOWEST_REDSHIFT_WITH_DISTANCE) {
    throw new OutOfDomainError(
      'target.redshift',
      target.redshift,
      `at least ${LOWEST_REDSHIFT_WITH_DISTANCE} where a luminosity or a size in kpc is given`,
    );
  }
}

/**
 * Refuses a size in kpc whose angle at the distance found is beyond what an angle may be.
 *
 * @throws {OutOfDomainError}
 */
export function validateAngleOfKpc(sizeKpc: number, angleArcsec: number): void {
  if (angleArcsec <= LARGEST_HALF_LIGHT_RADIUS_ARCSEC) return;
  const allowed = `small enough to span at most ${LARGEST_HALF_LIGHT_RADIUS_ARCSEC} arcsec at the distance of the target`;
  throw new OutOfDomainError('target.extent.halfLightRadiusKpc', sizeKpc, allowed);
}

function validateLight(light: SourceLight): void {
  const at = 'target.light';
  oneOf(`${at}.kind`, light.kind, ['continuum', 'line']);
  inRange(`${at}.magnification`, light.magnification, 1e-6, 1e6);
  if (light.hostDust !== null) inRange(`${at}.hostDust.colourExcessMag`, light.hostDust.colourExcessMag, 0, 20, 'mag');
  if (light.galacticDust !== null) {
    inRange(`${at}.galacticDust.colourExcessMag`, light.galacticDust.colourExcessMag, 0, 20, 'mag');
  }
  if (light.kind === 'continuum') {
    inRange(`${at}.magnitude`, light.quoted.magnitude, ...MAGNITUDES);
    return;
  }
  if (light.frame === 'observed') inRange(`${at}.amount`, light.quoted.amount, 1e-30, 1, 'erg/s/cm²');
  else inRange(`${at}.amount`, light.quoted.amount, 1e20, 1e60, 'erg/s');
  inRange(`${at}.restWavelengthNm`, light.restWavelengthNm, 1, 1e7, 'nm');
  inRange(`${at}.velocityWidthKmS`, light.velocityWidthKmS, 0, 1e5, 'km/s');
  inRange(`${at}.escapeFraction`, light.escapeFraction, 1e-6, 1);
  if (light.continuum.kind === 'magnitude') {
    inRange(`${at}.continuum.magnitudeAb`, light.continuum.magnitudeAb, ...MAGNITUDES);
  }
}

function validateExtent(extent: Extent): void {
  const at = 'target.extent';
  switch (extent.kind) {
    case 'point':
      return;
    case 'uniform':
      if (extent.areaArcsec2 !== undefined) inRange(`${at}.areaArcsec2`, extent.areaArcsec2, 1e-4, 1e8, 'arcsec²');
      return;
    case 'sersic': {
      const { halfLightRadiusArcsec, halfLightRadiusKpc, index, axisRatio } = extent;
      if ((halfLightRadiusArcsec === undefined) === (halfLightRadiusKpc === undefined)) {
        throw new OutOfDomainError(
          `${at}.halfLightRadiusArcsec`,
          halfLightRadiusArcsec,
          'given, or else halfLightRadiusKpc, not both',
        );
      }
      if (halfLightRadiusArcsec !== undefined) {
        inRange(`${at}.halfLightRadiusArcsec`, halfLightRadiusArcsec, 1e-5, LARGEST_HALF_LIGHT_RADIUS_ARCSEC, 'arcsec');
      }
      if (halfLightRadiusKpc !== undefined) inRange(`${at}.halfLightRadiusKpc`, halfLightRadiusKpc, 1e-4, 1e3, 'kpc');
      inRange(`${at}.index`, index, SERSIC_INDEX_RANGE.lowest, SERSIC_INDEX_RANGE.highest);
      if (axisRatio !== undefined) inRange(`${at}.axisRatio`, axisRatio, 0.01, 1);
      return;
    }
    default:
      unknownChoice(`${at}.kind`, extent, 'point, sersic or uniform');
  }
}

function validateMode(mode: InstrumentMode): void {
  oneOf('mode.kind', mode.kind, ['imaging', 'slitSpectroscopy']);
  inRange('mode.wavelengthLowNm', mode.wavelengthLowNm, 100, 1e5, 'nm');
  inRange('mode.wavelengthHighNm', mode.wavelengthHighNm, 100, 1e5, 'nm');
  ordered('mode.wavelengthLowNm', mode.wavelengthLowNm, 'mode.wavelengthHighNm', mode.wavelengthHighNm);
  inRange('mode.throughput', mode.throughput, 1e-6, 1);
  inRange('mode.extinctionMagPerAirmass', mode.extinctionMagPerAirmass, 0, 10, 'mag');
  for (const moonClass of ['dark', 'grey', 'bright'] as const) {
    inRange(`mode.skyAbMagPerArcsec2.${moonClass}`, mode.skyAbMagPerArcsec2[moonClass], 0, 40, 'mag/arcsec²');
  }
  const { detector, exposureLimits, overheads } = mode;
  inRange('mode.detector.pixelScaleArcsec', detector.pixelScaleArcsec, 1e-3, 100, 'arcsec');
  inRange('mode.detector.darkElectronsPerSecond', detector.darkElectronsPerSecond, 0, 1e6, 'e⁻/s');
  inRange('mode.detector.readNoiseElectrons', detector.readNoiseElectrons, 0, 1e5, 'e⁻');
  inRange('mode.detector.fullWellElectrons', detector.fullWellElectrons, 1, 1e9, 'e⁻');
  if (detector.gainElectronsPerAdu !== undefined) {
    inRange('mode.detector.gainElectronsPerAdu', detector.gainElectronsPerAdu, 1e-4, 1e5, 'e⁻/ADU');
  }
  inRange('mode.exposureLimits.minimumExposureSeconds', exposureLimits.minimumExposureSeconds, ...SECONDS, 's');
  inRange(
    'mode.exposureLimits.maximumExposureSeconds',
    exposureLimits.maximumExposureSeconds,
    exposureLimits.minimumExposureSeconds,
    SECONDS[1],
    's',
  );
  for (const part of ['acquisitionSeconds', 'setupSeconds', 'readoutSeconds', 'ditherSeconds'] as const) {
    inRange(`mode.overheads.${part}`, overheads[part], 0, 1e6, 's');
  }
  inRange('mode.overheads.maximumBlockSeconds', overheads.maximumBlockSeconds, 1, 1e7, 's');
  if (mode.imageQualityFwhmArcsec !== undefined) {
    inRange('mode.imageQualityFwhmArcsec', mode.imageQualityFwhmArcsec, 0, 30, 'arcsec');
  }
  if (mode.minimumExposureCount !== undefined) whole('mode.minimumExposureCount', mode.minimumExposureCount, 1, 1000);
  if (mode.systematicErrorFraction !== undefined) {
    inRange('mode.systematicErrorFraction', mode.systematicErrorFraction, 0, 1);
  }
  if (mode.skySubtraction !== undefined) {
    oneOf('mode.skySubtraction.kind', mode.skySubtraction.kind, ['wideArea', 'annulus', 'ditheredFrames']);
  }
  if (mode.skySubtraction?.kind === 'annulus') {
    inRange('mode.skySubtraction.backgroundPixelRatio', mode.skySubtraction.backgroundPixelRatio, 0.01, 1e9);
  }
  if (mode.kind === 'slitSpectroscopy') {
    inRange('mode.resolvingPower', mode.resolvingPower, 5, 1e6);
    inRange('mode.slitWidthArcsec', mode.slitWidthArcsec, 0.01, 1000, 'arcsec');
    inRange('mode.pixelsPerResolutionElement', mode.pixelsPerResolutionElement, 0.5, 100);
    inRange('mode.extractionLengthFwhm', mode.extractionLengthFwhm, 0.1, 100);
  }
}

function validateGoal(goal: Goal, input: EstimateInput): void {
  const { mode, target } = input;
  const { minimumExposureSeconds, maximumExposureSeconds } = mode.exposureLimits;
  if (goal.exposureSeconds !== undefined) {
    inRange('goal.exposureSeconds', goal.exposureSeconds, minimumExposureSeconds, maximumExposureSeconds, 's');
  }
  switch (goal.kind) {
    case 'signalToNoise':
      inRange('goal.value', goal.value, 0.01, 1e5);
      break;
    case 'lineSignificance':
      inRange('goal.sigma', goal.sigma, 0.01, 1e5);
      if (target.light.kind !== 'line') {
        throw new OutOfDomainError(
          'goal.kind',
          goal.kind,
          'signalToNoise or exposureTime, unless the light is that of a line',
        );
      }
      return;
    case 'exposureTime':
      whole('goal.exposureCount', goal.exposureCount, 1, 1e6);
      if (mode.skySubtraction?.kind === 'ditheredFrames') {
        inRange('goal.exposureCount', goal.exposureCount, DITHER_MINIMUM_COUNT.value, 1e6);
      }
      break;
    default:
      unknownChoice('goal.kind', goal, 'signalToNoise, lineSignificance or exposureTime');
  }
  const per = goal.per ?? 'aperture';
  oneOf('goal.per', per, ['aperture', 'arcsec2', 'pixel', 'resolutionElement']);
  if (per === 'resolutionElement' && mode.kind === 'imaging') {
    throw new OutOfDomainError('goal.per', per, 'aperture, arcsec2 or pixel for imaging');
  }
  if (per === 'arcsec2' && target.extent.kind === 'point') {
    throw new OutOfDomainError('goal.per', per, 'aperture, pixel or resolutionElement for a point source');
  }
}
