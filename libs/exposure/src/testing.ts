/** Plausible inputs for tests; each test names only what it is about. Numbers are invented. */
import { createCosmology } from '@faintward/cosmology';
import type { EstimateInput, ImagingMode, Site, SlitSpectroscopyMode } from './types.js';

export function aSite(overrides: Partial<Site> = {}): Site {
  return { zenithSeeingArcsec: 0.8, ...overrides };
}

const MODE_BASICS = {
  throughput: 0.35,
  extinctionMagPerAirmass: 0.1,
  skyAbMagPerArcsec2: { dark: 20.9, grey: 20.1, bright: 18.9 },
  detector: {
    pixelScaleArcsec: 0.2,
    darkElectronsPerSecond: 0.002,
    readNoiseElectrons: 4,
    fullWellElectrons: 100_000,
  },
  exposureLimits: { minimumExposureSeconds: 1, maximumExposureSeconds: 900 },
  overheads: {
    acquisitionSeconds: 180,
    setupSeconds: 60,
    readoutSeconds: 30,
    ditherSeconds: 10,
    maximumBlockSeconds: 5400,
  },
};

export function anImagingMode(overrides: Partial<ImagingMode> = {}): ImagingMode {
  return {
    kind: 'imaging',
    bandId: 'r',
    label: 'r imaging',
    wavelengthLowNm: 560,
    wavelengthHighNm: 690,
    ...MODE_BASICS,
    ...overrides,
  };
}

export function aSpectroscopyMode(overrides: Partial<SlitSpectroscopyMode> = {}): SlitSpectroscopyMode {
  return {
    kind: 'slitSpectroscopy',
    bandId: 'red',
    label: 'red grating',
    wavelengthLowNm: 550,
    wavelengthHighNm: 1000,
    resolvingPower: 2000,
    slitWidthArcsec: 1,
    pixelsPerResolutionElement: 4,
    extractionLengthFwhm: 2,
    ...MODE_BASICS,
    ...overrides,
  };
}

const PLANCK18 = createCosmology('planck18');

export function anInput(overrides: Partial<EstimateInput> = {}): EstimateInput {
  return {
    target: {
      redshift: 2,
      light: { kind: 'apparentMagnitude', magnitudeAb: 24.5 },
      extent: { kind: 'point' },
    },
    cosmology: PLANCK18,
    site: aSite(),
    telescope: { diameterM: 5, obstructionDiameterM: 1.2 },
    mode: anImagingMode(),
    goal: { kind: 'signalToNoise', value: 10, per: 'aperture' },
    conditions: { airmass: 1.2, moonClass: 'dark', transparency: 'clear' },
    ...overrides,
  };
}
