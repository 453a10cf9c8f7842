import { type CosmologyPresetId, CosmologyPresetId as CosmologyPresetIdSchema } from '@faintward/contracts/cosmology';
import type { BandId, Light, Spectrum } from '@faintward/contracts/light';
import type { InstrumentMode } from '@faintward/exposure';
import {
  absoluteMagnitudeFromLuminosityDensity,
  hydrogenAlphaFromStarFormation,
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
import { chooseCosmology } from './cosmologies.js';
import { type LightSetting, toAbOffset } from './light.js';
import { type LightData, lightData } from './light-data.js';

/** Rest wavelength of the far ultraviolet that star-formation rates are calibrated at. */
const ULTRAVIOLET_NM = 150;

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
