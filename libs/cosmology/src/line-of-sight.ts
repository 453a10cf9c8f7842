import { integrateAdaptively } from '@faintward/numerics';
import type { Expansion } from './expansion.js';

/**
 * Wanted by the error estimate, which is pessimistic by several digits: true errors are at the level of rounding. Where the
 * terms of E² nearly cancel, what is left of its digits is all that can be asked.
 */
function tolerance(expansion: Expansion): { relativeTolerance: number } {
  return { relativeTolerance: Math.max(1e-12, 1e-15 / expansion.leastPurity) };
}

/*
 * Integrals are taken in x = ln(1 + z): the integrands are then analytic in a strip of width π/3 or more about the real axis
 * for ordinary models, and the low-redshift end keeps its relative accuracy because x itself is exact there (log1p).
 */

/** ∫ dz/E between two values of x = ln(1 + z), in units of the Hubble distance. Hogg 1999, eq. 15. */
export function comovingBetween(expansion: Expansion, x1: number, x2: number): number {
  return integrateAdaptively(
    (x) => {
      const s = Math.exp(x);
      return s / expansion.rate(s);
    },
    x1,
    x2,
    tolerance(expansion),
  );
}

/** ∫ dz/((1+z)E) between two values of x = ln(1 + z), in units of the Hubble time. Hogg 1999, eq. 30. */
export function timeBetween(expansion: Expansion, x1: number, x2: number): number {
  return integrateAdaptively((x) => 1 / expansion.rate(Math.exp(x)), x1, x2, tolerance(expansion));
}

/** Beyond this the fourth power of 1 + z would overflow. */
const LAST_LOG = 170;
/** A rate that still grows slower than this with ln(1 + z) will not make the age finite. */
const SLOWEST_GROWTH = 1e-9;
/**
 * A rate below this is that of dark energy which fades into the past with nothing behind it: the least density that counts
 * would keep the rate higher. The expansion never began, and squares of such a rate soon lose their digits.
 */
const NEVER_BEGAN_RATE = 1e-50;

/**
 * Time from the big bang to x = ln(1 + z), in units of the Hubble time; Infinity if there was no beginning.
 *
 * Whole steps in x are integrated until the remainder, taken as the power law E ∝ exp(p x) that E has become by then, is so
 * small that the last change of p could move the sum by less than 1e-14 of itself.
 */
export function timeSinceBigBang(expansion: Expansion, start: number): number {
  let total = 0;
  let slope = Number.NaN;
  let change = Number.NaN;
  let rate = expansion.rate(Math.exp(start));
  for (let x = start; x + 1 < LAST_LOG; x++) {
    if (rate < NEVER_BEGAN_RATE) return Infinity;
    const slopeBefore = slope;
    const changeBefore = change;
    total += timeBetween(expansion, x, x + 1);
    const rateAfter = expansion.rate(Math.exp(x + 1));
    slope = Math.log(rateAfter / rate);
    change = Math.abs(slope - slopeBefore);
    rate = rateAfter;
    const remainder = 1 / (slope * rate);
    // Two changes in a row, and a remainder that is small anyhow, so that one chance plateau of p does not end the sum.
    const doubt = (Math.max(change, changeBefore) / slope) * remainder;
    if (slope > 0 && remainder < 1e-6 * total && doubt < 1e-14 * total) return total + remainder;
  }
  // Still growing so slowly: by now one pure power, whose remainder is exact.
  return slope > SLOWEST_GROWTH ? total + 1 / (slope * rate) : Infinity;
}
