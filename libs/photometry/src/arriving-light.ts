import { ArrivingContinuum } from './arriving-continuum.js';
import { ArrivingLine } from './arriving-line.js';
import type { LuminosityDistances, SourceLight } from './source-light.js';

/** A source's light above the atmosphere. */
export type ArrivingLight = ArrivingContinuum | ArrivingLine;

/**
 * What arrives of a light.
 *
 * @param distances  of the cosmology in use; asked only where the light is given as a luminosity
 * @param isSurface  the light is per arcsec², which lensing leaves as it is
 */
export function arrivingLight(
  light: SourceLight,
  redshift: number,
  distances: LuminosityDistances,
  isSurface = false,
): ArrivingLight {
  return light.kind === 'line'
    ? new ArrivingLine(light, redshift, distances, isSurface)
    : new ArrivingContinuum(light, redshift, distances, isSurface);
}
