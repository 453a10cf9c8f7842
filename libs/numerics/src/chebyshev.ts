import { NumericalDomainError } from './errors.js';

/** A polynomial on [a, b] as a sum of Chebyshev polynomials. */
export interface ChebyshevSeries {
  readonly a: number;
  readonly b: number;
  /** c₀ … cₙ₋₁ in Σ cₖ Tₖ. */
  readonly coefficients: Float64Array;
}

/**
 * The polynomial of degree n − 1 through f at the n Chebyshev nodes of [a, b]: within a small factor of the best polynomial of
 * that degree. For an analytic f the coefficients fall geometrically, so the last ones tell the error.
 *
 * @param count  number of nodes and coefficients, 1 to 1000
 * @throws {NumericalDomainError} for another count, or unless a < b
 * @see DLMF 3.11(ii), equations 3.11.11 and 3.11.12
 */
export function chebyshevFit(f: (x: number) => number, a: number, b: number, count: number): ChebyshevSeries {
  if (!Number.isInteger(count) || count < 1 || count > 1000) {
    throw new NumericalDomainError('count', count, 'an integer from 1 to 1000');
  }
  if (!(a < b)) throw new NumericalDomainError('b', b, `above a, ${a}`);
  const values = Array.from({ length: count }, (_, j) => {
    const node = Math.cos((Math.PI * (j + 0.5)) / count);
    return f((a + b) / 2 + ((b - a) / 2) * node);
  });
  const coefficients = Float64Array.from({ length: count }, (_, k) => {
    let sum = 0;
    for (let j = 0; j < count; j++) sum += values[j]! * Math.cos((Math.PI * k * (j + 0.5)) / count);
    return ((k === 0 ? 1 : 2) / count) * sum;
  });
  return { a, b, coefficients };
}

/**
 * Value of a series at x, by Clenshaw's recurrence.
 *
 * @throws {NumericalDomainError} if x lies outside [a, b]
 * @see DLMF 3.11.15
 */
export function chebyshevValue(series: ChebyshevSeries, x: number): number {
  const { a, b, coefficients } = series;
  if (!(x >= a && x <= b)) throw new NumericalDomainError('x', x, `between ${a} and ${b}`);
  const t = (2 * x - a - b) / (b - a);
  let next = 0;
  let afterNext = 0;
  for (let k = coefficients.length - 1; k >= 1; k--) {
    const current = 2 * t * next - afterNext + coefficients[k]!;
    afterNext = next;
    next = current;
  }
  return t * next - afterNext + coefficients[0]!;
}

/**
 * The integral of a series from a to x, as a series of one degree more.
 *
 * @see DLMF 18.17.46 for the integral of Tₖ
 */
export function chebyshevIntegral(series: ChebyshevSeries): ChebyshevSeries {
  const { a, b, coefficients } = series;
  const count = coefficients.length;
  const half = (b - a) / 2;
  const result = new Float64Array(count + 1);
  const at = (k: number): number => (k < count ? coefficients[k]! : 0);
  for (let k = 1; k <= count; k++) {
    const before = k === 1 ? 2 * at(0) : at(k - 1);
    result[k] = (half * (before - at(k + 1))) / (2 * k);
  }
  // The constant makes it vanish at a, where T_k = (−1)^k.
  let atStart = 0;
  for (let k = 1; k <= count; k++) atStart += (k % 2 === 0 ? 1 : -1) * result[k]!;
  result[0] = -atStart;
  return { a, b, coefficients: result };
}
