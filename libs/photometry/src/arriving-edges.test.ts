/** Where light ends: redshift 0 and 30, ranges beyond the spectrum or the break, extreme dust and lenses. */
import { createCosmology } from '@faintward/cosmology';
import { describe, expect, it } from 'vitest';
import {
  absoluteLight,
  apparentLight,
  INOUE,
  lineLight,
  powerLaw,
  spectrumOf,
} from '../../../tests/factories/lights.js';
import { arrivingLight } from './arriving-light.js';
import { DARK_TRANSMISSION } from './no-light.js';
import { Ledger } from './ledger.js';
import { boxCurve, sampledCurve } from './sampled-curve.js';
import type { ContinuumLight, LineLight } from './source-light.js';
import { type Response, responseOf } from './synthetic.js';

const PLANCK18 = createCosmology('planck18');
const box = (lowNm: number, highNm: number): Response => responseOf(boxCurve(lowNm, highNm));
const inBand = (response: Response, label = 'band'): ContinuumLight['at'] => ({ kind: 'response', response, label });
const J = box(1170, 1330);

/** The magnitude, or the code of the reason why there is none; in a ledger the same. */
function look(light: ContinuumLight | LineLight, redshift: number, response: Response): number | string {
  const arriving = arrivingLight(light, redshift, PLANCK18);
  const found = arriving.magnitudeIn(response);
  const ledger = new Ledger();
  const reason = arriving.addSteps(ledger, response);
  expect(ledger.totalMag).not.toBe(-Infinity);
  expect(ledger.totalMag).not.toBe(Infinity);
  if (typeof found === 'number') {
    expect(reason).toBeUndefined();
    expect(ledger.totalMag).toBeCloseTo(found, 9);
    return found;
  }
  expect(reason).toEqual(found);
  return found.code;
}

describe('redshift', () => {
  it('0 leaves a measured light as it is, and has no distance for a luminosity', () => {
    const light = apparentLight(inBand(box(555, 690)), { hostDust: { law: 'ccm1989', colourExcessMag: 0.1 } });
    expect(look(light, 0, box(555, 690))).toBeCloseTo(24, 12);
    expect(look(apparentLight({ kind: 'range' }), 0, J)).toBeCloseTo(24, 12);
    expect(look(absoluteLight(), 0, J)).toBe('noDistance');
    expect(look(lineLight({ restWavelengthNm: 1250 }), 0, J)).toBe('noDistance');
    const arriving = arrivingLight(lineLight(), 0, PLANCK18);
    expect(arriving.kind === 'line' ? arriving.fluxErgSCm2() : NaN).toBeUndefined();
    const continuum = arrivingLight(absoluteLight(), 0, PLANCK18);
    expect(continuum.kind === 'continuum' ? continuum.absoluteMagnitudeAt(150) : NaN).toBeUndefined();
  });

  it('1e-6 is as good as none but for the distance', () => {
    const near = look(absoluteLight({ spectrum: powerLaw(-2, 1) }), 1e-6, J) as number;
    const modulus = 5 * Math.log10(PLANCK18.luminosityDistanceMpc(1e-6)) + 25;
    expect(near).toBeCloseTo(-21 + modulus, 5);
    const ultraviolet = apparentLight(inBand(J), { spectrum: powerLaw(-2, 1) });
    expect(look(ultraviolet, 1e-6, box(150, 200))).toBeCloseTo(24, 6);
  });

  it('15 and 30 still have light beyond Lyα and none short of it', () => {
    for (const redshift of [15, 30]) {
      const edge = 121.567 * (1 + redshift);
      const expected =
        -21 + 5 * Math.log10(PLANCK18.luminosityDistanceMpc(redshift)) + 25 - 2.5 * Math.log10(1 + redshift);
      expect(look(absoluteLight(), redshift, box(edge * 1.001, edge * 1.2))).toBeCloseTo(expected, 6);
      expect(look(absoluteLight(), redshift, box(edge * 0.8, edge * 0.999))).toBe('noFluxInBand');
      const half = look(absoluteLight(), redshift, responseOf(boxCurve(edge / 1.1, edge * 1.1)));
      expect(half).toBeCloseTo(expected + 2.5 * Math.log10(2), 4);
    }
  });
});

describe('a dark band', () => {
  it('is one with less than a hundredth of its light left, to either side of the limit', () => {
    // Boxes that reach beyond Lyα of redshift 9 by a little more and a little less than a hundredth of themselves.
    const edge = 1215.67;
    const reaching = (part: number): Response => box(edge * 1.1 ** (part - 1), edge * 1.1 ** part);
    expect(look(absoluteLight(), 9, reaching(0.0105))).toBeTypeOf('number');
    expect(look(absoluteLight(), 9, reaching(0.0095))).toBe('noFluxInBand');
  });

  it('is one that holds only the tail of a source which ends at the Lyman limit', () => {
    // At redshift 3 the limit is at 364.7 nm; the forest just beyond it lets a quarter through.
    const light = absoluteLight();
    expect(look(light, 3, box(330, 390))).toBeTypeOf('number');
    expect(look(light, 3, box(330, 365))).toBe('noFluxInBand');
    expect(look(light, 3, box(330, 364))).toBe('noFluxInBand');
    expect(look({ ...light, medium: null }, 3, box(330, 365))).toBe('noFluxInBand');
    expect(look(apparentLight(inBand(box(330, 365))), 3, J)).toBe('noFluxInQuotedBand');
    expect(look(absoluteLight({ at: inBand(box(80, 91.25)) }), 3, J)).toBe('noFluxInQuotedBand');
    const arriving = arrivingLight(light, 3, PLANCK18).magnitudeIn(box(330, 364));
    expect(arriving).toMatchObject({ message: 'No flux in this band: the Lyman break is at 0.365 µm.' });
  });

  it('is not one in the Lyman continuum of a source that lets it out', () => {
    const light = absoluteLight({ spectrum: powerLaw(-2, 1) });
    const plain = look({ ...light, medium: null }, 3, box(340, 360)) as number;
    const found = look(light, 3, box(340, 360)) as number;
    // Inoue et al. 2014 let 0.546 through at 90 nm at redshift 3, and less at shorter wavelengths.
    const transmission = 10 ** (-0.4 * (found - plain));
    expect(transmission).toBeGreaterThan(0.25);
    expect(transmission).toBeLessThan(0.546);
    const arriving = arrivingLight(light, 3, PLANCK18);
    const said = arriving.kind === 'continuum' ? arriving.intergalacticTransmission(box(340, 360)) : NaN;
    expect(said).toBeCloseTo(transmission, 12);
    // And at redshift 6 nothing of it arrives.
    expect(look(light, 6, box(560, 620))).toBe('noFluxInBand');
  });

  it('is no place to quote a magnitude in', () => {
    expect(look(apparentLight(inBand(box(400, 550))), 7, J)).toBe('noFluxInQuotedBand');
    expect(look(apparentLight({ kind: 'wavelength', wavelengthNm: 900 }), 7, J)).toBe('noFluxInQuotedBand');
    expect(look(apparentLight({ kind: 'wavelength', wavelengthNm: 1000 }), 7, J)).toBeTypeOf('number');
    expect(look(apparentLight({ kind: 'wavelength', wavelengthNm: 700 }), 7, J)).toBe('noFluxInQuotedBand');
    expect(look(apparentLight({ kind: 'range' }), 7, box(400, 550))).toBe('noFluxInBand');
    const mine = spectrumOf({
      kind: 'sampled',
      label: 'mine',
      source: 'me',
      wavelengthsNm: [100, 200, 201, 299, 300, 900],
      fluxPerWavelength: [1, 1, 0, 0, 1, 1],
    });
    const dark = absoluteLight({ spectrum: mine, at: { kind: 'wavelength', wavelengthNm: 250 } });
    expect(look(dark, 1, box(700, 900))).toBe('noFluxInQuotedBand');
    expect(arrivingLight(dark, 1, PLANCK18).magnitudeIn(box(700, 900))).toMatchObject({
      message: 'The spectrum chosen has no light at 250 nm, where the magnitude is quoted.',
    });
    expect(look(absoluteLight({ spectrum: mine }), 1, box(420, 580))).toBe('noFluxInBand');
    expect(look(absoluteLight({ spectrum: mine }), 1, box(420, 900))).toBeTypeOf('number');
  });
});

describe('looking at several ranges', () => {
  it('gives the same in any order, and of two lights by turns', () => {
    // At redshift 3.5 Lyα is at 547 nm: all but the first lie in the forest, further and further down and back.
    const ranges = [box(1170, 1330), box(510, 545), box(400, 560), box(430, 480)];
    const light = absoluteLight({
      spectrum: powerLaw(-2, 1),
      galacticDust: { law: 'ccm1989', colourExcessMag: 0.1, scale: 'true' },
    });
    const alone = ranges.map((range) => arrivingLight(light, 3.5, PLANCK18).magnitudeIn(range));
    expect(alone.every((found) => typeof found === 'number')).toBe(true);
    const forwards = arrivingLight(light, 3.5, PLANCK18);
    const backwards = arrivingLight(light, 3.5, PLANCK18);
    const other = arrivingLight(light, 2.5, PLANCK18);
    ranges.forEach((range, i) => {
      expect(forwards.magnitudeIn(range)).toBe(alone[i]);
      other.magnitudeIn(range);
      expect(backwards.magnitudeIn(ranges[3 - i]!)).toBe(alone[3 - i]);
      expect(forwards.magnitudeIn(range)).toBe(alone[i]);
    });
  });
});

describe('a range beyond the spectrum', () => {
  const template = absoluteLight({ spectrum: spectrumOf({ kind: 'quasar', template: 'hewettWild2010' }) });
  const recipe = absoluteLight({
    spectrum: spectrumOf({ kind: 'passive' }),
    at: { kind: 'wavelength', wavelengthNm: 500 },
  });
  const cautionsOf = (light: ContinuumLight, redshift: number, response: Response) => {
    const arriving = arrivingLight(light, redshift, PLANCK18);
    return arriving.kind === 'continuum' ? arriving.cautions(response) : [];
  };

  it('is said to be so where less than half is covered, and with a caution where more is', () => {
    // The composite ends at 800.4 nm, at redshift 1 at 1600.8 nm.
    expect(look(template, 1, box(1560, 1660))).toBe('spectrumEnds');
    expect(look(template, 1, box(1500, 1660))).toBeTypeOf('number');
    const [caution] = cautionsOf(template, 1, box(1500, 1660)).filter(({ code }) => code === 'spectrumCoversPart');
    expect(caution?.message).toBe('The spectrum covers 64 % of this range; what lies beyond it counts as dark.');
    expect(cautionsOf(template, 1, box(1400, 1600)).map(({ code }) => code)).not.toContain('spectrumCoversPart');
  });

  it('counts as dark after a table, and is a guess after a recipe', () => {
    const covered = look(template, 1, box(1500, 1600.8)) as number;
    const partly = look(template, 1, box(1500, 1660)) as number;
    const share = Math.log(1600.8 / 1500) / Math.log(1660 / 1500);
    expect(partly - covered).toBeCloseTo(-2.5 * Math.log10(share), 2);
    // The recipe of old galaxies is meant up to 2500 nm.
    const [caution] = cautionsOf(recipe, 1, box(4500, 5200)).filter(({ code }) => code === 'spectrumCoversPart');
    expect(caution?.message).toContain('what lies beyond it is its continuation, a guess');
    expect(look(recipe, 1, box(5100, 5400))).toBe('spectrumEnds');
  });

  it('or at Lyα has its caution', () => {
    expect(cautionsOf(absoluteLight(), 9, box(1150, 1300)).map(({ code }) => code)).toContain('lymanBreakInBand');
    expect(cautionsOf(absoluteLight(), 9, box(1220, 1300)).map(({ code }) => code)).not.toContain('lymanBreakInBand');
    expect(cautionsOf(absoluteLight({ medium: null }), 9, box(1150, 1300))).toEqual([]);
    // That of the power law holds beyond 364.6 nm at rest only.
    expect(cautionsOf(absoluteLight(), 1, box(500, 700))).toEqual([]);
    expect(cautionsOf(absoluteLight(), 1, box(700, 800)).map(({ code }) => code)).toEqual(['powerLawWithoutBreaks']);
    // That of old galaxies in the ultraviolet holds below 300 nm only, that of the whole everywhere.
    expect(cautionsOf(recipe, 1, box(800, 900)).map(({ code }) => code)).toEqual(['passiveApproximate']);
    expect(cautionsOf(recipe, 1, box(500, 700)).map(({ code }) => code)).toEqual([
      'passiveApproximate',
      'passiveUltraviolet',
    ]);
  });
});

describe('extremes', () => {
  it.each([1e-6, 1e6])('magnified %d times, only the zero point moves', (magnification) => {
    const plain = look(absoluteLight(), 3, J) as number;
    expect(look(absoluteLight({ magnification }), 3, J)).toBeCloseTo(plain - 2.5 * Math.log10(magnification), 10);
  });

  it('dust of nothing changes nothing, dust of 10 mag in E(B−V) is followed without overflow', () => {
    const plain = look(absoluteLight(), 3, J) as number;
    const dusty = (colourExcessMag: number) =>
      absoluteLight({
        hostDust: { law: 'calzetti2000', colourExcessMag },
        galacticDust: { law: 'fitzpatrick1999', colourExcessMag, scale: 'true' },
        includes: { hostDust: false, galacticDust: false, lensing: false },
      });
    expect(look(dusty(0), 3, J)).toBeCloseTo(plain, 12);
    const deep = look(dusty(10), 3, J) as number;
    // Calzetti et al.: k(312 nm) = 7.5; Fitzpatrick: A(J) = 0.83 E(B−V): some 80 mag, little less in the middle of a wide band.
    expect(deep - plain).toBeGreaterThan(70);
    expect(deep - plain).toBeLessThan(90);
    expect(() => look(dusty(-0.1), 3, J)).toThrow('colourExcessMag');
    const negative = absoluteLight({ hostDust: { law: 'ccm1989', colourExcessMag: -0.1 } });
    expect(() => look(negative, 3, J)).toThrow('colourExcessMag');
  });

  it('with a response that is dark where a line falls there is no line', () => {
    const holed = responseOf(sampledCurve([1170, 1240, 1240, 1260, 1260, 1330], [1, 1, 0, 0, 1, 1]));
    expect(look(lineLight(), 0.9, holed)).toBe('lineOutsideBand');
    expect(look(lineLight(), 0.95, holed)).toBeTypeOf('number');
    expect(look(lineLight(), 2, holed)).toBe('lineOutsideBand');
  });

  it('a line counts as inside between the half-power edges', () => {
    const slanted = responseOf(sampledCurve([1170, 1250, 1330], [0, 1, 0]));
    expect(look(lineLight({ restWavelengthNm: 1215 / 2 }), 1, slanted)).toBeTypeOf('number');
    expect(look(lineLight({ restWavelengthNm: 1205 / 2 }), 1, slanted)).toBe('lineOutsideBand');
    expect(look(lineLight({ restWavelengthNm: 1285 / 2 }), 1, slanted)).toBeTypeOf('number');
    expect(look(lineLight({ restWavelengthNm: 1295 / 2 }), 1, slanted)).toBe('lineOutsideBand');
  });

  it('a line deep in the forest has no light, wherever it was given', () => {
    const light = lineLight({ restWavelengthNm: 100 });
    expect(Math.exp(-INOUE.opticalDepth(800, 7))).toBeLessThan(DARK_TRANSMISSION);
    expect(look(light, 7, box(750, 850))).toBe('noFluxInBand');
    const arriving = arrivingLight(light, 7, PLANCK18);
    expect(arriving.kind === 'line' ? arriving.fluxErgSCm2() : NaN).toBeUndefined();
  });
});
