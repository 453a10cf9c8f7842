import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { latinHypercube, randomStream, splitmix64, xoshiro128StarStar } from './random.js';

const take = <T>(count: number, next: () => T): T[] => Array.from({ length: count }, next);

describe('generators give the published output', () => {
  it('splitmix64', () => {
    // Output of the authors' splitmix64.c for this seed, as printed in the tests of the Rust crate rand_xoshiro.
    expect(take(5, splitmix64(1477776061723855037n))).toEqual([
      1985237415132408290n,
      2979275885539914483n,
      13511426838097143398n,
      8488337342461049707n,
      15141737807933549159n,
    ]);
  });

  it('xoshiro128**', () => {
    // Output of the authors' xoshiro128starstar.c for this state, as printed in the tests of the Rust crate rand_xoshiro.
    expect(take(10, xoshiro128StarStar([1, 2, 3, 4]).nextUint32)).toEqual([
      11520, 0, 5927040, 70819200, 2031721883, 1637235492, 1287239034, 3734860849, 3729100597, 4258142804,
    ]);
  });

  it('xoshiro128** seeded by splitmix64', () => {
    // Both of the authors' programs joined, low word first: printed by a public implementation that checks itself against them.
    expect(take(8, randomStream(42).nextUint32)).toEqual([
      1776835114, 4165204688, 17111135, 2317295270, 2792088233, 2554630222, 2940343271, 2244566231,
    ]);
  });
});

describe('a stream', () => {
  it('is the same for the same seed and another for another', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 2 ** 31 }), (seed) => {
        const numbers = take(4, randomStream(seed).nextUniform);
        const again = take(4, randomStream(seed).nextUniform);
        const other = take(4, randomStream(seed + 1).nextUniform);
        return numbers.every((x, i) => x === again[i] && x > 0 && x < 1) && numbers[0] !== other[0];
      }),
    );
  });

  it('is even: mean, variance and correlation of neighbours as they must be within 4 σ', () => {
    const count = 100_000;
    const x = take(count, randomStream(7).nextUniform);
    const mean = x.reduce((sum, value) => sum + value, 0) / count;
    const variance = x.reduce((sum, value) => sum + (value - 0.5) ** 2, 0) / count;
    const neighbours = x.slice(1).reduce((sum, value, i) => sum + (value - 0.5) * (x[i]! - 0.5), 0) / count;
    // Standard errors of independent uniforms: √(1/12), √(1/180) and 1/12, each over √count.
    expect(Math.abs(mean - 0.5)).toBeLessThan((4 * Math.sqrt(1 / 12)) / Math.sqrt(count));
    expect(Math.abs(variance - 1 / 12)).toBeLessThan((4 * Math.sqrt(1 / 180)) / Math.sqrt(count));
    expect(Math.abs(neighbours)).toBeLessThan((4 * (1 / 12)) / Math.sqrt(count));
  });

  it('refuses a seed that is not whole and a state of zeros', () => {
    expect(() => randomStream(0.5)).toThrow(/seed/);
    expect(() => xoshiro128StarStar([0, 0, 0, 0])).toThrow(/state/);
  });
});

describe('latin hypercube', () => {
  it('puts one number into each part of every input, in different orders', () => {
    const columns = latinHypercube(1000, 2, randomStream(3));
    for (const column of columns) {
      const parts = [...column].map((x) => Math.floor(x * 1000)).sort((a, b) => a - b);
      expect(parts).toEqual(take(1000, () => 0).map((_, i) => i));
    }
    const [first, second] = columns as [Float64Array, Float64Array];
    const covariance = first.reduce((sum, x, i) => sum + (x - 0.5) * (second[i]! - 0.5), 0) / 1000;
    expect(Math.abs(covariance)).toBeLessThan((4 * (1 / 12)) / Math.sqrt(1000));
    expect([...first]).not.toEqual([...first].sort((a, b) => a - b));
  });

  it('makes the mean of an additive function far better than independent draws', () => {
    const error = (seed: number): number => {
      const [x, y] = latinHypercube(500, 2, randomStream(seed)) as [Float64Array, Float64Array];
      return x.reduce((sum, value, i) => sum + value ** 2 + Math.exp(y[i]!), 0) / 500 - (1 / 3 + Math.E - 1);
    };
    const errors = take(20, () => 0).map((_, seed) => error(seed) ** 2);
    const rms = Math.sqrt(errors.reduce((sum, e) => sum + e, 0) / 20);
    // Independent draws: σ = √(4/45 + 0.2420) = 0.575, over √500 = 0.0257; stratified by one part in 500 of that spread.
    expect(rms).toBeLessThan(0.0257 / 50);
  });
});
