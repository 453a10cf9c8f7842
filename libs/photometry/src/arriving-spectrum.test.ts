import { createCosmology } from '@faintward/cosmology';
import { describe, expect, it } from 'vitest';
import { absoluteLight, apparentLight, INOUE, spectrumOf } from '../../../tests/factories/lights.js';
import { arrivingLight } from './arriving-light.js';
import { drawnSpectrum, type DrawnSpectrum } from './arriving-spectrum.js';
import { attenuationMag, galacticAttenuationMag } from './dust.js';
import { boxCurve } from './sampled-curve.js';
import type { ContinuumLight } from './source-light.js';
import { responseOf } from './synthetic.js';

const PLANCK18 = createCosmology('planck18');
const JANSKY_AB_0 = 3630.780547701;

function draw(light: ContinuumLight, redshift: number, lowNm: number, highNm: number, pointCount?: number) {
  const arriving = arrivingLight(light, redshift, PLANCK18);
  if (arriving.kind === 'line') throw new Error('not a continuum');
  return { arriving, drawn: drawnSpectrum(arriving, lowNm, highNm, pointCount)! };
}

/** ∫ f_ν d ln λ by trapezoids, of what is drawn. */
function area({ wavelengthsNm, fluxDensitiesJy }: DrawnSpectrum, lowNm = 0, highNm = Infinity): number {
  let sum = 0;
  for (let i = 1; i < wavelengthsNm.length; i++) {
    const [left, right] = [wavelengthsNm[i - 1]!, wavelengthsNm[i]!];
    if (left < lowNm || right > highNm) continue;
    sum += 0.5 * (fluxDensitiesJy[i - 1]! + fluxDensitiesJy[i]!) * Math.log(right / left);
  }
  return sum;
}

const starForming = (lines: { lymanAlphaNm?: number; oxygenIINm?: number }) =>
  spectrumOf({
    kind: 'starForming',
    slopeBeta: -2,
    breakRatio: 1,
    lymanAlphaNm: 0,
    oxygenIINm: 0,
    oxygenIIIHydrogenBetaNm: 0,
    hydrogenAlphaNm: 0,
    ...lines,
  });

/** f_ν at the point nearest to a wavelength. */
function valueAt({ wavelengthsNm, fluxDensitiesJy }: DrawnSpectrum, nm: number): number {
  const distances = wavelengthsNm.map((each) => Math.abs(each - nm));
  return fluxDensitiesJy[distances.indexOf(Math.min(...distances))]!;
}

describe('the spectrum drawn', () => {
  it('is the arriving one: flat at the magnitude of the light, and fainter by the forest short of Lyα', () => {
    const { arriving, drawn } = draw(absoluteLight(), 5, 500, 1500);
    const magnitude = arriving.magnitudeIn(responseOf(boxCurve(800, 1000))) as number;
    const level = JANSKY_AB_0 * 10 ** (-0.4 * magnitude);
    drawn.wavelengthsNm.forEach((nm, i) => {
      if (Math.abs(nm / (6 * 91.175) - 1) < 1e-9) return;
      expect(drawn.unabsorbedFluxDensitiesJy[i]! / level).toBeCloseTo(nm < 91.175 * 6 ? 0 : 1, 9);
      const isEdge = Math.abs(nm / (6 * 121.567) - 1) < 1e-9;
      const expected = nm < 91.175 * 6 ? 0 : Math.exp(-INOUE.opticalDepth(nm, 5));
      // At the edges of lines two points stand on one wavelength.
      if (!isEdge && drawn.wavelengthsNm.filter((each) => each === nm).length === 1) {
        expect(drawn.fluxDensitiesJy[i]! / level).toBeCloseTo(expected, 9);
      }
    });
    const jump = drawn.wavelengthsNm.flatMap((nm, i) => (Math.abs(nm / (6 * 121.567) - 1) < 1e-12 ? [i] : []));
    expect(jump).toHaveLength(2);
    expect(drawn.fluxDensitiesJy[jump[0]!]! / level).toBeLessThan(0.3);
    expect(drawn.fluxDensitiesJy[jump[1]!]! / level).toBeCloseTo(1, 9);
  });

  it('without what takes light outside the source still has the dust of the source', () => {
    const dusty = absoluteLight({
      hostDust: { law: 'calzetti2000', colourExcessMag: 0.3 },
      galacticDust: { law: 'ccm1989', colourExcessMag: 0.2, scale: 'true' },
      includes: { hostDust: false, galacticDust: false, lensing: false },
    });
    const bare = draw(absoluteLight(), 2, 500, 900).drawn;
    const { drawn } = draw(dusty, 2, 500, 900);
    drawn.wavelengthsNm.forEach((nm, i) => {
      const host = attenuationMag('calzetti2000', nm / 3, 0.3);
      const galactic = galacticAttenuationMag(nm, 0.2, 'true', 'ccm1989');
      const dimming = (which: 'fluxDensitiesJy' | 'unabsorbedFluxDensitiesJy'): number =>
        -2.5 * Math.log10(drawn[which][i]! / bare[which][i]!);
      expect(dimming('unabsorbedFluxDensitiesJy')).toBeCloseTo(host, 6);
      expect(dimming('fluxDensitiesJy')).toBeCloseTo(host + galactic, 5);
    });
  });

  it('stays in the range asked for and near the number of points, with its ends', () => {
    const { drawn } = draw(absoluteLight(), 1, 400, 5000, 300);
    expect(drawn.wavelengthsNm.length).toBeGreaterThan(150);
    expect(drawn.wavelengthsNm.length).toBeLessThanOrEqual(302);
    expect(drawn.wavelengthsNm[0]).toBeGreaterThanOrEqual(400);
    expect(drawn.wavelengthsNm[0]).toBeLessThan(402);
    expect(drawn.wavelengthsNm.at(-1)).toBeLessThanOrEqual(5000);
    expect(drawn.wavelengthsNm.at(-1)).toBeGreaterThan(4990);
    const ascending = drawn.wavelengthsNm.every((nm, i) => i === 0 || nm >= drawn.wavelengthsNm[i - 1]!);
    expect(ascending).toBe(true);
  });

  it('holds both lines of a doublet, with their flux', () => {
    // Behind dust, which takes the same part of line and continuum.
    const galacticDust = { law: 'ccm1989', colourExcessMag: 0.5, scale: 'true' } as const;
    const bare = draw(absoluteLight({ spectrum: starForming({}), galacticDust }), 1.5, 900, 960);
    const withLines = absoluteLight({ spectrum: starForming({ oxygenIINm: 6 }), galacticDust });
    const { drawn, arriving } = draw(withLines, 1.5, 900, 960);
    const lines = arriving.light.spectrum.lines.map((line) => ({ line, ...arriving.lineStrength(line)! }));
    expect(lines).toHaveLength(2);
    // F = ∫ f_ν dν: in ln λ, c/λ times the area; 1 Jy = 1e-23 erg s⁻¹ cm⁻² Hz⁻¹.
    const wanted = lines.reduce((sum, { fluxErgSCm2 }) => sum + fluxErgSCm2, 0);
    const found = ((area(drawn) - area(bare.drawn)) * 1e-23 * 2.99792458e17) / (372.85 * 2.5);
    expect(found / wanted).toBeCloseTo(1, 2);
    // The peaks of both, 2.6 σ apart, each on the wing of the other; the second has 1.5 times the flux of the first.
    const above = (nm: number): number => valueAt(drawn, nm) - valueAt(bare.drawn, nm);
    const [first, second] = lines.map(({ line }) => line.restWavelengthNm * 2.5) as [number, number];
    const sigmas = (second / first - 1) / (200 / 2.354820045 / 299_792.458);
    const wing = Math.exp(-0.5 * sigmas ** 2);
    expect(above(second) / above(first)).toBeCloseTo((1.5 + wing) / (1 + 1.5 * wing), 2);
    // Nothing is drawn twice or out of order.
    expect(drawn.wavelengthsNm.every((nm, i) => i === 0 || nm >= drawn.wavelengthsNm[i - 1]!)).toBe(true);
  });

  it('keeps the step of the break under Lyα, which the medium leaves', () => {
    const { drawn } = draw(absoluteLight({ spectrum: starForming({ lymanAlphaNm: 5 }) }), 6, 700, 1000);
    const centre = 7 * 121.567;
    const around = drawn.wavelengthsNm.flatMap((nm, i) =>
      Math.abs(nm / centre - 1) < 1e-12 ? [drawn.fluxDensitiesJy[i]!] : [],
    );
    expect(around).toHaveLength(2);
    expect(around[0]! / around[1]!).toBeGreaterThan(0.9);
    const far = drawn.fluxDensitiesJy[drawn.wavelengthsNm.findIndex((nm) => nm > centre * 1.01)]!;
    const near = drawn.fluxDensitiesJy[drawn.wavelengthsNm.findLastIndex((nm) => nm < centre * 0.99)]!;
    expect(near / far).toBeLessThan(0.1);
    expect(around[1]! / far).toBeGreaterThan(10);
  });

  it('is not there for a light without a scale of its own', () => {
    const range = arrivingLight(apparentLight({ kind: 'range' }), 1, PLANCK18);
    const dark = arrivingLight(apparentLight({ kind: 'wavelength', wavelengthNm: 500 }), 7, PLANCK18);
    for (const each of [range, dark])
      expect(each.kind === 'continuum' ? drawnSpectrum(each, 300, 900) : 0).toBeUndefined();
  });
});
