import { describe, expect, it } from 'vitest';
import { NotConvergedError, NumericalDomainError } from './errors.js';
import { gaussLegendre, gaussLegendreRule, integrateAdaptively } from './quadrature.js';

describe('Gauss–Legendre quadrature', () => {
  it('is exact for polynomials up to degree 2n − 1 and not beyond', () => {
    for (const n of [1, 2, 3, 5, 8, 16, 31, 64]) {
      for (const degree of [0, 2 * n - 2, 2 * n - 1]) {
        const exact = degree % 2 === 0 ? 2 / (degree + 1) : 0;
        expect(Math.abs(gaussLegendre((x) => x ** degree, -1, 1, n) - exact), `n ${n}, degree ${degree}`).toBeLessThan(
          1e-14,
        );
      }
      const beyond = gaussLegendre((x) => x ** (2 * n), -1, 1, n) - 2 / (2 * n + 1);
      if (n < 16) expect(Math.abs(beyond)).toBeGreaterThan(1e-11);
    }
  });

  it('has the published five-point nodes and weights', () => {
    // DLMF table 3.5.1.
    const { nodes, weights } = gaussLegendreRule(5);
    expect(nodes[4]).toBeCloseTo(0.906179845938664, 15);
    expect(nodes[3]).toBeCloseTo(0.538469310105683, 15);
    expect(nodes[2]).toBe(0);
    expect(weights[4]).toBeCloseTo(0.236926885056189, 15);
    expect(weights[2]).toBeCloseTo(0.568888888888889, 15);
  });

  it('keeps weights that add up to two and nodes that ascend, to a thousand nodes', () => {
    for (const n of [2, 33, 200, 1000]) {
      const { nodes, weights } = gaussLegendreRule(n);
      expect(Math.abs(weights.reduce((a, b) => a + b, 0) - 2)).toBeLessThan(1e-13);
      for (let i = 1; i < n; i++) expect(nodes[i]!).toBeGreaterThan(nodes[i - 1]!);
    }
  });

  it('refuses a number of nodes it cannot have', () => {
    for (const n of [0, 1.5, -3, 1001, NaN]) expect(() => gaussLegendreRule(n)).toThrow(NumericalDomainError);
  });
});

describe('adaptive quadrature', () => {
  it('has a base rule that is exact for polynomials up to degree 22', () => {
    for (let degree = 0; degree <= 22; degree += 2) {
      const value = integrateAdaptively((x) => x ** degree, -1, 1, { relativeTolerance: 1, maxPieces: 1 });
      expect(Math.abs(value / (2 / (degree + 1)) - 1), `degree ${degree}`).toBeLessThan(2e-15);
    }
  });

  it('handles end-point singularities, kinks and narrow peaks', () => {
    expect(Math.abs(integrateAdaptively((x) => Math.sqrt(x), 0, 1) / (2 / 3) - 1)).toBeLessThan(1e-12);
    expect(Math.abs(integrateAdaptively((x) => Math.abs(x - 1 / 3), 0, 1) / (5 / 18) - 1)).toBeLessThan(1e-12);
    const peak = integrateAdaptively((x) => 1 / (1e-6 + (x - 0.4) ** 2), 0, 1);
    expect(Math.abs(peak / (1000 * (Math.atan(600) + Math.atan(400))) - 1)).toBeLessThan(1e-12);
  });

  it('changes sign with the direction and vanishes on an empty interval', () => {
    expect(integrateAdaptively(Math.exp, 1, 0)).toBeCloseTo(1 - Math.E, 13);
    expect(integrateAdaptively(Math.exp, 2, 2)).toBe(0);
  });

  it('says so when it cannot reach the tolerance', () => {
    expect(() => integrateAdaptively((x) => 1 / x, 0, 1, { maxPieces: 50 })).toThrow(NotConvergedError);
    expect(() => integrateAdaptively(() => NaN, 0, 1)).toThrow(NotConvergedError);
  });
});
