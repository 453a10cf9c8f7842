import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { readLight } from './quantity.js';

const absolute = (magnitude: number, more: object = {}): object => ({
  kind: 'absoluteMagnitude',
  magnitude,
  system: 'AB',
  restWavelengthNm: null,
  restBandId: null,
  ...more,
});

describe('readLight reads', () => {
  it.each([
    ['22.1 Vega', { kind: 'vegaMagnitude', magnitudeVega: 22.1 }],
    ['22.1 mag Vega', { kind: 'vegaMagnitude', magnitudeVega: 22.1 }],
    ['22.1 Vega mag', { kind: 'vegaMagnitude', magnitudeVega: 22.1 }],
    ['22.1mag (Vega)', { kind: 'vegaMagnitude', magnitudeVega: 22.1 }],
    ['m = 22.1', { kind: 'abMagnitude', magnitudeAb: 22.1 }],
    ['m_AB=22.1', { kind: 'abMagnitude', magnitudeAb: 22.1 }],
    ['m = 22.1 Vega', { kind: 'vegaMagnitude', magnitudeVega: 22.1 }],
    ['22.5 mag AB', { kind: 'abMagnitude', magnitudeAb: 22.5 }],
    ['-21.3 mag absolute', absolute(-21.3)],
    ['-21.3 absolute', absolute(-21.3)],
    ['−21.3 abs. mag (AB)', absolute(-21.3)],
    ['-19.3 mag absolute Vega', absolute(-19.3, { system: 'Vega' })],
    ['absolute magnitude -21.3', absolute(-21.3)],
    ['M=-21.3', absolute(-21.3)],
    ['M = −21.3 mag', absolute(-21.3)],
    ['M_UV = -21.3', absolute(-21.3, { restWavelengthNm: 150 })],
    ['MUV=-21.3', absolute(-21.3, { restWavelengthNm: 150 })],
    ['M_{UV} = -21.3 AB', absolute(-21.3, { restWavelengthNm: 150 })],
    ['M1450 = -26.5', absolute(-26.5, { restWavelengthNm: 145 })],
    ['M_1500=-20', absolute(-20, { restWavelengthNm: 150 })],
    ['M_B = -19.25 Vega', absolute(-19.25, { system: 'Vega', restBandId: 'B' })],
    ['M_K = -24', absolute(-24, { restBandId: 'Ks' })],
  ])('%s', (text, light) => {
    expect(readLight(text)).toEqual({ ok: true, light });
  });

  it.each([
    ['8 Msun/yr', 'starFormationRate', 8],
    ['8 M_sun yr^-1', 'starFormationRate', 8],
    ['8 M☉ yr-1', 'starFormationRate', 8],
    ['SFR = 8 Msun/yr', 'starFormationRate', 8],
    ['8 solar masses per year', 'starFormationRate', 8],
    ['8e9 Msun/Gyr', 'starFormationRate', 8],
    ['2e8 L_sun', 'lineLuminosityErgS', 2e8 * 3.828e33],
    ['4e-18 erg/s/cm^2/nm', 'fluxPerAngstrom', 4e-19],
    ['4e-15 erg/s/cm2/um', 'fluxPerAngstrom', 4e-19],
    ['4e-15 W/m^2/micron', 'fluxPerAngstrom', 4e-16],
    ['1e-28 W/m^2/Hz', 'fluxDensityJy', 0.01],
  ])('%s as %s', (text, kind, value) => {
    const reading = readLight(text);
    expect(reading).toMatchObject({ ok: true, light: { kind } });
    const number = reading.ok ? (Object.values(reading.light)[1] as number) : NaN;
    expect(Math.abs(number / value - 1)).toBeLessThan(1e-12);
  });
});

describe('readLight refuses, and says what was typed', () => {
  it.each([
    ['5 m', 'a length'],
    ['5 km', 'a length'],
    ['10 Hz', 'a frequency'],
    ['3 s', 'a time'],
    ['200 km/s', 'a velocity'],
    ['5e10 Msun', 'a mass'],
    ['3 kg/s', 'a mass per time'],
    ['0.4 arcsec', 'an angle'],
    ['300 K', 'a temperature'],
    ['1e-7 erg/cm^2', 'an energy per area'],
    ['3 uJy/arcsec^2', 'a surface brightness'],
  ])('%s: %s', (text, words) => {
    const reading = readLight(text);
    expect(reading).toMatchObject({ ok: false, code: 'wrongDimension' });
    expect(reading.ok ? '' : reading.message).toContain(`${text} is ${words}`);
  });

  it.each([
    ['22 AB Vega', 'unknownUnit'],
    ['22 mag absolutely', 'unknownUnit'],
    ['M_foo = -21', 'notAQuantity'],
    ['M = -99', 'notAQuantity'],
    ['SFR = 8', 'unitMissing'],
    ['-8 Msun/yr', 'notPositive'],
    ['M = 5e10 Msun', 'notAQuantity'],
  ])('%j: %s', (text, code) => {
    expect(readLight(text)).toMatchObject({ ok: false, code });
  });

  it('or accepts every text without throwing', () => {
    const pieces = fc.constantFrom(
      'M',
      'm',
      '_',
      'UV',
      '=',
      '-21',
      '1450',
      ' ',
      'Vega',
      'AB',
      'mag',
      'abs',
      'Msun',
      '/yr',
      'SFR',
      '(',
      ')',
    );
    const text = fc.oneof(
      fc.string(),
      fc.array(pieces, { maxLength: 10 }).map((parts) => parts.join('')),
    );
    fc.assert(
      fc.property(text, (typed) => {
        const reading = readLight(typed);
        return reading.ok ? Number.isFinite(Object.values(reading.light)[1]) : reading.message.length > 0;
      }),
      { numRuns: 3000 },
    );
  });
});
