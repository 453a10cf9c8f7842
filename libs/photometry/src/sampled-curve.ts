import { OutOfDomainError } from './domain.js';

/**
 * A function of wavelength given by points: linear between them, zero outside the first and the last. Two points at the
 * same wavelength make a jump (the first holds to the left of it, the second to the right).
 *
 * Responses (dimensionless, photon counting, detector included where it is known), spectra (f_λ in any unit) and
 * transmissions are all of this shape. Wavelengths are in vacuum.
 */
export interface SampledCurve {
  /** Ascending; at most two equal neighbours. At least two. */
  readonly wavelengthsNm: Float64Array;
  readonly values: Float64Array;
}

/**
 * A curve from two lists, checked and copied.
 *
 * @throws {OutOfDomainError} naming the first point that is not finite, does not ascend, or is negative
 */
export function sampledCurve(wavelengthsNm: ArrayLike<number>, values: ArrayLike<number>): SampledCurve {
  if (wavelengthsNm.length < 2) throw new OutOfDomainError('wavelengthsNm.length', wavelengthsNm.length, 'at least 2');
  if (values.length !== wavelengthsNm.length) {
    throw new OutOfDomainError('values.length', values.length, `as many as wavelengths, ${wavelengthsNm.length}`);
  }
  for (let i = 0; i < wavelengthsNm.length; i++) {
    const wavelength = wavelengthsNm[i]!;
    if (!(wavelength > 0 && wavelength < Infinity)) {
      throw new OutOfDomainError(`wavelengthsNm.${i}`, wavelength, 'a finite number above 0');
    }
    if (i > 0 && wavelength < wavelengthsNm[i - 1]!) {
      throw new OutOfDomainError(`wavelengthsNm.${i}`, wavelength, `at least the one before, ${wavelengthsNm[i - 1]!}`);
    }
    if (i > 1 && wavelength === wavelengthsNm[i - 2]!) {
      throw new OutOfDomainError(`wavelengthsNm.${i}`, wavelength, 'given at most twice');
    }
    if (!(values[i]! >= 0 && values[i]! < Infinity)) {
      throw new OutOfDomainError(`values.${i}`, values[i], 'a finite number, 0 or more');
    }
  }
  return { wavelengthsNm: Float64Array.from(wavelengthsNm), values: Float64Array.from(values) };
}

/** A curve of one value between two wavelengths. */
export function boxCurve(lowNm: number, highNm: number, value = 1): SampledCurve {
  return sampledCurve([lowNm, highNm], [value, value]);
}

/** Value at a wavelength; at a jump the one to the right of it. */
export function curveValueAt({ wavelengthsNm, values }: SampledCurve, wavelengthNm: number): number {
  const last = wavelengthsNm.length - 1;
  if (!(wavelengthNm >= wavelengthsNm[0]! && wavelengthNm <= wavelengthsNm[last]!)) return 0;
  if (wavelengthNm === wavelengthsNm[last]!) return values[last]!;
  const i = firstAbove(wavelengthsNm, wavelengthNm) - 1;
  const t = (wavelengthNm - wavelengthsNm[i]!) / (wavelengthsNm[i + 1]! - wavelengthsNm[i]!);
  return values[i]! * (1 - t) + values[i + 1]! * t;
}

/** Index of the first element above x, or the length; by bisection. */
export function firstAbove(ascending: Float64Array, x: number): number {
  let low = 0;
  let high = ascending.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (ascending[middle]! <= x) low = middle + 1;
    else high = middle;
  }
  return low;
}
