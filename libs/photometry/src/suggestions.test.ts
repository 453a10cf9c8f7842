import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { typicalValuesAt } from './suggestions.js';
import {
  TYPICAL_VALUES_FILE_NAME,
  brighterThanPerMpc3,
  nearestLuminosityFunction,
  supernovaIaPeakMagnitude,
  typicalSizeKpc,
  typicalUvMagnitude,
  typicalUvSlope,
  type TypicalValuesFile,
} from './typical-values.js';

const { data: values } = JSON.parse(
  readFileSync(new URL(`../../../seed/reference/${TYPICAL_VALUES_FILE_NAME}`, import.meta.url), 'utf8'),
) as TypicalValuesFile;
const uvAt = (redshift: number) => typicalUvMagnitude(redshift, values);

describe('typical ultraviolet magnitude', () => {
  it('is that of the published rows, and half-way between them the mean', () => {
    // Bouwens et al. 2021, AJ 162, 47, Table 5.
    expect(uvAt(3.8)).toMatchObject({ magnitudeAb: -20.93, isExtrapolated: false });
    expect(uvAt(6.8).magnitudeAb).toBe(-21.15);
    expect(uvAt(8.9)).toMatchObject({ magnitudeAb: -21.15, isExtrapolated: false });
    expect(uvAt(2.5).magnitudeAb).toBeCloseTo((-20.28 - 20.87) / 2, 12);
    expect(uvAt(3).derivedWith).toMatchObject({ hubbleConstantKmSMpc: 70, omegaMatter: 0.3 });
  });

  it('says so where it leaves the table', () => {
    expect(uvAt(9)).toMatchObject({ magnitudeAb: -21.24, isExtrapolated: true });
    expect(uvAt(12).source).toContain('Harikane');
    expect(uvAt(20)).toMatchObject({ magnitudeAb: -20.47, isExtrapolated: true });
    expect(uvAt(1).isExtrapolated).toBe(true);
    // Near the present M* is −18.0 (Wyder et al. 2005, ApJ 619, L15: −18.04 ± 0.11 at 153 nm, redshift 0.055; from memory).
    expect(Math.abs(uvAt(0.055).magnitudeAb + 18.04)).toBeLessThan(0.15);
  });

  it('has no step anywhere', () => {
    for (let z = 0; z < 20; z += 0.01) {
      expect(Math.abs(uvAt(z + 0.01).magnitudeAb - uvAt(z).magnitudeAb)).toBeLessThan(0.012);
    }
  });
});

describe('number density', () => {
  it.each([
    // Independent: the incomplete gamma function by another program, rounded to three digits.
    [3.8, 2.8e-4],
    [6.8, 2.76e-5],
    [7.9, 1.24e-5],
  ])('brighter than M* at redshift %d', (redshift, perMpc3) => {
    const row = nearestLuminosityFunction(redshift, values);
    expect(Math.abs(brighterThanPerMpc3(row.magnitudeAb, row) / perMpc3 - 1)).toBeLessThan(5e-3);
  });

  it('is φ* e^−x for a flat faint end, in closed form', () => {
    const row = { redshift: 0, magnitudeAb: -20, densityPerMpc3: 1, faintEndSlope: 0 };
    for (const magnitude of [-22, -20, -17]) {
      const exact = Math.exp(-(10 ** (-0.4 * (magnitude + 20))));
      expect(Math.abs(brighterThanPerMpc3(magnitude, row) / exact - 1)).toBeLessThan(1e-6);
    }
  });
});

describe('typical sizes', () => {
  const mass = { stellarMassSolar: 5e10 };

  it('follow the published relations', () => {
    // Shibuya et al. 2015 at M_UV = −21, redshift 7: 6.9 · 8^−1.20.
    expect(typicalSizeKpc('shibuya2015', 7, mass, values)).toBeCloseTo(6.9 / 2 ** 3.6, 12);
    expect(typicalSizeKpc('vanDerWel2014Late', 0, mass, values)).toBe(8.9);
    expect(typicalSizeKpc('vanDerWel2014Early', 2, mass, values)).toBeCloseTo(5.6 * 3 ** -1.48, 12);
    const brighter = typicalSizeKpc('shibuya2015', 3, { ...mass, absoluteMagnitudeUv: -23.5 }, values);
    expect(brighter / typicalSizeKpc('shibuya2015', 3, mass, values)).toBeCloseTo(10 ** 0.27, 12);
    const heavier = typicalSizeKpc('vanDerWel2014Late', 1, { stellarMassSolar: 5e11 }, values);
    expect(heavier / typicalSizeKpc('vanDerWel2014Late', 1, mass, values)).toBeCloseTo(10 ** 0.22, 12);
  });

  it('refuse a mass that is none', () => {
    expect(() => typicalSizeKpc('vanDerWel2014Late', 1, { stellarMassSolar: 0 }, values)).toThrow(/stellarMassSolar/);
  });
});

describe('slope and supernova', () => {
  it('are as published', () => {
    expect(typicalUvSlope(-19.5, values)).toBe(-2.05);
    expect(typicalUvSlope(-21.5, values)).toBeCloseTo(-1.65, 12);
    expect(supernovaIaPeakMagnitude(73.04, values)).toBe(-19.253);
    // The usual −19.34 of H0 = 70: −19.253 + 5 log10(70/73.04).
    expect(supernovaIaPeakMagnitude(70, values)).toBeCloseTo(-19.3453, 4);
  });
});

describe('suggestions', () => {
  it('always carry a value, a source and where they hold', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 30, noNaN: true }), (redshift) =>
        typicalValuesAt(redshift, values).every(
          ({ value, source, validText, valueText }) =>
            Number.isFinite(value) && source !== '' && validText !== '' && valueText !== '',
        ),
      ),
    );
  });

  it('say which of them reach beyond what was measured', () => {
    const beyond = (redshift: number, mass?: number): string[] =>
      typicalValuesAt(redshift, values, mass === undefined ? {} : { stellarMassSolar: mass })
        .filter(({ isExtrapolated }) => isExtrapolated)
        .map(({ id }) => id);
    expect(beyond(2.5)).toEqual(['ultravioletSlope']);
    expect(beyond(7)).toEqual(['vanDerWel2014Late', 'vanDerWel2014Early']);
    expect(beyond(2.5, 1e10)).toEqual(['ultravioletSlope', 'vanDerWel2014Early']);
    expect(beyond(11)).toContain('shibuya2015');
  });

  it('can be of one relation, and word the value', () => {
    const rows = typicalValuesAt(6.8, values, { relation: 'shibuya2015' });
    expect(rows.map(({ id }) => id)).toEqual([
      'ultravioletMagnitude',
      'ultravioletSlope',
      'shibuya2015',
      'sersicIndex',
      'galaxyLineWidth',
      'quasarLineWidth',
      'supernovaIaPeak',
    ]);
    expect(rows[0]!.valueText).toBe('M* = −21.15 AB at 160 nm');
    expect(rows[0]!.spreadText).toContain('2.8e-5');
  });
});
