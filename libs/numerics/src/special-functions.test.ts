import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { NumericalDomainError } from './errors.js';
import { erf, erfc } from './error-function.js';
import { inverseRegularizedGammaP, logGamma, regularizedGammaP, regularizedGammaQ } from './gamma.js';

interface Reference {
  erf: { x: number; erf: number; erfc: number; erfcMinus: number }[];
  logGamma: { x: number; logGamma: number }[];
  gammaP: { a: number; x: number; P: number; Q: number }[];
}
const reference = JSON.parse(
  readFileSync(new URL('../../../tests/reference/numerics/special-functions.json', import.meta.url), 'utf8'),
) as Reference;

const SMALLEST_NORMAL = 2.3e-308;
/** Relative error, or 0 where both values are too small to be normal numbers. */
function relative(value: number, expected: number): number {
  if (Math.abs(expected) < SMALLEST_NORMAL) return Math.abs(value) < SMALLEST_NORMAL ? 0 : Infinity;
  return Math.abs(value / expected - 1);
}

describe('error function', () => {
  it('agrees with 40-digit values', () => {
    for (const row of reference.erf) {
      expect(relative(erf(row.x), row.erf), `erf(${row.x})`).toBeLessThan(2e-15);
      expect(relative(erf(-row.x), -row.erf), `erf(-${row.x})`).toBeLessThan(2e-15);
      expect(relative(erfc(row.x), row.erfc), `erfc(${row.x})`).toBeLessThan(2e-14);
      expect(relative(erfc(-row.x), row.erfcMinus), `erfc(-${row.x})`).toBeLessThan(2e-15);
    }
  });

  it('reaches its limits and passes NaN on', () => {
    expect(erf(0)).toBe(0);
    expect(erf(Infinity)).toBe(1);
    expect(erf(-Infinity)).toBe(-1);
    expect(erfc(Infinity)).toBe(0);
    expect(erfc(-Infinity)).toBe(2);
    expect(erf(NaN)).toBeNaN();
    expect(erfc(NaN)).toBeNaN();
  });

  it('is odd and adds up to one with its complement', () => {
    fc.assert(
      fc.property(fc.double({ min: -30, max: 30, noNaN: true }), (x) => {
        expect(erf(-x)).toBe(-erf(x));
        expect(Math.abs(erf(x) + erfc(x) - 1)).toBeLessThan(1e-15);
      }),
    );
  });
});

describe('gamma functions', () => {
  it('log-gamma agrees with 40-digit values, beside its zeros too', () => {
    for (const row of reference.logGamma) {
      expect(relative(logGamma(row.x), row.logGamma), `logGamma(${row.x})`).toBeLessThan(1e-14);
    }
    expect(logGamma(1)).toBe(0);
    expect(logGamma(2)).toBe(0);
  });

  it('incomplete gamma agrees with 40-digit values on both sides of x = a', () => {
    for (const { a, x, P, Q } of reference.gammaP) {
      // A value of e^(−465) comes from an exponent with three digits before the point: those digits are lost after it.
      const floor = 2e-14 + 1e-15 * Math.abs(Math.log(Math.min(P, Q) || SMALLEST_NORMAL));
      expect(relative(regularizedGammaP(a, x), P), `P(${a}, ${x})`).toBeLessThan(floor);
      // Where Q was taken as 1 − P, nothing smaller than the rounding of 1 can be promised.
      const tolerance = x < a + 1 ? floor + 1e-15 / Q : floor;
      expect(relative(regularizedGammaQ(a, x), Q), `Q(${a}, ${x})`).toBeLessThan(tolerance);
    }
  });

  it('inverse brings back the argument', () => {
    for (const { a, x, P, Q } of reference.gammaP) {
      if (P < SMALLEST_NORMAL || P === 1) continue;
      // dx/x = dP / (x dP/dx): the rounding of P alone moves x by this much.
      const logDensity = a * Math.log(x) - x - logGamma(a);
      const conditioning = (Number.EPSILON * P) / Math.exp(logDensity);
      if (!(conditioning < 1e-3) || Q < 1e-10) continue;
      const tolerance = 1e-13 * (1 + Math.abs(Math.log(x))) + 1000 * conditioning;
      expect(relative(inverseRegularizedGammaP(a, P), x), `inverse P(${a}, ·) of ${P}`).toBeLessThan(tolerance);
    }
  });

  it('inverse is a true inverse for random arguments', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 200, noNaN: true }),
        fc.double({ min: 1e-6, max: 1 - 1e-6, noNaN: true }),
        (a, p) => {
          expect(relative(regularizedGammaP(a, inverseRegularizedGammaP(a, p)), p)).toBeLessThan(1e-12);
        },
      ),
    );
  });

  it('half-light constant of an exponential disc and of a de Vaucouleurs profile', () => {
    // P(2n, b) = 1/2; 1.67834699… for n = 1 and 7.66924944… for n = 4 (Ciotti & Bertin 1999, A&A 352, 447, table 1).
    expect(inverseRegularizedGammaP(2, 0.5)).toBeCloseTo(1.67834699, 8);
    expect(inverseRegularizedGammaP(8, 0.5)).toBeCloseTo(7.66924944, 8);
  });

  it('limits', () => {
    expect(regularizedGammaP(3, 0)).toBe(0);
    expect(regularizedGammaP(3, Infinity)).toBe(1);
    expect(regularizedGammaQ(3, 0)).toBe(1);
    expect(inverseRegularizedGammaP(3, 0)).toBe(0);
    expect(inverseRegularizedGammaP(3, 1)).toBe(Infinity);
  });

  it('refuses arguments outside its domain', () => {
    for (const bad of [0, -1, NaN, Infinity]) expect(() => logGamma(bad)).toThrow(NumericalDomainError);
    expect(() => regularizedGammaP(0, 1)).toThrow(NumericalDomainError);
    expect(() => regularizedGammaP(1, -1e-300)).toThrow(NumericalDomainError);
    expect(() => regularizedGammaQ(1, NaN)).toThrow(NumericalDomainError);
    expect(() => inverseRegularizedGammaP(1, 1.0000001)).toThrow(NumericalDomainError);
    expect(() => inverseRegularizedGammaP(-1, 0.5)).toThrow(NumericalDomainError);
  });
});
