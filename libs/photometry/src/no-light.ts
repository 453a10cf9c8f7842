import type { LuminosityDistances, NoLight } from './source-light.js';

/** Below this share of its photons a band is dark: the mean models say nothing reliable about the rest. */
export const DARK_TRANSMISSION = 0.01;

/** A luminosity at redshift 0. */
export const NO_DISTANCE: NoLight = {
  code: 'noDistance',
  message: 'At redshift 0 there is no distance, which a luminosity needs.',
};

/** 5 log10(D_L / 10 pc). */
export function distanceModulusMag(distances: LuminosityDistances, redshift: number): number {
  return 5 * Math.log10(distances.luminosityDistanceMpc(redshift)) + 25;
}

/** A wavelength for a sentence: `1.13 µm`. */
export function inMicrons(wavelengthNm: number): string {
  return `${Number((wavelengthNm / 1000).toPrecision(3))} µm`;
}
