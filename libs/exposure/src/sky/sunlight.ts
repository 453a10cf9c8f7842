import type { SunlightTable } from '@faintward/photometry/sky-tables';
import { requireBetween } from './check.js';

export const SUNLIGHT_LOW_NM = 300;
export const SUNLIGHT_HIGH_NM = 2500;

/** Colours of scattered sunlight and moonlight against V, in AB magnitudes: positive is fainter than in V. */
export interface Sunlight {
  /** Of the Sun; zodiacal light has nearly this colour. */
  solarColourAb(wavelengthNm: number): number;
  /** Of the Moon: the Sun's light reflected ∝ λ^p, redder than the Sun's. */
  moonColourAb(wavelengthNm: number): number;
}

/**
 * Colours from their file, straight in ln λ between its points and beyond them. Solar colours are good to 0.05 mag,
 * the Moon's to 0.1 mag. Defined from 300 to 2500 nm.
 *
 * @param visualNm  wavelength that stands for V, where both colours are 0
 */
export function createSunlight({ data }: { readonly data: SunlightTable }, visualNm: number): Sunlight {
  const logs = data.wavelengthsNm.map((nm) => Math.log(nm));
  const magnitude = (wavelengthNm: number): number => {
    requireBetween('wavelengthNm', wavelengthNm, SUNLIGHT_LOW_NM, SUNLIGHT_HIGH_NM, 'nm');
    const x = Math.log(wavelengthNm);
    const found = logs.findIndex((each, i) => i > 0 && each >= x);
    const i = found === -1 ? logs.length - 1 : found;
    const t = (x - logs[i - 1]!) / (logs[i]! - logs[i - 1]!);
    return data.absoluteMagnitudesAb[i - 1]! * (1 - t) + data.absoluteMagnitudesAb[i]! * t;
  };
  const visual = magnitude(visualNm);
  const solarColourAb = (wavelengthNm: number): number => magnitude(wavelengthNm) - visual;
  return {
    solarColourAb,
    moonColourAb: (wavelengthNm) =>
      solarColourAb(wavelengthNm) - 2.5 * data.moonReflectancePower * Math.log10(wavelengthNm / visualNm),
  };
}
