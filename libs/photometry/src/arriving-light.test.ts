import fc from 'fast-check';
import { gaussLegendre } from '@faintward/numerics';
import { createCosmology } from '@faintward/cosmology';
import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import {
  abMagnitudeOfPhotons,
  arrivingLight,
  boxCurve,
  type ContinuumLight,
  createInoue2014,
  curveValueAt,
  forestNodesNm,
  Ledger,
  lineFluxFromLuminosity,
  type LineLight,
  type NoLight,
  powerLawKCorrectionMag,
  type Response,
  responseOf,
  restSpectrum,
  sampledCurve,
  type SampledCurve,
  type SourceKind,
  sourceTemplates,
} from './index.js';

const FILES = photometryFiles();
const INOUE = createInoue2014(FILES.intergalacticInoue2014.data);
const TEMPLATES = sourceTemplates(FILES);
const PLANCK18 = createCosmology('planck18');
const CONV70 = createCosmology('conv70');
const J_BAND = responseOf(boxCurve(1170, 1330));
const TEN_PERCENT = responseOf(boxCurve(1170, 1330));

const spectrumOf = (kind: SourceKind) => restSpectrum(kind, TEMPLATES, forestNodesNm(INOUE));
const FLAT = spectrumOf({ kind: 'powerLaw', slopeBeta: -2, escapeFraction: 0 });

function absolute(overrides: Partial<ContinuumLight> = {}): ContinuumLight {
  return {
    kind: 'continuum',
    frame: 'rest',
    quoted: { kind: 'absoluteMagnitude', magnitude: -21, toAbMag: 0, inputs: [] },
    at: { kind: 'wavelength', wavelengthNm: 150 },
    spectrum: FLAT,
    hostDust: null,
    galacticDust: null,
    magnification: 1,
    medium: INOUE,
    includes: { hostDust: true, galacticDust: false, lensing: false },
    ...overrides,
  };
}

function apparent(overrides: Partial<ContinuumLight> = {}): ContinuumLight {
  return absolute({
    frame: 'observed',
    quoted: { kind: 'apparentMagnitude', magnitude: 24, toAbMag: 0, inputs: [] },
    at: { kind: 'response', response: responseOf(boxCurve(555, 690)), label: 'r' },
    includes: { hostDust: true, galacticDust: true, lensing: true },
    ...overrides,
  });
}

function line(overrides: Partial<LineLight> = {}): LineLight {
  return {
    kind: 'line',
    frame: 'rest',
    quoted: { kind: 'lineLuminosity', amount: 1e42, inputs: [] },
    restWavelengthNm: 656.4614,
    velocityWidthKmS: 200,
    continuum: { kind: 'none' },
    escapeFraction: 1,
    hostDust: null,
    galacticDust: null,
    magnification: 1,
    medium: INOUE,
    includes: { hostDust: true, galacticDust: false, lensing: false },
    ...overrides,
  };
}

function magnitude(light: ContinuumLight | LineLight, redshift: number, response: Response): number {
  const found = arrivingLight(light, redshift, PLANCK18).magnitudeIn(response);
  if (typeof found !== 'number') throw new Error(found.message);
  return found;
}

function noLight(light: ContinuumLight | LineLight, redshift: number, response: Response): NoLight {
  const found = arrivingLight(light, redshift, PLANCK18).magnitudeIn(response);
  if (typeof found === 'number') throw new Error(`${found} mag`);
  return found;
}

/** ∫ g S d ln λ of g = λ² f_λ by an integrator and a cutting into pieces of its own. */
function byQuadrature(spectrum: SampledCurve, { curve }: Response): number {
  const knots = [...new Set([...spectrum.wavelengthsNm, ...curve.wavelengthsNm])]
    .filter((nm) => nm >= curve.wavelengthsNm[0]! && nm <= curve.wavelengthsNm.at(-1)!)
    .sort((a, b) => a - b);
  let sum = 0;
  for (let i = 0; i + 1 < knots.length; i++) {
    sum += gaussLegendre(
      (nm) => (curveValueAt(spectrum, nm) * curveValueAt(curve, nm)) / nm,
      knots[i]!,
      knots[i + 1]!,
      8,
    );
  }
  return sum;
}

describe('a light above the atmosphere', () => {
  it('reproduces an L* galaxy at z = 7: M = −21, flat, at 1.25 µm', () => {
    // m = M + DM − 2.5 log10(8) with DM = 49.2407 in this cosmology.
    expect(magnitude(absolute(), 7, J_BAND)).toBeCloseTo(25.983, 3);
  });

  it('agrees with the K-correction of a power law in closed form', () => {
    for (const slopeBeta of [-2.6, -2, -1.5, -1, 0, 1]) {
      for (const redshift of [0.1, 1, 2.5, 4]) {
        const response = responseOf(boxCurve(600, 700));
        const light = absolute({
          spectrum: spectrumOf({ kind: 'powerLaw', slopeBeta, escapeFraction: 1 }),
          medium: null,
          at: { kind: 'response', response, label: 'box' },
        });
        const expected = -21 + modulus(redshift) + powerLawKCorrectionMag(-2 - slopeBeta, redshift);
        // Straight lines between points 1e-3 apart in ln λ.
        expect(Math.abs(magnitude(light, redshift, response) - expected)).toBeLessThan(1e-6);
      }
    }
  });

  it('keeps a measured magnitude in the band it was measured in, whatever lies on the way', () => {
    const r = responseOf(boxCurve(555, 690));
    const light = apparent({
      galacticDust: { law: 'fitzpatrick1999', colourExcessMag: 0.4, scale: 'sfd' },
      hostDust: { law: 'calzetti2000', colourExcessMag: 0.2 },
      magnification: 7,
    });
    expect(magnitude(light, 3.6, r)).toBeCloseTo(24, 12);
  });

  it('adds up its ledger to the synthetic magnitude of the spectrum that arrives, to 1e-6 mag', () => {
    const kinds = fc.oneof(
      fc.record({
        kind: fc.constant('powerLaw' as const),
        slopeBeta: fc.double({ min: -3, max: 1, noNaN: true }),
        escapeFraction: fc.constantFrom(0, 0.1, 1),
      }),
      fc.constant({ kind: 'passive' as const }),
      fc.constant({ kind: 'quasar' as const, template: 'powerLaws' as const }),
      fc.record({
        kind: fc.constant('blackbody' as const),
        temperatureK: fc.double({ min: 4000, max: 40_000, noNaN: true }),
      }),
    );
    const lights = fc.record({
      kind: kinds,
      redshift: fc.double({ min: 0.05, max: 9, noNaN: true }),
      low: fc.double({ min: 350, max: 2000, noNaN: true }),
      width: fc.double({ min: 0.02, max: 0.4, noNaN: true }),
      isAbsolute: fc.boolean(),
      hostMag: fc.constantFrom(0, 0.1, 0.5),
      galacticMag: fc.constantFrom(0, 0.05, 0.4),
      magnification: fc.constantFrom(1, 0.5, 12),
      includes: fc.record({ hostDust: fc.boolean(), galacticDust: fc.boolean(), lensing: fc.boolean() }),
    });
    let compared = 0;
    fc.assert(
      fc.property(
        lights,
        ({ kind, redshift, low, width, isAbsolute, hostMag, galacticMag, magnification, includes }) => {
          const response = responseOf(sampledCurve([low, low * (1 + width / 3), low * (1 + width)], [0.2, 1, 0.4]));
          const overrides: Partial<ContinuumLight> = {
            spectrum: spectrumOf(kind),
            hostDust: hostMag === 0 ? null : { law: 'calzetti2000', colourExcessMag: hostMag },
            galacticDust:
              galacticMag === 0 ? null : { law: 'fitzpatrick1999', colourExcessMag: galacticMag, scale: 'sfd' },
            magnification,
            includes,
          };
          const light = isAbsolute
            ? absolute(overrides)
            : apparent({
                ...overrides,
                at: { kind: 'response', response: responseOf(boxCurve(970, 1070)), label: 'Y' },
              });
          const arriving = arrivingLight(light, redshift, PLANCK18);
          if (arriving.kind === 'line') throw new Error('not a line');
          const ledger = new Ledger();
          if (arriving.addSteps(ledger, response) !== undefined) return;
          const normalisation = arriving.normalisationMag();
          if (typeof normalisation !== 'number') throw new Error('no scale');
          const nodesNm = light.spectrum.continuum.wavelengthsNm;
          const arrives = sampledCurve(
            nodesNm.map((nm) => nm * (1 + redshift)),
            nodesNm.map((_, i) => arriving.perFrequencyAtNode(i, true) * 10 ** (-0.4 * normalisation)),
          );
          const synthetic = abMagnitudeOfPhotons(byQuadrature(arrives, response), response);
          expect(Math.abs(ledger.totalMag - synthetic)).toBeLessThan(1e-6);
          expect(Math.abs((arriving.magnitudeIn(response) as number) - synthetic)).toBeLessThan(1e-6);
          expect(ledger.steps.reduce((sum, { deltaMag }) => sum + deltaMag, 0)).toBeCloseTo(ledger.totalMag, 10);
          compared++;
        },
      ),
      { numRuns: 150, seed: 12 },
    );
    expect(compared).toBeGreaterThan(100);
  });

  it('tells the way of an observed light from the luminosity it implies, to the same total', () => {
    const lights = fc.record({
      redshift: fc.double({ min: 0.05, max: 5, noNaN: true }),
      hostMag: fc.constantFrom(0, 0.3),
      galacticMag: fc.constantFrom(0, 0.2),
      magnification: fc.constantFrom(1, 8),
      includes: fc.record({ hostDust: fc.boolean(), galacticDust: fc.boolean(), lensing: fc.boolean() }),
      isLine: fc.boolean(),
    });
    fc.assert(
      fc.property(lights, ({ redshift, hostMag, galacticMag, magnification, includes, isLine }) => {
        const way = {
          hostDust: hostMag === 0 ? null : ({ law: 'calzetti2000', colourExcessMag: hostMag } as const),
          galacticDust:
            galacticMag === 0 ? null : ({ law: 'ccm1989', colourExcessMag: galacticMag, scale: 'true' } as const),
          magnification,
          includes,
        };
        const restWavelengthNm = 1250 / (1 + redshift);
        const light = isLine
          ? line({
              ...way,
              frame: 'observed',
              quoted: { kind: 'lineFlux', amount: 1e-17, inputs: [] },
              restWavelengthNm,
            })
          : apparent({ ...way, at: { kind: 'response', response: responseOf(boxCurve(970, 1070)), label: 'Y' } });
        const arriving = arrivingLight(light, redshift, PLANCK18);
        const [given, whole] = [new Ledger(), new Ledger()];
        expect(arriving.addSteps(given, J_BAND)).toBeUndefined();
        expect(arriving.addStepsFromSource(whole, J_BAND)).toBeUndefined();
        expect(whole.totalMag).toBeCloseTo(given.totalMag, 9);
        expect(whole.steps[1]).toMatchObject({ id: 'distance-modulus' });
        // All of the lens, whether or not the value given contained it.
        const lensing = whole.steps.find(({ id }) => id === 'lensing')?.deltaMag ?? 0;
        expect(lensing).toBeCloseTo(-2.5 * Math.log10(magnification), 12);
      }),
      { numRuns: 60 },
    );
  });

  it('converts a luminosity from the cosmology it was derived with: the apparent light stays', () => {
    const there = arrivingLight(absolute(), 7, CONV70).magnitudeIn(J_BAND);
    const here = magnitude(absolute({ derivedWith: CONV70 }), 7, J_BAND);
    expect(here).toBeCloseTo(there as number, 12);
    const ledger = new Ledger();
    arrivingLight(absolute({ derivedWith: CONV70 }), 7, PLANCK18).addSteps(ledger, J_BAND);
    // M_new = M_old − (DM_new − DM_old), −0.046 mag at z = 7.
    expect(ledger.steps.find(({ id }) => id === 'literature-cosmology')?.deltaMag).toBeCloseTo(-0.0458, 3);
  });

  it('says why a band is dark instead of giving a huge number', () => {
    const z = responseOf(boxCurve(825, 925));
    const found = noLight(absolute(), 8.3, z);
    expect(found.code).toBe('noFluxInBand');
    expect(found.message).toBe('No flux in this band: the Lyman break is at 1.13 µm.');
    expect(noLight(apparent({ at: { kind: 'response', response: z, label: 'z' } }), 8.3, J_BAND).code).toBe(
      'noFluxInQuotedBand',
    );
    const template = absolute({ spectrum: spectrumOf({ kind: 'quasar', template: 'hewettWild2010' }) });
    expect(
      noLight({ ...template, at: { kind: 'wavelength', wavelengthNm: 150 } }, 0.2, responseOf(boxCurve(2000, 2300)))
        .code,
    ).toBe('spectrumEnds');
    expect(noLight(line(), 2, J_BAND).code).toBe('lineOutsideBand');
  });

  it('brightens by −2.5 log10 μ unless the magnitude is as seen, and leaves a surface as it is', () => {
    const plain = magnitude(absolute(), 7, J_BAND);
    expect(magnitude(absolute({ magnification: 3 }), 7, J_BAND)).toBeCloseTo(plain - 2.5 * Math.log10(3), 12);
    expect(
      magnitude(
        absolute({ magnification: 3, includes: { hostDust: true, galacticDust: false, lensing: true } }),
        7,
        J_BAND,
      ),
    ).toBe(plain);
    expect(arrivingLight(absolute({ magnification: 3 }), 7, PLANCK18, true).magnitudeIn(J_BAND)).toBe(plain);
  });

  it('gives back the absolute magnitude it was given, and that of an apparent one', () => {
    const arriving = arrivingLight(absolute(), 7, PLANCK18);
    if (arriving.kind === 'line') throw new Error('not a line');
    expect(arriving.absoluteMagnitudeAt(150)).toBeCloseTo(-21, 12);
    const seen = magnitude(absolute({ magnification: 4 }), 7, J_BAND);
    const back = arrivingLight(
      apparent({
        quoted: { kind: 'apparentMagnitude', magnitude: seen, toAbMag: 0, inputs: [] },
        at: { kind: 'response', response: J_BAND, label: 'J' },
        magnification: 4,
      }),
      7,
      PLANCK18,
    );
    if (back.kind === 'line') throw new Error('not a line');
    expect(back.absoluteMagnitudeAt(150)).toBeCloseTo(-21, 10);
  });

  it('spreads a line over the band: photons of λ F S(λ)', () => {
    const redshift = 1;
    const flux = lineFluxFromLuminosity(1e42, PLANCK18.luminosityDistanceMpc(redshift));
    const arriving = arrivingLight(line(), redshift, PLANCK18);
    if (arriving.kind !== 'line') throw new Error('not a continuum');
    expect(arriving.fluxErgSCm2()).toBeCloseTo(flux, 25);
    const level = (flux / 0.0456) * 1312.9228 ** 2;
    const narrow = sampledCurve([1312.9, 1312.9456], [level, level]);
    const asSpectrum = abMagnitudeOfPhotons(byQuadrature(narrow, TEN_PERCENT), TEN_PERCENT);
    // The line stands at 1312.9228 nm, in the middle of this stretch.
    expect(Math.abs((arriving.magnitudeIn(TEN_PERCENT) as number) - asSpectrum)).toBeLessThan(1e-5);
  });

  it('puts the continuum under a line by its equivalent width', () => {
    const arriving = arrivingLight(
      line({ continuum: { kind: 'equivalentWidth', restEquivalentWidthNm: 10 } }),
      1,
      PLANCK18,
    );
    if (arriving.kind !== 'line') throw new Error('not a continuum');
    const flux = arriving.fluxErgSCm2() ?? NaN;
    // W_obs = (1 + z) W: f_λ = F / 20 nm at 1312.9 nm.
    const expected = -2.5 * Math.log10(((flux / 20) * 1312.9228 ** 2) / 2.99792458e17) - 48.6;
    expect(arriving.continuumMagnitudeAb()).toBeCloseTo(expected, 9);
  });
});

function modulus(redshift: number): number {
  return 5 * Math.log10(PLANCK18.luminosityDistanceMpc(redshift)) + 25;
}
