import type { OhLinesTable } from '@faintward/photometry/sky-tables';
import { requireBetween } from './check.js';

/** A line of the night sky. */
export interface OhLine {
  /** In vacuum. */
  readonly wavelengthNm: number;
  /** On one arbitrary scale; `null` for a line that is listed without strength. */
  readonly relativeIntensity: number | null;
}

/** What the list covers: nothing is known outside, which does not mean that the sky is dark there. */
export const OH_LINES_LOW_NM = 1083;
export const OH_LINES_HIGH_NM = 2275;

/** Lines from their file, ascending. Positions are good to 0.2 nm below 1210 nm and mostly to 0.01 nm above. */
export function createOhLines({ data }: { readonly data: OhLinesTable }): readonly OhLine[] {
  return data.wavelengthsNm.map((wavelengthNm, i) => ({
    wavelengthNm,
    relativeIntensity: data.relativeIntensities[i] ?? null,
  }));
}

export interface BetweenLinesOptions {
  /** How far from its middle a line spoils the spectrum, in FWHM of the line-spread function. Default 1, common practice. */
  readonly halfWidthFwhm?: number;
  /** Lines fainter than this are passed over, and with them all without strength. Absent: every line of the list counts. */
  readonly faintestRelativeIntensity?: number;
}

export interface BetweenLines {
  /** Part of the range, by wavelength, that no line touches; 0 to 1. */
  readonly freeFraction: number;
  /** What the lines spoil, ascending and apart from each other. */
  readonly spoilt: readonly (readonly [lowNm: number, highNm: number])[];
}

/**
 * What is left of a range between the lines of OH at a resolving power.
 *
 * A line spoils `halfWidthFwhm` resolution elements λ/R to either side; wings further out, which keep the sky between lines
 * above its continuum even at R = 6000, are not in it.
 *
 * @param resolvingPower  λ/FWHM, 50 to 500,000
 * @param rangeNm         inside 1083 to 2275
 * @throws {OutOfDomainError}
 */
export function betweenLines(
  lines: readonly OhLine[],
  resolvingPower: number,
  rangeNm: readonly [lowNm: number, highNm: number],
  { halfWidthFwhm = 1, faintestRelativeIntensity }: BetweenLinesOptions = {},
): BetweenLines {
  const [lowNm, highNm] = rangeNm;
  requireBetween('resolvingPower', resolvingPower, 50, 500_000);
  requireBetween('halfWidthFwhm', halfWidthFwhm, 0.01, 100);
  requireBetween('rangeNm.1', highNm, OH_LINES_LOW_NM, OH_LINES_HIGH_NM, 'nm');
  requireBetween('rangeNm.0', lowNm, OH_LINES_LOW_NM, highNm * (1 - 1e-9), 'nm');
  const spoilt: [number, number][] = [];
  for (const { wavelengthNm, relativeIntensity } of lines) {
    if (faintestRelativeIntensity !== undefined && !((relativeIntensity ?? 0) >= faintestRelativeIntensity)) continue;
    const half = (halfWidthFwhm * wavelengthNm) / resolvingPower;
    const [from, to] = [Math.max(lowNm, wavelengthNm - half), Math.min(highNm, wavelengthNm + half)];
    if (!(from < to)) continue;
    const last = spoilt.at(-1);
    if (last !== undefined && from <= last[1]) last[1] = Math.max(last[1], to);
    else spoilt.push([from, to]);
  }
  const spoiltNm = spoilt.reduce((sum, [from, to]) => sum + (to - from), 0);
  return { freeFraction: Math.max(0, 1 - spoiltNm / (highNm - lowNm)), spoilt };
}
