import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  airmass,
  airmassBy,
  altitudeAtAirmassDeg,
  ArgumentOutOfRange,
  refractionFromApparentArcmin,
  refractionFromTrueArcmin,
  type AirmassFormula,
} from './index.js';

interface AirmassReference {
  readonly rows: readonly Readonly<Record<string, number | string>>[];
  readonly refraction: readonly {
    altitude_deg: number;
    bennett_arcmin_from_apparent: number;
    saemundsson_arcmin_from_true: number;
  }[];
}

const reference = JSON.parse(
  readFileSync(new URL('../../../tests/reference/airmass.json', import.meta.url), 'utf8'),
) as AirmassReference;

const columns: Readonly<Record<AirmassFormula, string>> = {
  secant: 'sec_z',
  'hardie-1962': 'hardie_1962',
  'rozenberg-1966': 'rozenberg_1966',
  'kasten-young-1989': 'kasten_young_1989',
  'krisciunas-schaefer-1991': 'krisciunas_schaefer_1991_eq3',
  'young-1994': 'young_1994',
  'pickering-2002': 'pickering_2002',
};

describe('airmass formulas', () => {
  // Relative 1e-9: the reference is the closed formula in 30 digits, so only rounding separates the two.
  it.each(Object.entries(columns) as [AirmassFormula, string][])(
    '%s agrees with the 30-digit values',
    (formula, column) => {
      let compared = 0;
      for (const row of reference.rows) {
        const expected = row[column];
        if (expected === undefined) continue;
        const altitude = Number(row['altitude_deg']);
        const value = airmassBy(formula, altitude);
        if (expected === 'Infinity') expect(value).toBe(Number.POSITIVE_INFINITY);
        else expect(Math.abs(value / Number(expected) - 1)).toBeLessThan(1e-9);
        compared += 1;
      }
      expect(compared).toBeGreaterThan(30);
    },
  );

  it('has no value below the horizon, above the zenith, or for no number', () => {
    for (const formula of Object.keys(columns) as AirmassFormula[]) {
      expect(() => airmassBy(formula, -0.01)).toThrow(ArgumentOutOfRange);
      expect(() => airmassBy(formula, 90.01)).toThrow(ArgumentOutOfRange);
      expect(() => airmassBy(formula, Number.NaN)).toThrow(ArgumentOutOfRange);
    }
    expect(() => airmassBy('hardie-1962', 4.9)).toThrow(ArgumentOutOfRange);
  });

  it('is never below 1 in the form used for limits', () => {
    expect(airmass(90)).toBe(1);
  });

  it('comes back from the altitude at an airmass', () => {
    fc.assert(
      fc.property(fc.double({ min: 1.001, max: 37.9, noNaN: true }), (value) => {
        expect(Math.abs(airmass(altitudeAtAirmassDeg(value)) / value - 1)).toBeLessThan(1e-10);
      }),
    );
    expect(altitudeAtAirmassDeg(1)).toBe(90);
    expect(() => altitudeAtAirmassDeg(0.99)).toThrow(ArgumentOutOfRange);
    expect(() => altitudeAtAirmassDeg(38)).toThrow(ArgumentOutOfRange);
  });
});

describe('refraction', () => {
  it('agrees with the 30-digit values of both formulas', () => {
    expect(reference.refraction.length).toBeGreaterThan(10);
    for (const row of reference.refraction) {
      // Near the zenith the value itself is close to zero: 1e-12 arcmin absolute is rounding there.
      expect(Math.abs(refractionFromApparentArcmin(row.altitude_deg) - row.bennett_arcmin_from_apparent)).toBeLessThan(
        1e-9 * Math.abs(row.bennett_arcmin_from_apparent) + 1e-12,
      );
      expect(Math.abs(refractionFromTrueArcmin(row.altitude_deg) - row.saemundsson_arcmin_from_true)).toBeLessThan(
        1e-9 * Math.abs(row.saemundsson_arcmin_from_true) + 1e-12,
      );
    }
  });

  it('scales with the density of the air', () => {
    const seaLevel = refractionFromTrueArcmin(30);
    expect(refractionFromTrueArcmin(30, { pressureHpa: 505 })).toBeCloseTo(seaLevel / 2, 12);
    expect(refractionFromTrueArcmin(30, { pressureHpa: 0 })).toBe(0);
    expect(refractionFromTrueArcmin(30, { temperatureCelsius: 20 })).toBeLessThan(seaLevel);
  });
});
