import { OutOfDomainError } from './domain.js';

/** A part of the spectrum where the atmosphere lets light through (window) or takes it (gap). */
export interface AtmosphericRange {
  readonly label: string;
  readonly kind: 'window' | 'gap';
  /** Gaps only: partly open, by water, airmass and exact wavelength, or dark over most of the width. */
  readonly depth?: 'partial' | 'opaque' | undefined;
  /** Included. */
  readonly lowNm: number;
  /** Not included: it is the next range's. */
  readonly highNm: number;
}

/** `atmosphere-windows.json`. */
export interface AtmosphereTable {
  readonly windows: readonly AtmosphericRange[];
}

/** What the ranges of the atmosphere cover together. */
export const ATMOSPHERE_LOW_NM = 300;
export const ATMOSPHERE_HIGH_NM = 5500;

/**
 * Windows and gaps from their file, ascending: together they cover 300 nm to 5.5 µm, each wavelength once.
 *
 * @throws {OutOfDomainError} naming the first range that overlaps, leaves a hole or has no depth where it is a gap
 */
export function createAtmosphere({ data }: { readonly data: AtmosphereTable }): readonly AtmosphericRange[] {
  let reachedNm = ATMOSPHERE_LOW_NM;
  for (const { label, kind, depth, lowNm, highNm } of data.windows) {
    if (lowNm !== reachedNm) throw new OutOfDomainError(`${label}: lowNm`, lowNm, `where the last ended, ${reachedNm}`);
    if (!(highNm > lowNm)) throw new OutOfDomainError(`${label}: highNm`, highNm, `above ${lowNm}`);
    if ((kind === 'gap') !== (depth !== undefined)) {
      throw new OutOfDomainError(`${label}: depth`, depth, 'given for a gap and only for a gap');
    }
    reachedNm = highNm;
  }
  if (reachedNm !== ATMOSPHERE_HIGH_NM) {
    throw new OutOfDomainError('last highNm', reachedNm, String(ATMOSPHERE_HIGH_NM));
  }
  return data.windows;
}

/** The range that an observed wavelength lies in, or undefined outside 300 nm to 5.5 µm. */
export function atmosphericRangeAt(
  ranges: readonly AtmosphericRange[],
  observedNm: number,
): AtmosphericRange | undefined {
  return ranges.find(({ lowNm, highNm }) => observedNm >= lowNm && observedNm < highNm);
}
