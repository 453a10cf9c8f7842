import type { FieldError } from '@faintward/contracts/errors';
import type { Extent, Light } from '@faintward/contracts/light';
import { apparentMagnitudeAbOf, isIntrinsic, toAbOffset, type UploadedSpectra, uploadedSpectrumOf } from './light.js';

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
