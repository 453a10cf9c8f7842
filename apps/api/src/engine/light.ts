import type { BandId, Light } from '@faintward/contracts/light';
import type { RestSpectrum } from '@faintward/photometry';
import type { ChosenCosmology } from './cosmologies.js';
import { lightData } from './light-data.js';

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

/** m_AB − m of a magnitude in a system; undefined for a Vega magnitude in a band without an offset. */
export function toAbOffset(system: 'AB' | 'Vega', bandId: BandId): number | undefined {
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
