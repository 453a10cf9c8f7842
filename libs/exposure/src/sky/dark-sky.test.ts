import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { darkSkyAirmassFactor, darkSkyPartsS10, darkZeniths, glowPath, S10_VISUAL_MAG, vMagOfS10 } from './dark-sky.js';
import { bands, files } from '../../../../tests/factories/sky.js';

const total = ({ airglow, zodiacal, starlight }: ReturnType<typeof darkSkyPartsS10>) => airglow + zodiacal + starlight;

describe('the moonless sky in V', () => {
  it('is 220 S10, V = 21.9, with a quiet Sun at the pole of the ecliptic', () => {
    // Benn & Ellison 1998.
    expect(total(darkSkyPartsS10(0.8, 90))).toBe(220);
    expect(vMagOfS10(220)).toBeCloseTo(21.92, 2);
  });

  it('counts stars of V = 10 per square degree', () => {
    expect(S10_VISUAL_MAG.value).toBeCloseTo(10 + 2.5 * Math.log10(3600 ** 2), 2);
  });

  it('brightens by about 0.5 mag over the solar cycle, as yearly means did', () => {
    // Krisciunas 1997, PASP 109, 1181: 21.287 to 21.906.
    const swing = vMagOfS10(total(darkSkyPartsS10(0.8, 90))) - vMagOfS10(total(darkSkyPartsS10(2, 90)));
    expect(Math.abs(swing - 0.6)).toBeLessThan(0.15);
  });

  it('is brighter towards the ecliptic, the same north and south, with a step of 2 S10 at most', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 89.9, noNaN: true }), (latitude) => {
        const here = darkSkyPartsS10(1, latitude).zodiacal;
        expect(darkSkyPartsS10(1, -latitude).zodiacal).toBe(here);
        const further = darkSkyPartsS10(1, Math.min(90, latitude + 0.1)).zodiacal;
        expect(further).toBeLessThanOrEqual(here);
        expect(here - further).toBeLessThan(2.2);
      }),
    );
  });

  it('refuses a Sun it has no relation for', () => {
    expect(() => darkSkyPartsS10(0.6, 0)).toThrow('solarFluxMjy must be between 0.8 and 2 MJy');
    expect(() => darkSkyPartsS10(150, 0)).toThrow('solarFluxMjy');
  });
});

describe('the way down from the zenith', () => {
  it('starts at 1 and is dimming alone without airglow', () => {
    expect(darkSkyAirmassFactor(0.6, 0.13, 1)).toBe(1);
    expect(darkSkyAirmassFactor(0, 0.13, 2)).toBeCloseTo(10 ** (-0.4 * 0.13), 12);
  });

  it('makes the sky at airmass 2 brighter by 0.33 mag in V with a usual share', () => {
    // (0.4 + 0.6 · 1.8898) · 10^(−0.052) = 1.361, by hand with X_KS at 60°; airmass 2 is 0.1° away from that.
    expect(Math.abs(2.5 * Math.log10(darkSkyAirmassFactor(0.6, 0.13, 2)) - 0.334)).toBeLessThan(0.005);
    expect(Math.abs(glowPath(2) - 1.8898)).toBeLessThan(0.01);
    expect(glowPath(1)).toBe(1);
  });

  it('brightens with the share of airglow and dims with extinction', () => {
    const share = fc.double({ min: 0, max: 0.9, noNaN: true });
    const airmass = fc.double({ min: 1.01, max: 5, noNaN: true });
    fc.assert(
      fc.property(share, airmass, (f, x) => {
        expect(darkSkyAirmassFactor(f + 0.1, 0.1, x)).toBeGreaterThan(darkSkyAirmassFactor(f, 0.1, x));
        expect(darkSkyAirmassFactor(f, 0.2, x)).toBeLessThan(darkSkyAirmassFactor(f, 0.1, x));
      }),
    );
  });
});

describe('published dark skies', () => {
  it('come in AB, with their set', () => {
    const inV = darkZeniths(files.darkSky, bands, 'V');
    expect(inV.map(({ setId, zenithAbMag }) => [setId, zenithAbMag])).toEqual([
      ['patat2003', 21.6 + 0.02],
      ['sanchez2007', 22.01 + 0.02],
      ['plauchuFrayn2017', 21.84 + 0.02],
    ]);
    // 16.9, 15.4 and 14.2 AB in J, H and Ks on a typical night.
    for (const [id, abMag] of [
      ['J', 16.9],
      ['H', 15.4],
      ['Ks', 14.2],
    ] as const) {
      expect(darkZeniths(files.darkSky, bands, id)[0]!.zenithAbMag).toBeCloseTo(abMag, 1);
    }
    expect(darkZeniths(files.darkSky, bands, 'Y')).toMatchObject([{ zenithAbMag: 18.5, provenance: 'commonPractice' }]);
    expect(darkZeniths(files.darkSky, bands, 'g')).toEqual([]);
  });

  it('refuse a Vega magnitude where there is no offset', () => {
    const set = { ...files.darkSky.data.sets[0]!, rows: [{ bandId: 'g', system: 'Vega', magPerArcsec2: 22 }] } as const;
    expect(() => darkZeniths({ data: { sets: [set] } }, bands, 'g')).toThrow('AB in a band without a Vega offset');
  });
});
