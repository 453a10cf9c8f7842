/** Plausible inputs for tests; each test names only what it is about. Numbers are invented. */
import { createCosmology } from '@faintward/cosmology';
import {
  boxCurve,
  ledgerInput,
  powerLawSpectrum,
  type QuotedAt,
  type QuotedMagnitude,
  responseOf,
  type RestSpectrum,
  type SourceLight,
} from '@faintward/photometry';
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

interface PlainWay {
  /** Applied on top of the light given. */
  magnification?: number;
}

/** A light in the few words that most tests need: one power law, nothing on the way but lensing. */
export type PlainLight = PlainWay &
  (
    | {
        kind: 'apparentMagnitude';
        magnitudeAb: number;
        /** Absent: the average over the range that is counted. */
        wavelengthNm?: number;
        averagedOverNm?: readonly [low: number, high: number];
        slopeBeta?: number;
      }
    | { kind: 'absoluteMagnitude'; absoluteMagnitudeAb: number; restWavelengthNm: number; slopeBeta?: number }
    | ({ kind: 'lineFlux'; lineFluxErgSCm2: number } & PlainLine)
    | ({ kind: 'lineLuminosity'; lineLuminosityErgS: number } & PlainLine)
  );

export interface PlainLine {
  restWavelengthNm: number;
  intrinsicWidthKmS: number;
  continuumMagnitudeAb?: number;
}

const spectra = new Map<number, RestSpectrum>();

function powerLaw(slopeBeta: number): RestSpectrum {
  const spectrum = spectra.get(slopeBeta) ?? powerLawSpectrum({ kind: 'powerLaw', slopeBeta, escapeFraction: 0 }, []);
  spectra.set(slopeBeta, spectrum);
  return spectrum;
}

export function lightOf(plain: PlainLight): SourceLight {
  const way = {
    hostDust: null,
    galacticDust: null,
    medium: null,
    magnification: plain.magnification ?? 1,
    includes: { hostDust: true, galacticDust: true, lensing: false },
  };
  switch (plain.kind) {
    case 'apparentMagnitude':
      return {
        kind: 'continuum',
        frame: 'observed',
        quoted: quoted(plain.kind, plain.magnitudeAb),
        at: quotedAt(plain),
        spectrum: powerLaw(plain.slopeBeta ?? -2),
        ...way,
      };
    case 'absoluteMagnitude':
      return {
        kind: 'continuum',
        frame: 'rest',
        quoted: quoted(plain.kind, plain.absoluteMagnitudeAb),
        at: { kind: 'wavelength', wavelengthNm: plain.restWavelengthNm },
        spectrum: powerLaw(plain.slopeBeta ?? -2),
        ...way,
      };
    case 'lineFlux':
    case 'lineLuminosity': {
      const amount = plain.kind === 'lineFlux' ? plain.lineFluxErgSCm2 : plain.lineLuminosityErgS;
      return {
        kind: 'line',
        frame: plain.kind === 'lineFlux' ? 'observed' : 'rest',
        quoted: { kind: plain.kind, amount, inputs: [ledgerInput('amount', amount)] },
        restWavelengthNm: plain.restWavelengthNm,
        velocityWidthKmS: plain.intrinsicWidthKmS,
        continuum:
          plain.continuumMagnitudeAb === undefined
            ? { kind: 'none' }
            : { kind: 'magnitude', magnitudeAb: plain.continuumMagnitudeAb },
        escapeFraction: 1,
        ...way,
      };
    }
  }
}

function quoted(kind: 'apparentMagnitude' | 'absoluteMagnitude', magnitude: number): QuotedMagnitude {
  return { kind, magnitude, toAbMag: 0, inputs: [ledgerInput('magnitude', magnitude, 'mag')] };
}

function quotedAt({ wavelengthNm, averagedOverNm }: Extract<PlainLight, { kind: 'apparentMagnitude' }>): QuotedAt {
  if (averagedOverNm !== undefined) {
    return { kind: 'response', response: responseOf(boxCurve(...averagedOverNm)), label: 'the whole range' };
  }
  return wavelengthNm === undefined ? { kind: 'range' } : { kind: 'wavelength', wavelengthNm };
}

const PLANCK18 = createCosmology('planck18');

export function anInput(overrides: Partial<EstimateInput> = {}): EstimateInput {
  return {
    target: {
      redshift: 2,
      light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 24.5 }),
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
