import { erfc } from './error-function.js';
import { NumericalDomainError } from './errors.js';

/** Probability of a standard normal variable below x. Relative error below 1e-13, in the lower tail too. */
export function normalCdf(x: number): number {
  return 0.5 * erfc(-x / Math.SQRT2);
}

const SQRT_TWO_PI = Math.sqrt(2 * Math.PI);

/** Probability density of a standard normal variable. */
export function normalDensity(x: number): number {
  return Math.exp(-0.5 * x * x) / SQRT_TWO_PI;
}

/** Relative and absolute change of x below which the iteration has reached rounding. */
const ROUNDING = 1e-15;
/** Three suffice; more cost nothing because the iteration ends by itself. */
const MOST_ROUNDS = 8;

/**
 * The x below which a standard normal variable lies with probability p; −Infinity at 0 and Infinity at 1.
 *
 * Absolute error below 1e-12 for p from 1e-300 to 1/2; above, p itself carries no more than 1 − p to 1e-16.
 *
 * @throws {NumericalDomainError} if p is outside 0 to 1
 * @see Abramowitz & Stegun 1964, 26.2.23, for the first guess (4.5e-4), refined by Halley's method
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) throw new NumericalDomainError('p', p, 'between 0 and 1');
  if (p > 0.5) return -lowerQuantile(1 - p);
  return lowerQuantile(p);
}

function lowerQuantile(p: number): number {
  if (p === 0) return -Infinity;
  if (p === 0.5) return 0;
  const t = Math.sqrt(-2 * Math.log(p));
  let x = (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308))) - t;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    // Halley's step for Φ(x) = p, where Φ″/Φ′ = −x.
    const newton = (normalCdf(x) - p) / normalDensity(x);
    const step = newton / (1 + (x * newton) / 2);
    x -= step;
    if (Math.abs(step) <= ROUNDING * Math.max(1, Math.abs(x))) break;
  }
  return x;
}
