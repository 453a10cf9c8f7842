/**
 * Check values of tests/reference/dust-igm.json: A(λ)/A(V) to 1e-6 where the other side has the same coefficients, which
 * leaves room for nothing but rounding; Fitzpatrick's law to 2e-4 of a library that ends its spline differently.
 */
import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  attenuationMag,
  attenuationOnNodes,
  attenuationPerVisual,
  DUST_LAWS,
  type DustLaw,
  galacticAttenuationMag,
  isDustLawValidAt,
  trueColourExcess,
} from './dust.js';

interface DustRow {
  name: string;
  lambda_A: number;
  'ccm89_R3.1': number;
  'ccm89_R5.0': number;
  'fitzpatrick99_R3.1_fm_unred_anchors': number;
  'lib_fitzpatrick99_R3.1': number;
  'calzetti00_R4.05': number | null;
}

function read(path: string): unknown {
  return JSON.parse(readFileSync(new URL(`../../../${path}`, import.meta.url), 'utf8'));
}

const { dust } = read('tests/reference/dust-igm.json') as { dust: DustRow[] };
const LAWS: readonly DustLaw[] = ['ccm1989', 'fitzpatrick1999', 'calzetti2000'];

describe('the shape of a dust law', () => {
  it.each(dust.map((row) => [row.name, row] as const))('equals the reference values at %s', (_, row) => {
    const nm = row.lambda_A / 10;
    const check = (law: DustLaw, expected: number | null, tolerance: number, totalToSelective?: number) => {
      if (expected === null) return;
      const value = attenuationPerVisual(law, nm, totalToSelective);
      expect(Math.abs(value - expected), `${law}: ${value} for ${expected}`).toBeLessThan(tolerance);
    };
    check('ccm1989', row['ccm89_R3.1'], 1e-6);
    check('ccm1989', row['ccm89_R5.0'], 1e-6, 5);
    check('fitzpatrick1999', row['fitzpatrick99_R3.1_fm_unred_anchors'], 1e-6);
    check('fitzpatrick1999', row['lib_fitzpatrick99_R3.1'], 2e-4);
    check('calzetti2000', row['calzetti00_R4.05'], 1e-6);
  });

  it('has reference values for every law', () => {
    expect(dust.length).toBeGreaterThan(20);
    expect(dust.filter((row) => row['calzetti00_R4.05'] !== null).length).toBeGreaterThan(15);
  });

  it('is 1 at the visual wavelength of Cardelli et al. for any R_V', () => {
    for (const totalToSelective of [2, 3.1, 5.5]) {
      expect(attenuationPerVisual('ccm1989', 1000 / 1.82, totalToSelective)).toBeCloseTo(1, 12);
    }
  });

  it.each(LAWS)('of %s is finite, not negative, and below 20 at every wavelength and R_V', (law) => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 1e6, noNaN: true }),
        fc.double({ min: 2, max: 6, noNaN: true }),
        (nm, totalToSelective) => {
          const value = attenuationPerVisual(law, nm, totalToSelective);
          expect(value).toBeGreaterThanOrEqual(0);
          expect(value).toBeLessThan(20);
        },
      ),
    );
  });

  it.each(LAWS)('of %s is held shortward of its range and falls longward of it', (law) => {
    const { shortestNm, longestNm } = DUST_LAWS[law];
    expect(attenuationPerVisual(law, shortestNm / 2)).toBe(attenuationPerVisual(law, shortestNm));
    const atEnd = attenuationPerVisual(law, longestNm);
    expect(attenuationPerVisual(law, longestNm * (1 + 1e-9))).toBeCloseTo(atEnd, 8);
    expect(attenuationPerVisual(law, longestNm * 2)).toBeCloseTo(atEnd * 2 ** -1.61, 12);
    expect([shortestNm / 2, shortestNm, longestNm, longestNm * 2].map((nm) => isDustLawValidAt(law, nm))).toEqual([
      false,
      true,
      true,
      false,
    ]);
  });

  it.each(LAWS)('of %s has no step above 3 % in the optical and near infrared', (law) => {
    for (let nm = 300; nm < 5000; nm *= 1.001) {
      const [here, next] = [attenuationPerVisual(law, nm), attenuationPerVisual(law, nm * 1.001)];
      expect(Math.abs(next / here - 1), `at ${nm} nm`).toBeLessThan(0.03);
    }
  });

  it.each(LAWS)('of %s on nodes is the same, value by value', (law) => {
    const nodesNm = Float64Array.from({ length: 300 }, (_, i) => 60 * 1.03 ** i);
    const values = attenuationOnNodes(law, 3.3, nodesNm);
    nodesNm.forEach((nm, i) => expect(values[i]).toBe(attenuationPerVisual(law, nm, 3.3)));
  });

  it('refuses an R_V or wavelength without meaning', () => {
    expect(() => attenuationPerVisual('ccm1989', 500, 1)).toThrow('totalToSelective');
    expect(() => attenuationOnNodes('ccm1989', Number.NaN, Float64Array.of(500))).toThrow('totalToSelective');
    expect(() => attenuationPerVisual('ccm1989', 0)).toThrow('wavelengthNm');
  });
});

describe('attenuation', () => {
  it('by dust in a galaxy equals a published coefficient', () => {
    // Calzetti et al. 2000: k(150 nm) = 10.33 from the polynomial, so E(B−V) = 0.3 dims 3.1 mag there.
    const k = 2.659 * (-2.156 + 1.509 / 0.15 - 0.198 / 0.15 ** 2 + 0.011 / 0.15 ** 3) + 4.05;
    expect(attenuationMag('calzetti2000', 150, 0.3)).toBeCloseTo(0.3 * k, 12);
  });

  it('by the Milky Way is near the tabulated bands of Schlafly & Finkbeiner 2011 for uncorrected map values', () => {
    // Their table 6, R_V = 3.1: A_B = 3.626, A_V = 2.742 for 1 mag of the SFD map. They fix the law at 1 µm and average over
    // bands, so 6 % is allowed; no correction, or two of them, would be off by 10 % or more in one of the two.
    const ratios = [galacticAttenuationMag(438, 1, 'sfd') / 3.626, galacticAttenuationMag(545, 1, 'sfd') / 2.742];
    for (const ratio of ratios) expect(Math.abs(ratio - 1)).toBeLessThan(0.06);
  });

  it('corrects a map value once and a true one not', () => {
    expect(trueColourExcess(0.1, 'sfd')).toBeCloseTo(0.086, 15);
    expect(trueColourExcess(0.1, 'true')).toBe(0.1);
    const ratio = galacticAttenuationMag(800, 0.1, 'sfd') / galacticAttenuationMag(800, 0.1, 'true');
    expect(ratio).toBeCloseTo(0.86, 14);
  });

  it('refuses a negative colour excess', () => {
    expect(() => trueColourExcess(-0.01, 'sfd')).toThrow('colourExcessMag');
    expect(() => attenuationMag('ccm1989', 500, Number.NaN)).toThrow('colourExcessMag');
  });
});
