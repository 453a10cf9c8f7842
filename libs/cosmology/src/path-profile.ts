import type { Expansion } from './expansion.js';
import { comovingBetween, timeBetween, timeSinceBigBang } from './line-of-sight.js';

/**
 * Comoving distance, lookback time and age at equally spaced x = ln(1 + z), in Hubble units. Serves to enclose solutions and
 * turning points and to shorten the integrals that refine them.
 */
export interface PathProfile {
  readonly x: Float64Array;
  readonly comoving: Float64Array;
  readonly lookback: Float64Array;
  /** Summed from the early end, so that small ages keep their digits. Infinity throughout where there was no beginning. */
  readonly age: Float64Array;
}

export function createPathProfile(expansion: Expansion, lastX: number, cells = 400): PathProfile {
  const x = Float64Array.from({ length: cells + 1 }, (_, i) => (lastX * i) / cells);
  const comoving = new Float64Array(cells + 1);
  const lookback = new Float64Array(cells + 1);
  const age = new Float64Array(cells + 1);
  age[cells] = timeSinceBigBang(expansion, lastX);
  const steps = new Float64Array(cells);
  for (let i = 0; i < cells; i++) {
    comoving[i + 1] = comoving[i]! + comovingBetween(expansion, x[i]!, x[i + 1]!);
    steps[i] = timeBetween(expansion, x[i]!, x[i + 1]!);
    lookback[i + 1] = lookback[i]! + steps[i]!;
  }
  for (let i = cells - 1; i >= 0; i--) age[i] = age[i + 1]! + steps[i]!;
  return { x, comoving, lookback, age };
}
