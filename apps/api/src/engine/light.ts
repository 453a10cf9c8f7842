import { type CosmologyPresetId, CosmologyPresetId as CosmologyPresetIdSchema } from '@faintward/contracts/cosmology';
import type { FieldError } from '@faintward/contracts/errors';
import type { BandId, Extent, Light, Spectrum } from '@faintward/contracts/light';
import type { InstrumentMode } from '@faintward/exposure';
import {
  hydrogenAlphaFromStarFormation,
  absoluteMagnitudeFromLuminosityDensity,
  ledgerInput,
  LYMAN_ALPHA_OVER_H_ALPHA,
  type LineContinuum,
  type LuminosityDistances,
  type OnTheWay,
  type QuotedAt,
  type RestSpectrum,
  type SourceLight,
  STAR_FORMATION_CALIBRATIONS,
  typicalUvMagnitude,
  ultravioletFromStarFormation,
} from '@faintward/photometry';
import { type ChosenCosmology, chooseCosmology } from './cosmologies.js';
import { type LightData, lightData } from './light-data.js';

/** Rest wavelength of the far ultraviolet that star-formation rates are calibrated at. */
const ULTRAVIOLET_NM = 150;

/** Spectra that were uploaded, by their id. */
export type UploadedSpectra = ReadonlyMap<string, RestSpectrum>;
export const NO_UPLOADS: UploadedSpectra = new Map();

/** What a light is resolved with. */
export interface LightSetting {
  redshift: number;
  cosmology: ChosenCosmology;
  uploaded: UploadedSpectra;
}

/** Wavelength that a magnitude quoted in a band belongs to. */
export function bandWavelengthNm(bandId: BandId): number {
  return lightData().bands[bandId].response.pivotWavelengthNm;
}

/** The AB magnitude of a light given as an apparent magnitude; undefined for a Vega magnitude in a band without an offset. */
export function apparentMagnitudeAbOf(light: Extract<Light, { kind: 'apparentMagnitude' }>): number | undefined {
  const offset = toAbOffset(light.system, light.bandId);
  return offset === undefined ? undefined : light.magnitude + offset;
}

/** m_AB − m_Vega of a band; undefined for bands that are quoted in AB anyway. */
export function vegaToAbMagOf(bandId: BandId): number | undefined {
  return lightData().bands[bandId].vegaToAbMag ?? undefined;
}

function toAbOffset(system: 'AB' | 'Vega', bandId: BandId): number | undefined {
  return system === 'AB' ? 0 : vegaToAbMagOf(bandId);
}

/** Whether a light is a line, so that it has a wavelength of its own and no magnitude. */
export function isLine(light: Light): boolean {
  if (light.kind === 'starFormationRate') return light.tracer !== 'ultraviolet';
  return light.kind === 'lineFlux' || light.kind === 'lineLuminosity';
}

/** Whether a light is given as an amount at the source, so that it needs a distance. */
export function isIntrinsic(light: Light): boolean {
  return light.kind !== 'apparentMagnitude' && light.kind !== 'lineFlux';
}

/** The uploaded spectrum that a light names, if any. */
export function uploadedSpectrumOf(light: Light): string | undefined {
  return 'spectrum' in light && light.spectrum.kind === 'uploaded' ? light.spectrum.spectrumId : undefined;
}

/** What is wrong with light, extent and redshift together, though each alone is fine. Paths begin with `prefix`. */
export function lightFaults(
  {
    light,
    extent,
    redshift,
    uploaded,
  }: { light: Light | null; extent: Extent; redshift: number; uploaded?: UploadedSpectra | undefined },
  prefix = '',
): FieldError[] {
  const faults: FieldError[] = [];
  const fault = (path: string, message: string) => faults.push({ path: `${prefix}${path}`, message });
  addExtentFaults(extent, fault);
  if (light !== null) {
    addLightFaults(light, fault);
    addFaintnessFaults(light, fault);
    const spectrumId = uploadedSpectrumOf(light);
    if (uploaded !== undefined && spectrumId !== undefined && !uploaded.has(spectrumId)) {
      fault('light.spectrum.spectrumId', 'This spectrum is not among those of the proposal.');
    }
  }
  const needsDistance = light !== null && isIntrinsic(light);
  if (extent.kind === 'uniform' && needsDistance) {
    fault('light.kind', 'A surface of even brightness needs a brightness per square arcsecond as it is observed.');
  }
  const hasSizeInKpc = extent.kind === 'typical' || (extent.kind === 'sersic' && extent.unit === 'kpc');
  if (redshift === 0 && (needsDistance || hasSizeInKpc)) {
    fault(
      'redshift',
      'At redshift 0 there is no distance, which a luminosity or a size in kpc needs. Give a redshift above 0.',
    );
  }
  return faults;
}

/** Below these a number is a slip of the pen, and products of several are too small for the computer to hold. */
const LEAST = {
  magnification: 1e-6,
  fluxErgSCm2: 1e-40,
  luminosityErgS: 1,
  solarMassesPerYear: 1e-12,
  escapeFraction: 1e-9,
  restEquivalentWidthNm: 1e-9,
  halfLightRadius: 1e-6,
  axisRatio: 1e-3,
} as const;

type AddFault = (path: string, message: string) => void;

function addFaintnessFaults(light: Light, fault: AddFault): void {
  const atLeast = (path: string, value: number, least: number) => {
    if (value < least) fault(`light.${path}`, `Values from ${least} on are used; ${value} was given.`);
  };
  atLeast('magnification', light.magnification, LEAST.magnification);
  switch (light.kind) {
    case 'lineFlux':
      atLeast('fluxErgSCm2', light.fluxErgSCm2, LEAST.fluxErgSCm2);
      break;
    case 'lineLuminosity':
      atLeast('luminosityErgS', light.luminosityErgS, LEAST.luminosityErgS);
      break;
    case 'starFormationRate':
      atLeast('solarMassesPerYear', light.solarMassesPerYear, LEAST.solarMassesPerYear);
      if (light.tracer === 'lymanAlpha') atLeast('escapeFraction', light.escapeFraction ?? 1, LEAST.escapeFraction);
      break;
    case 'apparentMagnitude':
    case 'absoluteMagnitude':
    case 'typical':
  }
  if ('continuum' in light && light.continuum?.kind === 'equivalentWidth') {
    const { restEquivalentWidthNm } = light.continuum;
    atLeast('continuum.restEquivalentWidthNm', restEquivalentWidthNm, LEAST.restEquivalentWidthNm);
  }
}

function addExtentFaults(extent: Extent, fault: AddFault): void {
  if (extent.kind !== 'sersic' && extent.kind !== 'typical') return;
  const atLeast = (path: string, value: number, least: number) => {
    if (value < least) fault(`extent.${path}`, `Values from ${least} on are used; ${value} was given.`);
  };
  if (extent.kind === 'sersic') atLeast('halfLightRadius', extent.halfLightRadius, LEAST.halfLightRadius);
  atLeast('axisRatio', extent.axisRatio, LEAST.axisRatio);
}

function addLightFaults(light: Light, fault: AddFault): void {
  if (isIntrinsic(light) && light.includes.galacticDust) {
    fault(
      'light.includes.galacticDust',
      'A luminosity does not contain the dust of the Milky Way. Untick this, or give the brightness as it is observed.',
    );
  }
  switch (light.kind) {
    case 'apparentMagnitude':
      if (apparentMagnitudeAbOf(light) === undefined) {
        fault('light.system', `The ${light.bandId} band is only used with AB magnitudes; give the AB magnitude.`);
      }
      return;
    case 'absoluteMagnitude':
      if (light.system === 'AB') return;
      if (light.restBandId === null) {
        fault('light.system', 'A Vega magnitude belongs to a band: name the band in the rest frame, or give AB.');
      } else if (toAbOffset('Vega', light.restBandId) === undefined) {
        fault('light.system', `The ${light.restBandId} band is only used with AB magnitudes; give the AB magnitude.`);
      }
      return;
    case 'starFormationRate':
      if (light.tracer !== 'ultraviolet' && light.calibration === 'madauDickinson2014') {
        fault('light.calibration', 'This calibration is of ultraviolet light; for a line choose one of the others.');
      }
      if (light.tracer === 'lymanAlpha' && light.escapeFraction === null) {
        fault('light.escapeFraction', 'Say which part of the Lyα photons leaves the galaxy: there is no safe default.');
      }
      return;
    case 'lineFlux':
    case 'lineLuminosity':
    case 'typical':
  }
}

/**
 * A light in the terms of photometry: spectra, media and cosmologies in place of their names.
 *
 * @param mode  a magnitude quoted in the band of this imaging mode is taken as the average over it, without colours
 * @throws {Error} for a light that {@link lightFaults} finds fault with
 */
export function resolveLight(light: Light, setting: LightSetting, mode?: InstrumentMode): SourceLight {
  const data = lightData();
  const way = wayOf(light, data);
  switch (light.kind) {
    case 'apparentMagnitude': {
      const { response, label } = data.bands[light.bandId];
      const isOwnBand = mode?.kind === 'imaging' && mode.bandId === light.bandId;
      return {
        kind: 'continuum',
        frame: 'observed',
        quoted: {
          kind: 'apparentMagnitude',
          magnitude: light.magnitude,
          toAbMag: offsetOf(light.system, light.bandId),
          inputs: [ledgerInput('magnitude', light.magnitude, 'mag')],
        },
        at: isOwnBand ? { kind: 'range' } : { kind: 'response', response, label },
        spectrum: spectrumOf(light.spectrum, setting),
        ...way,
      };
    }
    case 'absoluteMagnitude': {
      const { restBandId } = light;
      return {
        kind: 'continuum',
        frame: 'rest',
        quoted: {
          kind: 'absoluteMagnitude',
          magnitude: light.magnitude,
          toAbMag: restBandId === null ? 0 : offsetOf(light.system, restBandId),
          inputs: [ledgerInput('absoluteMagnitude', light.magnitude, 'mag')],
        },
        at:
          restBandId === null ? { kind: 'wavelength', wavelengthNm: light.restWavelengthNm } : atBand(restBandId, data),
        spectrum: spectrumOf(light.spectrum, setting),
        ...derivedWith(light.derivedWith, setting),
        ...way,
      };
    }
    case 'typical':
      return { ...typicalLight(light, setting, data), ...way };
    case 'lineFlux':
      return {
        kind: 'line',
        frame: 'observed',
        quoted: {
          kind: 'lineFlux',
          amount: light.fluxErgSCm2,
          inputs: [ledgerInput('lineFluxErgSCm2', light.fluxErgSCm2, 'erg/s/cm²')],
        },
        restWavelengthNm: light.restWavelengthNm,
        velocityWidthKmS: light.velocityWidthKmS,
        continuum: continuumOf(light.continuum),
        escapeFraction: 1,
        ...way,
      };
    case 'lineLuminosity':
      return {
        kind: 'line',
        frame: 'rest',
        quoted: {
          kind: 'lineLuminosity',
          amount: light.luminosityErgS,
          inputs: [ledgerInput('lineLuminosityErgS', light.luminosityErgS, 'erg/s')],
        },
        restWavelengthNm: light.restWavelengthNm,
        velocityWidthKmS: light.velocityWidthKmS,
        continuum: continuumOf(light.continuum),
        escapeFraction: 1,
        ...derivedWith(light.derivedWith, setting),
        ...way,
      };
    case 'starFormationRate':
      return { ...starFormationLight(light, setting, data), ...derivedWith(light.derivedWith, setting), ...way };
  }
}

type Shapeless<Kind extends SourceLight> = Kind extends unknown ? Omit<Kind, keyof OnTheWay> : never;

function starFormationLight(
  light: Extract<Light, { kind: 'starFormationRate' }>,
  setting: LightSetting,
  data: LightData,
): Shapeless<SourceLight> {
  const { reference, initialMassFunction } = STAR_FORMATION_CALIBRATIONS[light.calibration];
  const source = `${reference}; initial mass function of ${initialMassFunction}`;
  const inputs = [ledgerInput('starFormationRate', light.solarMassesPerYear, 'M☉/yr')];
  if (light.tracer === 'ultraviolet') {
    const luminosity = ultravioletFromStarFormation(light.solarMassesPerYear, light.calibration);
    return {
      kind: 'continuum',
      frame: 'rest',
      quoted: {
        kind: 'starFormationRate',
        magnitude: absoluteMagnitudeFromLuminosityDensity(luminosity),
        toAbMag: 0,
        inputs: [...inputs, ledgerInput('luminosityErgSHz', luminosity, 'erg/s/Hz')],
        source,
      },
      at: { kind: 'wavelength', wavelengthNm: ULTRAVIOLET_NM },
      spectrum: spectrumOf(light.spectrum, setting),
    };
  }
  if (light.calibration === 'madauDickinson2014') throw new Error('A calibration without lines was not refused.');
  const hydrogenAlpha = hydrogenAlphaFromStarFormation(light.solarMassesPerYear, light.calibration);
  const isLymanAlpha = light.tracer === 'lymanAlpha';
  const amount = isLymanAlpha ? hydrogenAlpha * LYMAN_ALPHA_OVER_H_ALPHA.value : hydrogenAlpha;
  return {
    kind: 'line',
    frame: 'rest',
    quoted: {
      kind: 'starFormationRate',
      amount,
      inputs: [...inputs, ledgerInput('lineLuminosityErgS', amount, 'erg/s')],
      source: isLymanAlpha ? `${source}; Lyα/Hα = 8.7, case B (from memory)` : source,
    },
    restWavelengthNm: lineWavelengthNm(isLymanAlpha ? 'Lya' : 'Ha', data),
    velocityWidthKmS: light.velocityWidthKmS,
    continuum: { kind: 'none' },
    escapeFraction: isLymanAlpha ? (light.escapeFraction ?? 1) : 1,
  };
}

function typicalLight(
  light: Extract<Light, { kind: 'typical' }>,
  setting: LightSetting,
  data: LightData,
): Shapeless<SourceLight> {
  const spectrum = spectrumOf(light.spectrum, setting);
  if (light.of === 'starFormingGalaxy') {
    const typical = typicalUvMagnitude(setting.redshift, data.typical);
    return {
      kind: 'continuum',
      frame: 'rest',
      quoted: {
        kind: 'typical',
        magnitude: typical.magnitudeAb,
        toAbMag: 0,
        inputs: [ledgerInput('redshift', setting.redshift)],
        source: typical.source,
      },
      at: { kind: 'wavelength', wavelengthNm: typical.restWavelengthNm },
      spectrum,
      ...derivedWith(presetOf(typical.derivedWith), setting),
    };
  }
  const { peakMagnitudeVega, source, derivedWith: ladder } = data.typical.supernovaIa;
  const phaseDays = light.spectrum.kind === 'supernovaIa' ? light.spectrum.phaseDays : 0;
  const phaseMag = data.supernovaPhaseMagOf(phaseDays);
  return {
    kind: 'continuum',
    frame: 'rest',
    quoted: {
      kind: 'typical',
      magnitude: peakMagnitudeVega + phaseMag,
      toAbMag: offsetOf('Vega', 'B'),
      inputs: [
        ledgerInput('peakMagnitude', peakMagnitudeVega, 'mag'),
        ledgerInput('phaseDays', phaseDays, 'd'),
        ledgerInput('phaseMag', phaseMag, 'mag'),
      ],
      source,
    },
    at: atBand('B', data),
    spectrum,
    ...derivedWith(presetOf(ladder), setting),
  };
}

function wayOf(light: Light, data: LightData): OnTheWay {
  const { hostDust, galacticDust } = light;
  return {
    hostDust:
      hostDust === null
        ? null
        : {
            law: hostDust.law,
            colourExcessMag: hostDust.colourExcessMag,
            ...(hostDust.totalToSelective === null ? {} : { totalToSelective: hostDust.totalToSelective }),
          },
    galacticDust,
    magnification: light.magnification,
    medium: light.intergalactic === 'none' ? null : data.media[light.intergalactic],
    includes: light.includes,
  };
}

function atBand(bandId: BandId, data: LightData): QuotedAt {
  const { response, label } = data.bands[bandId];
  return { kind: 'response', response, label };
}

function offsetOf(system: 'AB' | 'Vega', bandId: BandId): number {
  const offset = toAbOffset(system, bandId);
  if (offset === undefined) throw new Error(`A Vega magnitude in ${bandId} was not refused.`);
  return offset;
}

function continuumOf(continuum: Extract<Light, { kind: 'lineFlux' }>['continuum']): LineContinuum {
  return continuum ?? { kind: 'none' };
}

function presetOf({ presetId }: { presetId: string }): CosmologyPresetId {
  return CosmologyPresetIdSchema.parse(presetId);
}

/** Nothing where the literature used the cosmology in use. */
function derivedWith(
  choice: Extract<Light, { kind: 'lineLuminosity' }>['derivedWith'],
  { cosmology }: LightSetting,
): { derivedWith?: LuminosityDistances } {
  if (choice === null) return {};
  const literature = chooseCosmology(choice, 'light.derivedWith');
  return literature.id === cosmology.id ? {} : { derivedWith: literature.distances };
}

function spectrumOf(spectrum: Spectrum, { uploaded }: LightSetting): RestSpectrum {
  if (spectrum.kind !== 'uploaded') return lightData().restSpectrumOf(spectrum);
  const found = uploaded.get(spectrum.spectrumId);
  if (found === undefined) throw new MissingSpectrumError(spectrum.spectrumId);
  return found;
}

/** A light names a spectrum that is not at hand: it was removed, or belongs to another proposal. */
export class MissingSpectrumError extends Error {
  override readonly name = 'MissingSpectrumError';
  constructor(readonly spectrumId: string) {
    super(`The spectrum ${spectrumId} is not at hand.`);
  }
}

function lineWavelengthNm(lineId: string, data: LightData): number {
  const line = data.lines.find(({ id }) => id === lineId);
  if (line === undefined) throw new Error(`The line list has no ${lineId}.`);
  return line.vacuumWavelengthNm;
}
