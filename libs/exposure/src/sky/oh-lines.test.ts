import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { files } from '../../../../tests/factories/sky.js';
import { betweenLines, createOhLines } from './oh-lines.js';

const lines = createOhLines(files.ohLines);
const H_BAND = [1490, 1780] as const;

describe('lines of the night sky', () => {
  // Rousselot et al. 2000, A&A 354, 1134: vacuum wavelengths, as they stand in public lists. In air they would be 0.30 to 0.60 nm less.
  it.each([
    [1518.714, 0.015],
    [1533.2402, 0.015],
    [1543.2156, 0.015],
    [1559.7631, 0.015],
    [1570.2539, 0.015],
    [1586.9307, 0.015],
    [1612.8608, 0.015],
    [1638.8492, 0.015],
    [1650.2365, 0.015],
    [1684.0481, 0.015],
    [1700.8757, 0.015],
    [1799.3962, 0.015],
    [2041.268, 0.015],
    [2180.2312, 0.015],
    [2195.5637, 0.015],
    [1212.24957, 0.08],
    [1290.55773, 0.08],
    [1312.78037, 0.08],
    [1342.1579, 0.08],
    [1097.53784, 0.2],
    [1153.87582, 0.2],
    [1186.64924, 0.2],
  ])('have one at %d nm in vacuum, within %d nm', (wavelengthNm, toleranceNm) => {
    const nearest = Math.min(...lines.map((line) => Math.abs(line.wavelengthNm - wavelengthNm)));
    expect(nearest).toBeLessThan(toleranceNm);
  });

  it('are ascending, some without strength', () => {
    expect(lines).toHaveLength(267);
    expect(lines.every(({ wavelengthNm }, i) => i === 0 || wavelengthNm > lines[i - 1]!.wavelengthNm)).toBe(true);
    expect(lines.filter(({ relativeIntensity }) => relativeIntensity === null)).toHaveLength(57);
  });
});

describe('between the lines', () => {
  it('there is what practice says in H: half at R = 2000, four fifths at R = 4000', () => {
    // Rules of thumb, good to 0.1.
    expect(Math.abs(betweenLines(lines, 2000, H_BAND).freeFraction - 0.5)).toBeLessThan(0.1);
    expect(Math.abs(betweenLines(lines, 4000, H_BAND).freeFraction - 0.8)).toBeLessThan(0.1);
  });

  it('a lone line takes two elements of its range, less at the edge', () => {
    const lone = [{ wavelengthNm: 1600, relativeIntensity: 1 }];
    // λ/R = 0.4 nm to either side.
    expect(betweenLines(lone, 4000, [1590, 1610])).toEqual({
      freeFraction: expect.closeTo(1 - 0.8 / 20, 9) as number,
      spoilt: [[expect.closeTo(1599.6, 9), expect.closeTo(1600.4, 9)]],
    });
    expect(betweenLines(lone, 4000, [1600, 1610]).freeFraction).toBeCloseTo(1 - 0.4 / 10, 9);
    expect(betweenLines(lone, 4000, [1601, 1610])).toEqual({ freeFraction: 1, spoilt: [] });
  });

  it('grows with resolving power, and with what is passed over', () => {
    const power = fc.double({ min: 100, max: 30_000, noNaN: true });
    fc.assert(
      fc.property(power, fc.double({ min: 1.01, max: 3, noNaN: true }), (resolvingPower, factor) => {
        const { freeFraction, spoilt } = betweenLines(lines, resolvingPower, H_BAND);
        expect(freeFraction).toBeGreaterThanOrEqual(0);
        expect(betweenLines(lines, resolvingPower * factor, H_BAND).freeFraction).toBeGreaterThanOrEqual(freeFraction);
        const strong = betweenLines(lines, resolvingPower, H_BAND, { faintestRelativeIntensity: 0.5 });
        expect(strong.freeFraction).toBeGreaterThanOrEqual(freeFraction);
        const spoiltNm = spoilt.reduce((sum, [low, high]) => sum + high - low, 0);
        expect(spoiltNm / 290).toBeCloseTo(1 - freeFraction, 9);
        expect(spoilt.every(([low], i) => i === 0 || low > spoilt[i - 1]![1])).toBe(true);
      }),
    );
  });

  it('is refused where the list says nothing', () => {
    expect(() => betweenLines(lines, 4000, [900, 1100])).toThrow('rangeNm.0');
    expect(() => betweenLines(lines, 4000, [2000, 2400])).toThrow('rangeNm.1');
    expect(() => betweenLines(lines, 4000, [1600, 1600])).toThrow('rangeNm.0');
    expect(() => betweenLines(lines, 0, H_BAND)).toThrow('resolvingPower');
  });
});
