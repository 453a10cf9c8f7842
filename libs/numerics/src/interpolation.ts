import { NumericalDomainError } from './errors.js';

/** A function of one variable drawn through given points, defined between the first and the last of them. */
export interface Interpolant {
  readonly minimum: number;
  readonly maximum: number;
  /**
   * Value at x.
   *
   * @throws {NumericalDomainError} if x lies outside [minimum, maximum] or is NaN: nothing is extrapolated
   */
  at(x: number): number;
}

/**
 * Index i with column[i] ≤ x < column[i + 1], by bisection; the last interval also holds its right end.
 *
 * @param column  ascending, at least two values
 * @param x  between the first and the last of them
 */
export function intervalOf(column: ArrayLike<number>, x: number): number {
  let low = 0;
  let high = column.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (column[middle]! <= x) low = middle;
    else high = middle;
  }
  return low;
}

function checkPoints(x: ArrayLike<number>, y: ArrayLike<number>): void {
  if (x.length < 2) throw new NumericalDomainError('x.length', x.length, 'at least 2');
  if (x.length !== y.length) throw new NumericalDomainError('y.length', y.length, `equal to x.length, ${x.length}`);
  for (let i = 0; i < x.length; i++) {
    if (!Number.isFinite(x[i]!)) throw new NumericalDomainError(`x[${i}]`, x[i]!, 'finite');
    if (!Number.isFinite(y[i]!)) throw new NumericalDomainError(`y[${i}]`, y[i]!, 'finite');
    if (i > 0 && !(x[i]! > x[i - 1]!))
      throw new NumericalDomainError(`x[${i}]`, x[i]!, `above x[${i - 1}], ${x[i - 1]!}`);
  }
}

function checkInside(x: number, minimum: number, maximum: number): void {
  if (!(x >= minimum && x <= maximum)) throw new NumericalDomainError('x', x, `between ${minimum} and ${maximum}`);
}

/**
 * Straight lines between the points. Exact at the points; error up to h² max|f″|/8 between them.
 *
 * @param x  strictly ascending, finite, at least two; copied
 * @param y  same length, finite; copied
 * @throws {NumericalDomainError} naming the first bad element
 */
export function linearInterpolant(x: ArrayLike<number>, y: ArrayLike<number>): Interpolant {
  checkPoints(x, y);
  const xs = Float64Array.from(x);
  const ys = Float64Array.from(y);
  const minimum = xs[0]!;
  const maximum = xs.at(-1)!;
  return {
    minimum,
    maximum,
    at(value) {
      checkInside(value, minimum, maximum);
      const i = intervalOf(xs, value);
      const t = (value - xs[i]!) / (xs[i + 1]! - xs[i]!);
      // Written so that both ends come out exactly.
      return ys[i]! * (1 - t) + ys[i + 1]! * t;
    },
  };
}

/**
 * Cubic pieces with a continuous slope that never overshoot: monotone wherever the points are, flat at their local extremes.
 * Exact at the points; error of order h³ or better away from extremes of a smooth function.
 *
 * @param x  strictly ascending, finite, at least two; copied
 * @param y  same length, finite; copied
 * @throws {NumericalDomainError} naming the first bad element
 * @see Fritsch & Carlson 1980, SIAM J. Numer. Anal. 17, 238 (condition for monotone pieces); slopes by the weighted harmonic
 *   mean of Fritsch & Butland 1984, SIAM J. Sci. Stat. Comput. 5, 300
 */
export function monotoneCubicInterpolant(x: ArrayLike<number>, y: ArrayLike<number>): Interpolant {
  checkPoints(x, y);
  const xs = Float64Array.from(x);
  const ys = Float64Array.from(y);
  const last = xs.length - 1;
  const width = (i: number): number => xs[i + 1]! - xs[i]!;
  const secant = (i: number): number => (ys[i + 1]! - ys[i]!) / width(i);
  const slopes = new Float64Array(xs.length);
  for (let i = 1; i < last; i++) {
    const left = secant(i - 1);
    const right = secant(i);
    if (left * right > 0) {
      const a = 2 * width(i) + width(i - 1);
      const b = width(i) + 2 * width(i - 1);
      slopes[i] = (a + b) / (a / left + b / right);
    }
  }
  slopes[0] = last === 1 ? secant(0) : endSlope(width(0), width(1), secant(0), secant(1));
  slopes[last] =
    last === 1 ? secant(0) : endSlope(width(last - 1), width(last - 2), secant(last - 1), secant(last - 2));
  const minimum = xs[0]!;
  const maximum = xs[last]!;
  return {
    minimum,
    maximum,
    at(value) {
      checkInside(value, minimum, maximum);
      const i = intervalOf(xs, value);
      const h = width(i);
      const t = (value - xs[i]!) / h;
      const u = 1 - t;
      return (
        ys[i]! * (1 + 2 * t) * u * u +
        slopes[i]! * h * t * u * u +
        ys[i + 1]! * t * t * (3 - 2 * t) -
        slopes[i + 1]! * h * t * t * u
      );
    },
  };
}

/** One-sided three-point slope, held within the bounds that keep the end piece monotone. */
function endSlope(hNear: number, hNext: number, near: number, next: number): number {
  const slope = ((2 * hNear + hNext) * near - hNear * next) / (hNear + hNext);
  if (slope * near <= 0) return 0;
  if (near * next <= 0 && Math.abs(slope) > 3 * Math.abs(near)) return 3 * near;
  return slope;
}
