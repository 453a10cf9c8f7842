import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { restGrid, sampleOn } from './rest-grid.js';
import { curveValueAt } from './sampled-curve.js';

const wavelength = fc.double({ min: 40, max: 30_000, noNaN: true });

describe('rest grid', () => {
  it('runs from 40 nm to 30 µm in steps of 1e-3 in ln λ', () => {
    const grid = restGrid([]);
    expect(grid[0]).toBe(40);
    expect(grid.at(-1)).toBe(30_000);
    // ln(30000/40) = 6.6201: 6620 whole steps and a short one.
    expect(grid).toHaveLength(6622);
    for (let i = 1; i < grid.length; i++) {
      const step = Math.log(grid[i]! / grid[i - 1]!);
      expect(step).toBeGreaterThan(0);
      expect(step).toBeLessThan(1e-3 + 1e-12);
    }
  });

  it('ascends, holds jumps exactly twice and other nodes once, and never steps further than the even grid', () => {
    fc.assert(
      fc.property(fc.array(wavelength, { maxLength: 8 }), fc.array(wavelength, { maxLength: 8 }), (jumps, extras) => {
        const grid = restGrid(jumps, extras);
        const count = (x: number): number => grid.filter((node) => Math.abs(node / x - 1) <= 1e-9).length;
        for (let i = 1; i < grid.length; i++) {
          if (grid[i]! < grid[i - 1]! || grid[i]! > grid[i - 1]! * Math.exp(1e-3) * (1 + 2e-9)) return false;
        }
        return jumps.every((x) => count(x) >= 2) && extras.every((x) => count(x) >= 1);
      }),
    );
  });

  it('keeps a jump that falls on a regular node, on another jump and on an extra node', () => {
    const onNode = 40 * Math.exp(1.5);
    const grid = restGrid([onNode, 91.175, 91.175, 40, 30_000], [91.175, onNode * (1 + 1e-12)]);
    for (const jump of [onNode, 91.175, 40, 30_000]) expect(grid.filter((node) => node === jump)).toHaveLength(2);
    expect(grid).toHaveLength(6622 + 2 + 1 + 1 + 1);
  });

  it('leaves out what lies outside and refuses what is no number', () => {
    expect(restGrid([10, 40_000], [1, 1e6])).toEqual(restGrid([]));
    expect(() => restGrid([100, NaN])).toThrow(/jumpsNm\.1/);
  });

  it('takes the limits from both sides at a jump', () => {
    const step = sampleOn(restGrid([121.567]), (wavelengthNm, side) =>
      wavelengthNm < 121.567 || (wavelengthNm === 121.567 && side === 'left') ? 1 : 3,
    );
    expect(curveValueAt(step, 121.5669999)).toBe(1);
    expect(curveValueAt(step, 121.567)).toBe(3);
  });

  it.each([-2.2, -2, -1.5, 0, 1, 3.2])('draws λ^%d within 1e-6 mag', (beta) => {
    const curve = sampleOn(restGrid([]), (x) => x ** beta);
    let worst = 0;
    for (let i = 0; i < 20_000; i++) {
      const x = 40 * Math.exp((6.62 * (i + 0.5)) / 20_000);
      worst = Math.max(worst, Math.abs(2.5 * Math.log10(curveValueAt(curve, x) / x ** beta)));
    }
    expect(worst).toBeLessThan(1e-6);
  });
});
