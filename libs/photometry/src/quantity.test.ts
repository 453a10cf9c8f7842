import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readLight } from './quantity.js';

describe('readLight reads', () => {
  it.each([
    ['22.5 mag', { kind: 'abMagnitude', magnitudeAb: 22.5 }],
    ['24.3 mag AB', { kind: 'abMagnitude', magnitudeAb: 24.3 }],
    ['-1.5 ABmag', { kind: 'abMagnitude', magnitudeAb: -1.5 }],
    ['25.1mag (AB)', { kind: 'abMagnitude', magnitudeAb: 25.1 }],
  ])('%s as a magnitude', (text, light) => {
    expect(readLight(text)).toEqual({ ok: true, light });
  });

  it.each([
    ['12 uJy', 'fluxDensityJy', 12e-6],
    ['12 µJy', 'fluxDensityJy', 12e-6],
    ['3 nJy', 'fluxDensityJy', 3e-9],
    ['1e-29 erg/s/cm^2/Hz', 'fluxDensityJy', 1e-6],
    ['2e-17 erg/s/cm^2', 'lineFluxErgSCm2', 2e-17],
    ['2e-17 erg s-1 cm-2', 'lineFluxErgSCm2', 2e-17],
    ['2×10^-17 erg s^-1 cm^-2', 'lineFluxErgSCm2', 2e-17],
    ['2 x 10−17 erg/s/cm2', 'lineFluxErgSCm2', 2e-17],
    ['3e-20 W/m^2', 'lineFluxErgSCm2', 3e-17],
    ['1e42 erg/s', 'lineLuminosityErgS', 1e42],
    ['2e8 Lsun', 'lineLuminosityErgS', 2e8 * 3.828e33],
    ['4e-19 erg/s/cm^2/Å', 'fluxPerAngstrom', 4e-19],
    ['4e-19 erg s-1 cm-2 AA-1', 'fluxPerAngstrom', 4e-19],
  ])('%s as %s', (text, kind, value) => {
    const parsed = readLight(text);
    expect(parsed.ok).toBe(true);
    if (!parsed.ok) return;
    expect(parsed.light.kind).toBe(kind);
    const [, number] = Object.values(parsed.light) as [string, number];
    expect(Math.abs(number / value - 1)).toBeLessThan(1e-12);
  });
});

describe('readLight refuses', () => {
  it.each([
    ['', 'empty'],
    ['   ', 'empty'],
    ['22.5', 'unitMissing'],
    ['abc', 'notAQuantity'],
    ['mag', 'notAQuantity'],
    ['NaN mag', 'notAQuantity'],
    ['1e300 mag', 'notAQuantity'],
    ['3 parsnips', 'unknownUnit'],
    ['12 uJy + 3 uJy', 'unknownUnit'],
    ['22,5 mag', 'unknownUnit'],
    ['5 km', 'wrongDimension'],
    ['5 kpc', 'unknownUnit'],
    ['1e-7 erg/cm^2', 'wrongDimension'],
    ['10 Hz', 'wrongDimension'],
    ['0 uJy', 'notPositive'],
    ['-3e-17 erg/s/cm^2', 'notPositive'],
    ['1e999 Jy', 'notPositive'],
    ['x'.repeat(81), 'notAQuantity'],
  ])('%j: %s', (text, code) => {
    expect(readLight(text)).toMatchObject({ ok: false, code });
  });

  it('anything that would be run rather than read', () => {
    for (const text of ['1 import({})', '2 evaluate("1")', '1; createUnit("x")', '3 f(x)=x', '1 cos(0) Jy']) {
      expect(readLight(text).ok).toBe(false);
    }
  });

  it('or accepts every text without throwing, and gives finite positive numbers only', () => {
    const pieces = fc.constantFrom(
      '1',
      '2e-17',
      ' ',
      'erg',
      '/',
      's',
      'cm',
      '^',
      '-1',
      '2',
      'Jy',
      'u',
      'mag',
      'µ',
      '(',
      '*',
      'W',
      'm',
    );
    const text = fc.oneof(
      fc.string(),
      fc.array(pieces, { maxLength: 12 }).map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(text, (typed) => {
        const parsed = readLight(typed);
        if (!parsed.ok) return parsed.message.length > 0;
        const number = Object.values(parsed.light)[1] as number;
        return Number.isFinite(number) && (parsed.light.kind.endsWith('Magnitude') || number > 0);
      }),
      { numRuns: 2000 },
    );
  });
});
