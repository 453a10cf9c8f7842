import { NotConvergedError } from './errors.js';

const TWO_OVER_SQRT_PI = 2 / Math.sqrt(Math.PI);
const ONE_OVER_SQRT_PI = 1 / Math.sqrt(Math.PI);

/** Beyond this the series needs many terms and the continued fraction few. */
const SERIES_LIMIT = 2;
/** erfc(x) is below the smallest positive double from here on. */
const ERFC_UNDERFLOW = 27.3;

/** erf for |x| ≤ 2; all terms have one sign, so nothing cancels. DLMF 7.6.2. */
function erfSeries(x: number): number {
  const twoX2 = 2 * x * x;
  let term = 1;
  let sum = 1;
  for (let n = 1; n < 100; n++) {
    term *= twoX2 / (2 * n + 1);
    sum += term;
    if (term < 1e-17 * sum) return TWO_OVER_SQRT_PI * x * Math.exp(-x * x) * sum;
  }
  throw new NotConvergedError('erf', 100, `x = ${x}`);
}

/** e^(−x²) without the rounding of x² being magnified: x is split so that the square of its head is exact. */
function expMinusSquare(x: number): number {
  const head = Math.fround(x);
  return Math.exp(-head * head) * Math.exp(-(x - head) * (x + head));
}

/** erfc for x > 2 from its continued fraction, DLMF 7.9.1, by the modified Lentz method. */
function erfcFraction(x: number): number {
  // √π e^{x²} erfc(x) = 1/(x + (1/2)/(x + 1/(x + (3/2)/(x + …))))
  let f = x;
  let c = x;
  let d = 0;
  for (let n = 1; n < 300; n++) {
    const a = n / 2;
    d = 1 / (x + a * d);
    c = x + a / c;
    const factor = c * d;
    f *= factor;
    if (Math.abs(factor - 1) < 2e-16) return (ONE_OVER_SQRT_PI * expMinusSquare(x)) / f;
  }
  throw new NotConvergedError('erfc', 300, `x = ${x}`);
}

/**
 * Error function, erf(x) = 2/√π ∫₀ˣ e^(−t²) dt.
 *
 * Valid for every real x, ±∞ included; NaN gives NaN. Relative error below 2e-15.
 *
 * @see NIST Digital Library of Mathematical Functions, 7.6.2 (series) and 7.9.1 (continued fraction)
 */
export function erf(x: number): number {
  if (Number.isNaN(x)) return NaN;
  const size = Math.abs(x);
  if (size <= SERIES_LIMIT) return erfSeries(x);
  if (size > 6) return Math.sign(x);
  return Math.sign(x) * (1 - erfcFraction(size));
}

/**
 * Complementary error function, erfc(x) = 1 − erf(x), without cancellation for large x.
 *
 * Valid for every real x; NaN gives NaN. Relative error below 2e-14 while the result is a normal number;
 * exactly 0 above x ≈ 27.3.
 *
 * @see DLMF 7.6.2 and 7.9.1
 */
export function erfc(x: number): number {
  if (Number.isNaN(x)) return NaN;
  if (x > ERFC_UNDERFLOW) return 0;
  if (x > SERIES_LIMIT) return erfcFraction(x);
  if (x < -SERIES_LIMIT) return 1 + erf(-x);
  // Between 0.5 and 2 the subtraction costs at most three digits of sixteen; the fraction is exact enough from 1 on.
  if (x > 1) return erfcFraction(x);
  return 1 - erfSeries(x);
}
