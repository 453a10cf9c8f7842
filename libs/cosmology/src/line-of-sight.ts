import { integrateAdaptively } from '@faintward/numerics';
import type { Expansion } from './expansion.js';

/** Wanted by the error estimate, which is pessimistic by several digits: true errors are at the level of rounding. */
const TOLERANCE = { relativeTolerance: 1e-12 };

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
    TOLERANCE,
  );
}

/** ∫ dz/((1+z)E) between two values of x = ln(1 + z), in units of the Hubble time. Hogg 1999, eq. 30. */
export function timeBetween(expansion: Expansion, x1: number, x2: number): number {
  return integrateAdaptively((x) => 1 / expansion.rate(Math.exp(x)), x1, x2, TOLERANCE);
}

/** Where exp(x) comes near overflow. */
const LAST_LOG = 700;

/**
 * Time from the big bang to x = ln(1 + z), in units of the Hubble time; Infinity if there was no beginning.
 *
 * Whole steps in x are integrated until the remainder, taken as the power law E ∝ exp(p x) that E has become by then, is so
 * small that the last change of p could move the sum by less than 1e-14 of itself.
 */
export function timeSinceBigBang(expansion: Expansion, start: number): number {
  let total = 0;
  let slopeBefore = Number.NaN;
  let changeBefore = Number.NaN;
  let rate = expansion.rate(Math.exp(start));
  for (let x = start; x < LAST_LOG; x++) {
    total += timeBetween(expansion, x, x + 1);
    const rateAfter = expansion.rate(Math.exp(x + 1));
    const slope = Math.log(rateAfter / rate);
    const change = Math.abs(slope - slopeBefore);
    const remainder = 1 / (slope * rateAfter);
    if (slope > 0 && remainder < 1e-6 * total) {
      const doubt = (Math.max(change, changeBefore) / slope) * remainder;
      if (doubt < 1e-14 * total) return total + remainder;
    }
    if (rateAfter === Infinity) return total;
    slopeBefore = slope;
    changeBefore = change;
    rate = rateAfter;
  }
  return Infinity;
}
