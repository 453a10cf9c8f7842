/** From the light above the atmosphere to electrons per second: what the aperture holds and what falls beside it. */
import {
  AB_ZERO_PHOTONS_PER_M2_S,
  halfLightRadiusAfterSeeing,
  ledgerInput,
  resolutionFwhmKmS,
} from '@faintward/photometry';
import { collectingAreaM2 } from './ccd-equation.js';
import { OPTIMUM_RADIUS_OVER_FWHM, THIN_CLOUD } from './constants.js';
import type { LightBudget } from './light-budget.js';
import { gaussianEncircledFraction, gaussianPeakPixelFraction, gaussianSlitFraction } from './point-spread.js';
import { bestApertureRadiusArcsec, enclosedFractionAfterSeeing, peakPixelFractionAfterSeeing } from './sersic-image.js';
import type { CountedRange } from './counted-range.js';
import type {
  Aperture,
  ElectronRates,
  EstimateInput,
  EstimateWarning,
  ImagingMode,
  SignalToNoisePer,
  SlitSpectroscopyMode,
} from './types.js';

/** The shape of the source on the sky, once its distance is known. */
export type Image =
  | { kind: 'point' }
  | { kind: 'uniform'; areaArcsec2: number }
  | { kind: 'sersic'; index: number; circularisedRadiusArcsec: number };

export interface Collection {
  aperture: Aperture;
  rates: ElectronRates;
  apertureMagnitudeAb: number;
}

/** How the goal's sum relates to the whole aperture. */
interface Geometry {
  aperture: Aperture;
  /** Share of the aperture's light, and of its pixels, that the goal refers to. */
  goalShare: number;
  /** Sky counted per pixel, in arcsec² times Δ ln λ. */
  skyArcsec2LogWidthPerPixel: number;
  /** Fraction of the source's light in its brightest pixel; of a patch: pixel area over 1 arcsec². */
  peakFraction: number;
  /** The same for the continuum under a line, which is flat along the dispersion; elsewhere equal to `peakFraction`. */
  continuumPeakFraction: number;
  /** Resolution elements in the sum, over which a continuum under a line adds up. */
  elementCount: number;
}

/**
 * Adds the steps from the top of the atmosphere to electrons, and counts them.
 *
 * @param continuumMag  AB magnitude above the atmosphere of what is seen under a line; undefined without a continuum
 * @param fwhmArcsec  delivered FWHM of a point source
 */
export function collect(
  budget: LightBudget,
  input: EstimateInput,
  range: CountedRange,
  continuumMag: number | undefined,
  image: Image,
  fwhmArcsec: number,
  per: SignalToNoisePer,
  warnings: EstimateWarning[],
): Collection {
  const { mode, conditions, telescope } = input;
  const aboveAtmosphereMag = budget.totalMag;
  const extinctionMag = mode.extinctionMagPerAirmass * conditions.airmass;
  budget.step('atmospheric-extinction', extinctionMag, [
    ledgerInput('extinctionMagPerAirmass', mode.extinctionMagPerAirmass, 'mag'),
    ledgerInput('airmass', conditions.airmass),
  ]);
  const cloudMag = conditions.transparency === 'thinCloud' ? THIN_CLOUD.value : 0;
  if (cloudMag > 0) budget.step('thin-cloud', cloudMag, [ledgerInput('attenuation', cloudMag, 'mag')]);
  budget.addFraction('throughput', mode.throughput, [ledgerInput('throughput', mode.throughput)]);
  const beforeApertureMag = budget.totalMag;

  const geometry =
    mode.kind === 'imaging'
      ? imageGeometry(budget, input, mode, range, image, fwhmArcsec, per, warnings)
      : slitGeometry(budget, input, mode, image, fwhmArcsec, per, warnings);
  if (geometry.goalShare !== 1) {
    budget.addFraction('goal-share', geometry.goalShare, [ledgerInput('share', geometry.goalShare)]);
  }
  const apertureMagnitudeAb = budget.totalMag;

  const areaM2 = collectingAreaM2(telescope.diameterM, telescope.obstructionDiameterM);
  const zeroPerLogWidth = AB_ZERO_PHOTONS_PER_M2_S * areaM2;
  budget.addFraction('collecting', zeroPerLogWidth * range.response.logIntegral, [
    ledgerInput('collectingAreaM2', areaM2, 'm²'),
    ledgerInput('logWidth', range.response.logIntegral),
  ]);

  const sourceElectronsPerSecond = electrons(budget.totalMag);
  // The continuum goes the same way as the line; only where it starts and how many elements it fills differ.
  const continuumOverLine =
    continuumMag === undefined ? 0 : electrons(continuumMag - aboveAtmosphereMag) * geometry.elementCount;
  const skyPerPixel =
    electrons(mode.skyAbMagPerArcsec2[conditions.moonClass]) *
    zeroPerLogWidth *
    mode.throughput *
    geometry.skyArcsec2LogWidthPerPixel;
  const dark = mode.detector.darkElectronsPerSecond;
  const peakShare = geometry.peakFraction + geometry.continuumPeakFraction * continuumOverLine;
  const peakSource = electrons(beforeApertureMag) * zeroPerLogWidth * range.response.logIntegral * peakShare;
  const { pixelCount } = geometry.aperture;
  return {
    aperture: geometry.aperture,
    apertureMagnitudeAb,
    rates: {
      sourceElectronsPerSecond,
      continuumElectronsPerSecond: sourceElectronsPerSecond * continuumOverLine,
      skyElectronsPerSecond: skyPerPixel * pixelCount,
      darkElectronsPerSecond: dark * pixelCount,
      skyElectronsPerSecondPerPixel: skyPerPixel,
      peakElectronsPerSecondPerPixel: peakSource + skyPerPixel + dark,
    },
  };
}

function electrons(magnitude: number): number {
  return 10 ** (-0.4 * magnitude);
}

function imageGeometry(
  budget: LightBudget,
  input: EstimateInput,
  mode: ImagingMode,
  range: CountedRange,
  image: Image,
  fwhmArcsec: number,
  per: SignalToNoisePer,
  warnings: EstimateWarning[],
): Geometry {
  const pixelArcsec = mode.detector.pixelScaleArcsec;
  const pixelArea = pixelArcsec * pixelArcsec;
  let radiusArcsec: number | null = null;
  let areaArcsec2: number;
  let enclosedFraction = 1;
  let peakFraction: number;
  if (image.kind === 'uniform') {
    areaArcsec2 = image.areaArcsec2;
    peakFraction = pixelArea;
    budget.addFraction('solid-angle', areaArcsec2, [ledgerInput('areaArcsec2', areaArcsec2, 'arcsec²')]);
  } else {
    if (image.kind === 'point') {
      radiusArcsec = input.apertureRadiusArcsec ?? OPTIMUM_RADIUS_OVER_FWHM * fwhmArcsec;
      enclosedFraction = gaussianEncircledFraction(radiusArcsec / fwhmArcsec);
      peakFraction = gaussianPeakPixelFraction(pixelArcsec / fwhmArcsec);
    } else {
      const { index, circularisedRadiusArcsec } = image;
      radiusArcsec =
        input.apertureRadiusArcsec ?? bestApertureRadiusArcsec(index, circularisedRadiusArcsec, fwhmArcsec);
      enclosedFraction = enclosedFractionAfterSeeing(index, circularisedRadiusArcsec, fwhmArcsec, radiusArcsec);
      peakFraction = peakPixelFractionAfterSeeing(index, circularisedRadiusArcsec, fwhmArcsec, pixelArcsec);
    }
    areaArcsec2 = Math.PI * radiusArcsec * radiusArcsec;
    budget.addFraction('aperture', enclosedFraction, [
      ledgerInput('radiusArcsec', radiusArcsec, 'arcsec'),
      ledgerInput('fwhmArcsec', fwhmArcsec, 'arcsec'),
      ledgerInput('enclosedFraction', enclosedFraction),
    ]);
    if (radiusArcsec < pixelArcsec) {
      warnings.push({
        code: 'apertureSmallerThanPixel',
        message: 'The aperture is smaller than a pixel: its light cannot be told apart from the neighbours’.',
      });
    }
    if (pixelArcsec > fwhmArcsec / 2) {
      warnings.push({ code: 'undersampled', message: 'Pixels are larger than half the image’s width (FWHM).' });
    }
  }
  const goalShare = per === 'arcsec2' ? 1 / areaArcsec2 : per === 'pixel' ? pixelArea / areaArcsec2 : 1;
  return {
    aperture: {
      kind: image.kind === 'uniform' ? 'patch' : 'circle',
      radiusArcsec,
      widthArcsec: null,
      lengthArcsec: null,
      areaArcsec2,
      enclosedFraction,
      pixelCount: (areaArcsec2 / pixelArea) * goalShare,
    },
    goalShare,
    skyArcsec2LogWidthPerPixel: pixelArea * range.response.logIntegral,
    peakFraction,
    continuumPeakFraction: peakFraction,
    elementCount: 1,
  };
}

/**
 * A slit in front of an image that is taken for a Gaussian with the half-light radius after seeing: exact for a point
 * source in Gaussian seeing, and within some 10 % of the light for n ≤ 2.
 *
 * A line of width v spreads over √(1 + (v/(c/R))²) resolution elements; all of it is summed.
 */
function slitGeometry(
  budget: LightBudget,
  input: EstimateInput,
  mode: SlitSpectroscopyMode,
  image: Image,
  fwhmArcsec: number,
  per: SignalToNoisePer,
  warnings: EstimateWarning[],
): Geometry {
  const { slitWidthArcsec, extractionLengthFwhm, pixelsPerResolutionElement, resolvingPower } = mode;
  const { light } = input.target;
  const elementCount =
    light.kind === 'line' ? Math.hypot(1, light.velocityWidthKmS / resolutionFwhmKmS(resolvingPower)) : 1;
  const imageFwhmArcsec =
    image.kind === 'sersic' ? 2 * halfLightRadiusAfterSeeing(image.circularisedRadiusArcsec, fwhmArcsec) : fwhmArcsec;
  const lengthArcsec = extractionLengthFwhm * imageFwhmArcsec;
  const areaArcsec2 = slitWidthArcsec * lengthArcsec;
  const pixelArcsec = mode.detector.pixelScaleArcsec;
  const pixelsPerElement = (lengthArcsec / pixelArcsec) * pixelsPerResolutionElement;

  let enclosedFraction = 1;
  let peakAlongSlit: number;
  if (image.kind === 'uniform') {
    budget.addFraction('solid-angle', areaArcsec2, [ledgerInput('areaArcsec2', areaArcsec2, 'arcsec²')]);
    peakAlongSlit = slitWidthArcsec * pixelArcsec;
  } else {
    const slitFraction = gaussianSlitFraction(slitWidthArcsec / imageFwhmArcsec);
    const extractedFraction = gaussianSlitFraction(extractionLengthFwhm);
    enclosedFraction = slitFraction * extractedFraction;
    budget.addFraction('slit', slitFraction, [
      ledgerInput('slitWidthArcsec', slitWidthArcsec, 'arcsec'),
      ledgerInput('imageFwhmArcsec', imageFwhmArcsec, 'arcsec'),
    ]);
    budget.addFraction('extraction', extractedFraction, [ledgerInput('lengthArcsec', lengthArcsec, 'arcsec')]);
    peakAlongSlit = slitFraction * gaussianSlitFraction(pixelArcsec / imageFwhmArcsec);
    if (slitWidthArcsec < fwhmArcsec) {
      warnings.push({
        code: 'slitNarrowerThanSeeing',
        message: `The slit is narrower than the seeing and keeps ${(100 * slitFraction).toFixed(0)} % of the light.`,
      });
    }
    if (image.kind === 'sersic' && image.circularisedRadiusArcsec > 2 * fwhmArcsec) {
      warnings.push({
        code: 'extendedBeyondModel',
        message: 'The source is much larger than the seeing: the light in the slit is a rough figure.',
      });
    }
  }
  const flatAlongDispersion = Math.min(1, 1 / pixelsPerResolutionElement);
  const peakAlongDispersion =
    light.kind === 'line' ? gaussianSlitFraction(1 / (pixelsPerResolutionElement * elementCount)) : flatAlongDispersion;
  const goalShare = slitGoalShare(per, elementCount, pixelsPerResolutionElement, areaArcsec2);
  return {
    aperture: {
      kind: 'slit',
      radiusArcsec: null,
      widthArcsec: slitWidthArcsec,
      lengthArcsec,
      areaArcsec2,
      enclosedFraction,
      pixelCount: pixelsPerElement * elementCount * goalShare,
    },
    goalShare,
    skyArcsec2LogWidthPerPixel: (slitWidthArcsec * pixelArcsec) / pixelsPerResolutionElement / resolvingPower,
    peakFraction: peakAlongSlit * peakAlongDispersion,
    continuumPeakFraction: (peakAlongSlit * flatAlongDispersion) / elementCount,
    elementCount,
  };
}

function slitGoalShare(
  per: SignalToNoisePer,
  elementCount: number,
  pixelsPerResolutionElement: number,
  areaArcsec2: number,
): number {
  switch (per) {
    case 'aperture':
      return 1;
    case 'resolutionElement':
      return 1 / elementCount;
    case 'pixel':
      return 1 / (elementCount * pixelsPerResolutionElement);
    case 'arcsec2':
      return 1 / areaArcsec2;
  }
}
