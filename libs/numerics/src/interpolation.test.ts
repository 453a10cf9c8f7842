import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { chebyshevFit, chebyshevIntegral, chebyshevValue } from './chebyshev.js';
import { NumericalDomainError } from './errors.js';
import { intervalOf, linearInterpolant, monotoneCubicInterpolant } from './interpolation.js';

const makers = { linearInterpolant, monotoneCubicInterpolant };

describe.each(Object.entries(makers))('%s', (_name, make) => {
  it('passes through its points and reproduces a straight line', () => {
    const x = [-2, -1.5, 0, 0.1, 4];
    const y = [3, -1, 0, 7, 7];
    const curve = make(x, y);
    x.forEach((value, i) => expect(curve.at(value)).toBe(y[i]!));
    const line = make(
      x,
      x.map((value) => 2 * value - 1),
    );
    for (const value of [-2, -1.7, 0.05, 3.9, 4]) expect(line.at(value)).toBeCloseTo(2 * value - 1, 13);
  });

  it('extrapolates nothing', () => {
    const curve = make([0, 1], [0, 1]);
    expect(curve.at(0)).toBe(0);
    expect(curve.at(1)).toBe(1);
    for (const bad of [-1e-12, 1 + 1e-12, NaN]) expect(() => curve.at(bad)).toThrow(NumericalDomainError);
  });

  it('refuses points it cannot use, by name', () => {
    expect(() => make([0], [0])).toThrow(/x\.length/);
    expect(() => make([0, 1], [0])).toThrow(/y\.length/);
    expect(() => make([0, 1, 1], [0, 1, 2])).toThrow(/x\[2\]/);
    expect(() => make([0, NaN], [0, 1])).toThrow(/x\[1\]/);
    expect(() => make([0, 1], [0, Infinity])).toThrow(/y\[1\]/);
  });

  it('does not notice later changes of the arrays it was made from', () => {
    const y = [0, 1];
    const curve = make([0, 1], y);
    y[1] = 100;
    expect(curve.at(1)).toBe(1);
  });

  it('stays between the two neighbouring points', () => {
    const point = fc.double({ min: -10, max: 10, noNaN: true });
    fc.assert(
      fc.property(
        fc.array(point, { minLength: 2, maxLength: 12 }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (y, t) => {
          const curve = make(
            y.map((_, i) => i * 1.5 + (i % 3) * 0.4),
            y,
          );
          const x = curve.minimum + t * (curve.maximum - curve.minimum);
          const xs = y.map((_, i) => i * 1.5 + (i % 3) * 0.4);
          const i = intervalOf(xs, Math.min(x, curve.maximum));
          const value = curve.at(Math.min(x, curve.maximum));
          expect(value).toBeGreaterThanOrEqual(Math.min(y[i]!, y[i + 1]!) - 1e-12);
          expect(value).toBeLessThanOrEqual(Math.max(y[i]!, y[i + 1]!) + 1e-12);
        },
      ),
    );
  });
});

describe('accuracy of interpolation', () => {
  it('improves as the fourth or third power for the cubic and the second for the line', () => {
    const worst = (make: typeof linearInterpolant, count: number): number => {
      const x = Array.from({ length: count + 1 }, (_, i) => i / count);
      const curve = make(x, x.map(Math.exp));
      let error = 0;
      for (let i = 0; i < 1000; i++) error = Math.max(error, Math.abs(curve.at(i / 1000) - Math.exp(i / 1000)));
      return error;
    };
    expect(worst(linearInterpolant, 20) / worst(linearInterpolant, 40)).toBeGreaterThan(3.5);
    expect(worst(monotoneCubicInterpolant, 20) / worst(monotoneCubicInterpolant, 40)).toBeGreaterThan(6.5);
  });
});

describe('Chebyshev series', () => {
  it('reproduces an analytic function to rounding, with coefficients that show it', () => {
    const series = chebyshevFit(Math.exp, -1, 3, 24);
    for (const x of [-1, -0.3, 0, 1.234, 3])
      expect(Math.abs(chebyshevValue(series, x) / Math.exp(x) - 1)).toBeLessThan(1e-13);
    expect(Math.abs(series.coefficients.at(-1)!)).toBeLessThan(1e-13);
    // The coefficients of e^x on [−1, 1] are modified Bessel functions; c₀ = I₀(1), DLMF 10.35.
    expect(chebyshevFit(Math.exp, -1, 1, 20).coefficients[0]).toBeCloseTo(1.2660658777520084, 14);
  });

  it('integrates from its left end', () => {
    const integral = chebyshevIntegral(chebyshevFit(Math.cos, 0.5, 4, 24));
    expect(chebyshevValue(integral, 0.5)).toBeCloseTo(0, 14);
    for (const x of [1, 2.5, 4]) expect(chebyshevValue(integral, x)).toBeCloseTo(Math.sin(x) - Math.sin(0.5), 13);
    const constant = chebyshevIntegral(chebyshevFit(() => 2, 0, 3, 1));
    expect(chebyshevValue(constant, 3)).toBeCloseTo(6, 14);
  });

  it('refuses other arguments', () => {
    expect(() => chebyshevFit(Math.exp, 0, 1, 0)).toThrow(NumericalDomainError);
    expect(() => chebyshevFit(Math.exp, 1, 1, 5)).toThrow(NumericalDomainError);
    expect(() => chebyshevValue(chebyshevFit(Math.exp, 0, 1, 5), 1.1)).toThrow(NumericalDomainError);
  });
});
