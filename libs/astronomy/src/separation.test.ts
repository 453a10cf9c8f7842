import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { angularSeparationArcsec, angularSeparationDeg, positionAngleDeg, type SkyPosition } from './index.js';

const aPosition = fc.record({
  raDeg: fc.double({ min: 0, max: 360, maxExcluded: true, noNaN: true }),
  decDeg: fc.double({ min: -90, max: 90, noNaN: true }),
});

describe('angular separation', () => {
  it('gives the worked example of Arcturus and Spica', () => {
    // Meeus, Astronomical Algorithms, example 17.a: 32.7930 degrees (printed to four decimals; quoted from memory).
    const arcturus: SkyPosition = { raDeg: 213.9154, decDeg: 19.1825 };
    const spica: SkyPosition = { raDeg: 201.2983, decDeg: -11.1614 };
    expect(angularSeparationDeg(arcturus, spica)).toBeCloseTo(32.793, 4);
  });

  it('keeps its digits for the smallest separations and across 0h', () => {
    expect(angularSeparationArcsec({ raDeg: 10, decDeg: 0 }, { raDeg: 10, decDeg: 1e-6 / 3600 })).toBeCloseTo(1e-6, 15);
    expect(angularSeparationArcsec({ raDeg: 359.9999, decDeg: 0 }, { raDeg: 0.0001, decDeg: 0 })).toBeCloseTo(0.72, 9);
  });

  it('is right at the poles and for antipodes', () => {
    expect(angularSeparationDeg({ raDeg: 0, decDeg: 90 }, { raDeg: 123, decDeg: 90 })).toBeLessThan(1e-13);
    expect(angularSeparationDeg({ raDeg: 10, decDeg: 90 }, { raDeg: 200, decDeg: -90 })).toBeCloseTo(180, 12);
    expect(angularSeparationDeg({ raDeg: 10, decDeg: 20 }, { raDeg: 190, decDeg: -20 })).toBeCloseTo(180, 12);
  });

  it('is symmetric, obeys the triangle inequality, and vanishes for the same place', () => {
    fc.assert(
      fc.property(aPosition, aPosition, aPosition, (a, b, c) => {
        expect(angularSeparationDeg(a, b)).toBeCloseTo(angularSeparationDeg(b, a), 11);
        expect(angularSeparationDeg(a, c)).toBeLessThanOrEqual(
          angularSeparationDeg(a, b) + angularSeparationDeg(b, c) + 1e-11,
        );
        expect(angularSeparationDeg(a, a)).toBe(0);
      }),
    );
  });
});

describe('position angle', () => {
  it('runs from north through east', () => {
    const from = { raDeg: 100, decDeg: 0 };
    expect(positionAngleDeg(from, { raDeg: 100, decDeg: 1 })).toBeCloseTo(0, 12);
    expect(positionAngleDeg(from, { raDeg: 101, decDeg: 0 })).toBeCloseTo(90, 12);
    expect(positionAngleDeg(from, { raDeg: 100, decDeg: -1 })).toBeCloseTo(180, 12);
    expect(positionAngleDeg(from, { raDeg: 99, decDeg: 0 })).toBeCloseTo(270, 12);
  });
});
