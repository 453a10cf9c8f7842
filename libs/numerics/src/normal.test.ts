import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { normalCdf, normalDensity, normalQuantile } from './normal.js';

describe('normal distribution', () => {
  it.each([
    // Classical table values: NIST/SEMATECH e-Handbook 1.3.6.7.1 and the usual critical values, to the digits printed.
    [0.84, 0.994457883],
    [0.975, 1.959963985],
    [0.9995, 3.290526731],
    [0.5, 0],
  ])('has its quantile of %d at %d', (p, x) => {
    expect(Math.abs(normalQuantile(p) - x)).toBeLessThan(1e-9);
    expect(Math.abs(normalQuantile(1 - p) + x)).toBeLessThan(1e-9);
  });

  it('has quantile and probability inverse to each other, far into the tail', () => {
    fc.assert(
      fc.property(fc.double({ min: -37, max: 5, noNaN: true }), (x) => {
        // Above the median p carries 1 − p to 1e-16 only, which is worth 1e-16 over the density in x.
        const lost = 4e-16 / normalDensity(x);
        return Math.abs(normalQuantile(normalCdf(x)) - x) < 1e-12 * Math.max(1, Math.abs(x)) + (x > 0 ? lost : 0);
      }),
    );
  });

  it('is infinite at the ends and refuses what is no probability', () => {
    expect(normalQuantile(0)).toBe(-Infinity);
    expect(normalQuantile(1)).toBe(Infinity);
    expect(() => normalQuantile(1.1)).toThrow(/p must be/);
    expect(() => normalQuantile(NaN)).toThrow(/p must be/);
  });
});
