import { refractiveIndexOfAir } from '@faintward/photometry';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { dispersionArcsec, refractivityPpm, waterVapourHpa } from './atmospheric-dispersion.js';

const HPA_PER_MMHG = 1013.25 / 760;
/** The mountain of the publication: 600 mmHg, 7 °C, 8 mmHg of water. */
const mountain = { pressureHpa: 600 * HPA_PER_MMHG, temperatureCelsius: 7, waterVapourHpa: 8 * HPA_PER_MMHG };

describe('dispersion', () => {
  it.each([
    // Worked from the formula of Filippenko 1982, PASP 94, 715, to the digits given: against 500 nm.
    [1.5, 300, 2.37],
    [1.5, 350, 1.34],
    [1.5, 400, 0.71],
    [1.5, 450, 0.29],
    [1.5, 600, -0.37],
    [1.5, 700, -0.6],
    [1.5, 800, -0.74],
    [1.5, 1000, -0.91],
    [2, 350, 2.08],
    [2, 400, 1.1],
    [2, 600, -0.58],
    [2, 1000, -1.4],
  ])('at airmass %d puts %d nm %d″ above 500 nm', (airmass, wavelengthNm, arcsec) => {
    expect(Math.abs(dispersionArcsec(wavelengthNm, 500, airmass, mountain) - arcsec)).toBeLessThan(0.0051);
  });

  it('rests on the refractivity of standard air, equal to another transcription', () => {
    // At 15 °C and 760 mmHg the density factor is 1 within 1e-6.
    const standard = { pressureHpa: 1013.25, temperatureCelsius: 15, waterVapourHpa: 0 };
    for (const nm of [320, 500, 656.46, 1000]) {
      expect(refractivityPpm(nm, standard) / ((refractiveIndexOfAir(nm, 'morton1991') - 1) * 1e6)).toBeCloseTo(1, 5);
    }
  });

  const wavelength = fc.double({ min: 300, max: 2400, noNaN: true });
  const airmass = fc.double({ min: 1.01, max: 5, noNaN: true });

  it('puts blue above red, grows with airmass, and is none at the zenith', () => {
    fc.assert(
      fc.property(wavelength, airmass, (nm, x) => {
        const shift = dispersionArcsec(nm, nm * 1.04, x, mountain);
        expect(shift).toBeGreaterThan(0);
        expect(dispersionArcsec(nm, nm * 1.04, x * 1.1, mountain)).toBeGreaterThan(shift);
        expect(dispersionArcsec(nm * 1.04, nm, x, mountain)).toBe(-shift);
        expect(dispersionArcsec(nm, nm * 1.04, 1, mountain)).toBe(0);
      }),
    );
  });

  it('is larger in denser air', () => {
    fc.assert(
      fc.property(wavelength, (nm) => {
        const shift = dispersionArcsec(nm, nm * 1.04, 1.5, mountain);
        expect(dispersionArcsec(nm, nm * 1.04, 1.5, { ...mountain, pressureHpa: 1000 })).toBeGreaterThan(shift);
        expect(dispersionArcsec(nm, nm * 1.04, 1.5, { ...mountain, temperatureCelsius: -5 })).toBeGreaterThan(shift);
      }),
    );
  });

  it('is refused where the formula does not hold', () => {
    expect(() => dispersionArcsec(250, 500, 1.5, mountain)).toThrow('wavelengthNm');
    expect(() => dispersionArcsec(400, 500, 7, mountain)).toThrow('airmass');
    expect(() => refractivityPpm(500, { ...mountain, pressureHpa: NaN })).toThrow('air.pressureHpa');
  });
});

describe('water vapour', () => {
  it.each([
    // Saturation over water: 6.1 hPa at the triple point, 12.3 at 10 °C, 23.4 at 20 °C (textbook values).
    [1, 0.01, 6.117],
    [1, 10, 12.28],
    [1, 20, 23.39],
    [0.25, 20, 5.85],
  ])('of humidity %d at %d °C is %d hPa', (humidity, celsius, hpa) => {
    expect(Math.abs(waterVapourHpa(humidity, celsius) / hpa - 1)).toBeLessThan(0.005);
  });

  it('refuses a humidity in per cent', () => {
    expect(() => waterVapourHpa(40, 10)).toThrow('relativeHumidity must be between 0 and 1');
  });
});
