import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../../tests/factories/photometry-files.js';
import { createExtinctionCurves, extinctionAt, extinctionCurveOf, extinctionMag } from './extinction.js';

const curves = createExtinctionCurves(photometryFiles().extinction);
const desert = extinctionCurveOf(curves, 'desert2600m');
const island = extinctionCurveOf(curves, 'island4200m');

describe('extinction', () => {
  it.each([
    // Patat et al. 2011, A&A 527, A91, table 4; Buton et al. 2013, A&A 549, A8.
    [desert, 332.5, 0.686],
    [desert, 547.5, 0.131],
    [desert, 706, 0.064],
    [desert, 1000, 0.022],
    [island, 330, 0.588],
    [island, 550, 0.106],
    [island, 1000, 0.014],
  ])('has the published value of $id at %d nm', (curve, wavelengthNm, magPerAirmass) => {
    expect(extinctionAt(curve, wavelengthNm)).toEqual({
      magPerAirmass: expect.closeTo(magPerAirmass, 12) as number,
      basis: 'published',
    });
  });

  it('follows a power law between points', () => {
    const [low, high] = [0.504, 0.478];
    expect(extinctionAt(desert, Math.sqrt(357.5 * 362.5)).magPerAirmass).toBeCloseTo(Math.sqrt(low * high), 12);
  });

  it('stays below 0.1 mag per airmass in the near infrared and says that this is common practice', () => {
    for (let nm = 1010; nm <= 3750; nm += 10) {
      const { magPerAirmass, basis } = extinctionAt(desert, nm);
      expect(magPerAirmass).toBeLessThan(0.1);
      expect(basis).toBe('commonPractice');
    }
  });

  it('is extended as λ⁻⁴ to the blue and held to the red', () => {
    expect(extinctionAt(desert, 310)).toEqual({
      magPerAirmass: expect.closeTo(0.686 * (332.5 / 310) ** 4, 12) as number,
      basis: 'extended',
    });
    expect(extinctionAt(desert, 4000)).toEqual({ magPerAirmass: 0.09, basis: 'extended' });
  });

  it('is in magnitudes proportional to airmass, and lower on the higher site', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 333, max: 1000, noNaN: true }),
        fc.double({ min: 1, max: 10, noNaN: true }),
        (nm, x) => {
          expect(extinctionMag(desert, nm, x) / extinctionMag(desert, nm, 1)).toBeCloseTo(x, 9);
          expect(extinctionMag(island, nm, x)).toBeLessThan(extinctionMag(desert, nm, x));
        },
      ),
    );
  });

  it('has no jump anywhere', () => {
    for (let nm = 300; nm < 4199; nm++) {
      const [here, next] = [extinctionAt(desert, nm).magPerAirmass, extinctionAt(desert, nm + 1).magPerAirmass];
      // 3 % in 1 nm is what the steepest published pair of points has.
      expect(Math.abs(next / here - 1)).toBeLessThan(0.03);
    }
  });

  it('refuses what it has no value for', () => {
    expect(() => extinctionAt(desert, 299)).toThrow('wavelengthNm must be between 300 and 4200 nm');
    expect(() => extinctionAt(desert, NaN)).toThrow('wavelengthNm');
    expect(() => extinctionMag(desert, 500, 0.9)).toThrow('airmass');
    expect(() => extinctionCurveOf(curves, 'moon')).toThrow('one of desert2600m, island4200m');
  });
});
