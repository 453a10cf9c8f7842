import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { NotConvergedError, RootNotBracketedError } from './errors.js';
import { findRoot, findRootWithDerivative } from './roots.js';

describe('Brent root finding', () => {
  it('finds roots of easy and awkward functions', () => {
    expect(findRoot((x) => x * x - 2, 0, 2)).toBeCloseTo(Math.SQRT2, 14);
    expect(findRoot((x) => Math.cos(x) - x, 0, 1)).toBeCloseTo(0.7390851332151607, 14);
    expect(findRoot((x) => (x - 1) ** 9, -3, 2)).toBeCloseTo(1, 1);
    expect(findRoot((x) => Math.exp(x) - 1e-6, -50, 3)).toBeCloseTo(Math.log(1e-6), 12);
    expect(findRoot((x) => (x < 0.3 ? -1 : 1), 0, 1)).toBeCloseTo(0.3, 13);
  });

  it('accepts a root at an end and a reversed interval', () => {
    expect(findRoot((x) => x, 0, 1)).toBe(0);
    expect(findRoot((x) => x - 1, 0, 1)).toBe(1);
    expect(findRoot((x) => x - 0.25, 1, 0)).toBeCloseTo(0.25, 14);
  });

  it('needs a change of sign', () => {
    expect(() => findRoot((x) => x * x + 1, -1, 1)).toThrow(RootNotBracketedError);
    expect(() => findRoot(() => NaN, 0, 1)).toThrow(RootNotBracketedError);
  });

  it('throws rather than return a last guess', () => {
    expect(() => findRoot((x) => x ** 3 - 2, 0, 2, { maxIterations: 3 })).toThrow(NotConvergedError);
    expect(() => findRoot((x) => (x === 0 || x === 1 ? x - 0.5 : NaN), 0, 1)).toThrow(NotConvergedError);
  });

  it('finds the root of any cubic with one real zero, and Newton with bisection finds the same', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -100, max: 100, noNaN: true }),
        fc.double({ min: 0.01, max: 50, noNaN: true }),
        (root, curvature) => {
          const f = (x: number) => (x - root) * ((x - root) ** 2 + curvature);
          const derivative = (x: number) => 3 * (x - root) ** 2 + curvature;
          const brent = findRoot(f, -150, 170);
          const newton = findRootWithDerivative((x) => ({ value: f(x), derivative: derivative(x) }), -150, 170);
          const tolerance = 1e-13 * Math.max(Math.abs(root), 1e-150);
          expect(Math.abs(brent - root)).toBeLessThanOrEqual(tolerance);
          expect(Math.abs(newton - root)).toBeLessThanOrEqual(tolerance);
        },
      ),
    );
  });
});

describe('Newton with bisection', () => {
  it('survives a start from which Newton alone runs away', () => {
    const f = (x: number) => ({ value: Math.atan(x - 1), derivative: 1 / (1 + (x - 1) ** 2) });
    expect(findRootWithDerivative(f, -40, 50, { start: 49 })).toBeCloseTo(1, 13);
  });

  it('throws on a missing change of sign, on NaN and on too few steps', () => {
    const square = (x: number) => ({ value: x * x + 1, derivative: 2 * x });
    expect(() => findRootWithDerivative(square, -1, 1)).toThrow(RootNotBracketedError);
    const broken = (x: number) => ({ value: x === 0.5 ? NaN : x - 0.3, derivative: 1 });
    expect(() => findRootWithDerivative(broken, 0, 1)).toThrow(NotConvergedError);
    const steep = (x: number) => ({ value: x ** 3 - 2, derivative: 3 * x * x });
    expect(() => findRootWithDerivative(steep, 0, 100, { maxIterations: 2 })).toThrow(NotConvergedError);
  });
});
