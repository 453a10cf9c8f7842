import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import { createLines, LINE_IDS, LYMAN_ALPHA_NM, LYMAN_LIMIT_NM } from './lines.js';

const files = photometryFiles();

describe('lines', () => {
  const lines = createLines(files.lines);

  it('are all there, by wavelength', () => {
    expect(lines.map(({ id }) => id).sort()).toEqual([...LINE_IDS].sort());
    expect(lines.map((line) => line.vacuumWavelengthNm)).toEqual(
      lines.map((line) => line.vacuumWavelengthNm).sort((a, b) => a - b),
    );
  });

  it.each([
    // SI: c / 1900.5369 GHz. Vacuum wavelengths of public lists.
    ['CII_158um', 299_792_458 / 1900.5369],
    ['Lya', 121.567],
    ['OIII_5008', 500.824],
    ['Ha', 656.461],
  ] as const)('%s is at %d nm within the scatter of public lists', (id, wavelengthNm) => {
    const line = lines.find((each) => each.id === id)!;
    expect(Math.abs(line.vacuumWavelengthNm - wavelengthNm)).toBeLessThanOrEqual(line.spreadNm);
  });

  it('refuse a table that lacks one or has one twice', () => {
    const [first, ...rest] = files.lines.data.lines;
    expect(() => createLines({ data: { lines: rest } })).toThrow(`complete: ${first!.id} missing`);
    expect(() => createLines({ data: { lines: [first!, ...rest, first!] } })).toThrow('in the table once');
  });

  it('have Lyα where it is taken to be without the file', () => {
    expect(lines.find(({ id }) => id === 'Lya')!.vacuumWavelengthNm).toBe(LYMAN_ALPHA_NM);
  });
});

describe('the edges of hydrogen', () => {
  it.each(['intergalacticInoue2014', 'intergalacticMadau1995'] as const)(
    'are those of %s within its rounding',
    (key) => {
      const { lymanLimitNm, lineWavelengthsNm } = files[key].data;
      // Madau 1995 has 912 and 1216 Å, Inoue et al. 2014 911.8 and 1215.67 Å; c/R_H is 911.75 Å.
      expect(Math.abs(lymanLimitNm / LYMAN_LIMIT_NM - 1)).toBeLessThan(3e-4);
      expect(Math.abs(lineWavelengthsNm[0]! / LYMAN_ALPHA_NM - 1)).toBeLessThan(3e-4);
    },
  );

  it('are c / R_H = 911.75 Å and the weighted mean of the doublet', () => {
    // Rydberg constant for hydrogen: R∞ / (1 + mₑ/mₚ), CODATA 2018.
    const perNm = 10_973_731.56816e-9 / (1 + 1 / 1836.15267343);
    expect(LYMAN_LIMIT_NM).toBeCloseTo(1 / perNm, 2);
    expect(LYMAN_ALPHA_NM).toBeCloseTo(121.56701, 3);
  });
});
