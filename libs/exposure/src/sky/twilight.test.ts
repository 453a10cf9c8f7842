import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { magOfLight } from './check.js';
import { bands, sky } from '../../../../tests/factories/sky.js';
import { darkEnoughSunAltitude } from './twilight.js';

const { twilight } = sky;
const mag = (nm: number, sunAltitudeDeg: number) => magOfLight(twilight.lightAb(nm, sunAltitudeDeg));

describe('twilight', () => {
  it.each([
    // Rates and levels of Patat et al. 2006, A&A 455, 385, from memory.
    ['U', 1.43, 17.7],
    ['V', 1.14, 18],
    ['I', 0.94, 16.7],
  ] as const)('in %s fades by %d mag per degree from V(−10°) = %d', (id, rate, level) => {
    const nm = bands[id].pivotWavelengthNm;
    expect(mag(nm, -10)! - bands[id].vegaToAbMag!).toBeCloseTo(level, 9);
    expect(mag(nm, -13)! - mag(nm, -12)!).toBeCloseTo(rate, 9);
  });

  it('fades as the Sun sinks, at any wavelength, and is over at −18°', () => {
    const wavelength = fc.double({ min: 300, max: 2500, noNaN: true });
    const altitude = fc.double({ min: -17.9, max: -5.5, noNaN: true });
    fc.assert(
      fc.property(wavelength, altitude, (nm, sun) => {
        expect(twilight.lightAb(nm, sun - 0.1)).toBeLessThan(twilight.lightAb(nm, sun));
        expect(mag(nm, -18)).toBeNull();
        expect(mag(nm, -60)).toBeNull();
      }),
    );
  });

  it('joins what is extended beyond the published bands without a jump', () => {
    for (const id of ['U', 'I'] as const) {
      const nm = bands[id].pivotWavelengthNm;
      expect(twilight.isExtended(nm)).toBe(false);
      expect(mag(nm * 1.00001, -10)).toBeCloseTo(mag(nm * 0.99999, -10)!, 3);
    }
    expect(twilight.isExtended(1250)).toBe(true);
  });

  it('adds at most a fifth to the dark sky where observing begins by common practice', () => {
    // Dark skies in AB of the reference file; most, 0.2 mag, in I.
    for (const [nm, darkAbMag] of [
      [548, 21.62],
      [800, 20.15],
      [1250, 16.86],
      [2150, 14.24],
    ] as const) {
      const { sunAltitudeDeg } = darkEnoughSunAltitude(nm);
      expect(twilight.lightAb(nm, sunAltitudeDeg + 0.001) / 10 ** (-0.4 * darkAbMag)).toBeLessThan(0.21);
    }
  });

  it('is refused while the Sun is too high', () => {
    expect(() => twilight.lightAb(550, -4.9)).toThrow('sunAltitudeDeg must be between -90 and -5 °');
  });
});
