import type { Notice } from '@faintward/contracts/common';
import type { BandId, Extent, Light } from '@faintward/contracts/light';
import type { InstrumentMode } from '@faintward/exposure';
import { type ArrivingLight, arrivingLight, type NoLight, type Response } from '@faintward/photometry';
import { isLine, type LightSetting } from './light.js';
import { resolveLight } from './resolve-light.js';
import { lightData } from './light-data.js';

/** Rest wavelength of the far ultraviolet luminosity that sizes go with. */
const FAR_ULTRAVIOLET_NM = 160;

/** Bands whose magnitudes stand in the target grid. */
export const GRID_BANDS = ['g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks'] as const satisfies readonly BandId[];

/** What arrives of a light. The light must be without fault. */
export function arrive(light: Light, extent: Extent, setting: LightSetting, mode?: InstrumentMode): ArrivingLight {
  const source = resolveLight(light, setting, mode);
  return arrivingLight(source, setting.redshift, setting.cosmology.distances, extent.kind === 'uniform');
}

/** What dust or the tail of a spectrum leaves where it is less than the computer can hold. */
export const TOO_FAINT: NoLight = {
  code: 'noFluxInBand',
  message:
    'Next to nothing of this light arrives here: dust or the shape of its spectrum leaves too little for a number.',
};

/** AB magnitude above the atmosphere, or why there is none; always a number that can be written down. */
export function magnitudeIn(arriving: ArrivingLight, response: Response): number | NoLight {
  const found = arriving.magnitudeIn(response);
  return typeof found === 'number' && !Number.isFinite(found) ? TOO_FAINT : found;
}

/** Absolute ultraviolet magnitude, where the light says one. */
export function ultravioletMagnitudeOf(arriving: ArrivingLight): number | undefined {
  return absoluteMagnitudeAt(arriving, FAR_ULTRAVIOLET_NM);
}

/** Of a continuum, where it has light at this rest wavelength. */
export function absoluteMagnitudeAt(arriving: ArrivingLight, restWavelengthNm: number): number | undefined {
  if (arriving.kind === 'line') return undefined;
  const found = arriving.absoluteMagnitudeAt(restWavelengthNm);
  return found === undefined || Number.isFinite(found) ? found : undefined;
}

/** Observed wavelength that a light is quoted at, for choosing a band to look at it in. */
function quotedWavelengthNm(light: Light, arriving: ArrivingLight): number {
  if (arriving.kind === 'line') return arriving.observedWavelengthNm;
  const { at, frame } = arriving.light;
  const stretch = frame === 'rest' ? 1 + arriving.redshift : 1;
  if (at.kind === 'range') return NaN;
  return (at.kind === 'wavelength' ? at.wavelengthNm : at.response.pivotWavelengthNm) * stretch;
}

/** The band that a light is best looked at in: that it is quoted in, that holds its line, or the nearest to it. */
export function defaultBandOf(light: Light, arriving: ArrivingLight): BandId {
  if (light.kind === 'apparentMagnitude') return light.bandId;
  const { bands } = lightData();
  const wavelengthNm = quotedWavelengthNm(light, arriving);
  const preferred = GRID_BANDS.map((id) => bands[id]);
  const holding = preferred.find(
    (band) => wavelengthNm >= band.wavelengthLowNm && wavelengthNm <= band.wavelengthHighNm,
  );
  if (isLine(light) && holding !== undefined) return holding.id;
  const nearest = preferred.reduce((best, band) => {
    const distance = (each: typeof band) => Math.abs(Math.log(each.pivotWavelengthNm / wavelengthNm));
    return distance(band) < distance(best) ? band : best;
  });
  // A continuum quoted far outside every band, or in a dark one, is looked at where it shines.
  if (typeof magnitudeIn(arriving, nearest.response) === 'number') return nearest.id;
  return preferred.find((band) => typeof magnitudeIn(arriving, band.response) === 'number')?.id ?? nearest.id;
}

/** What must be said of a light wherever it is shown. */
export function lightNotices(light: Light): Notice[] {
  const notices: Notice[] = [];
  if (light.kind === 'typical') {
    notices.push({
      code: 'typicalLight',
      message: 'The brightness is what is typical of its kind at this redshift: a suggestion, not a measurement.',
      severity: 'warning',
      field: 'light.kind',
    });
  }
  return notices;
}
