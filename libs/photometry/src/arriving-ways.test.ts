/**
 * What lies on the way, step by step, against closed forms: in ranges so narrow (1e-4 of their wavelength) that everything has one
 * value in them. Tolerance 1e-6 mag where nothing jumps: straight lines between points 1e-3 apart in ln λ.
 */
import { createCosmology } from '@faintward/cosmology';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { absoluteLight, apparentLight, INOUE, lineLight, MADAU, powerLaw } from '../../../tests/factories/lights.js';
import { arrivingLight } from './arriving-light.js';
import { attenuationMag, galacticAttenuationMag } from './dust.js';
import { Ledger } from './ledger.js';
import { lineFluxFromLuminosity } from './lines.js';
import { boxCurve, sampledCurve } from './sampled-curve.js';
import type { ContinuumLight, Includes, LineLight } from './source-light.js';
import { abMagnitudeOfPhotons, linePhotonIntegral, type Response, responseOf } from './synthetic.js';

const PLANCK18 = createCosmology('planck18');
const CONV70 = createCosmology('conv70');

const narrowAt = (nm: number): Response => responseOf(boxCurve(nm * (1 - 5e-5), nm * (1 + 5e-5)));
const at = (nm: number): ContinuumLight['at'] => ({ kind: 'response', response: narrowAt(nm), label: `${nm} nm` });

const HOST = { law: 'calzetti2000', colourExcessMag: 0.2 } as const;
const GALACTIC = { law: 'ccm1989', colourExcessMag: 0.15, scale: 'sfd' } as const;
const BOOLEANS = [false, true];
const EVERY_INCLUDES: Includes[] = BOOLEANS.flatMap((hostDust) =>
  BOOLEANS.flatMap((galacticDust) => BOOLEANS.map((lensing) => ({ hostDust, galacticDust, lensing }))),
);

function magnitudeOf(
  light: ContinuumLight | LineLight,
  redshift: number,
  response: Response,
  isSurface = false,
): number {
  const found = arrivingLight(light, redshift, PLANCK18, isSurface).magnitudeIn(response);
  if (typeof found !== 'number') throw new Error(found.message);
  return found;
}

function stepsOf(light: ContinuumLight | LineLight, redshift: number, response: Response, isSurface = false) {
  const ledger = new Ledger();
  const reason = arrivingLight(light, redshift, PLANCK18, isSurface).addSteps(ledger, response);
  return {
    reason,
    totalMag: ledger.totalMag,
    ids: ledger.steps.map(({ id }) => id),
    by: Object.fromEntries(ledger.steps.map(({ id, deltaMag }) => [id, deltaMag])),
  };
}

const modulus = (redshift: number, cosmology = PLANCK18): number =>
  5 * Math.log10(cosmology.luminosityDistanceMpc(redshift)) + 25;
const hydrogenMag = (nm: number, redshift: number): number => (2.5 / Math.LN10) * INOUE.opticalDepth(nm, redshift);

describe.each(EVERY_INCLUDES)('with host dust %s, galactic dust %s and lensing %s already contained', (includes) => {
  const screens = { hostDust: HOST, galacticDust: GALACTIC, magnification: 7, includes };
  const hostAt = (nm: number, redshift: number): number =>
    attenuationMag(HOST.law, nm / (1 + redshift), HOST.colourExcessMag);
  const galacticAt = (nm: number): number => galacticAttenuationMag(nm, 0.15, 'sfd', 'ccm1989');
  const lensing = includes.lensing ? 0 : -2.5 * Math.log10(7);

  it('an apparent magnitude changes from one wavelength to another', () => {
    const redshift = 3.6;
    const slopeBeta = -1.5;
    // 622 nm lies beyond Lyα at 559 nm, the others in the forest, at Lyα and beyond, and in the near infrared.
    for (const [fromNm, toNm] of [
      [622, 1250],
      [1250, 622],
      [1250, 530],
      [530, 1250],
    ] as const) {
      const light = apparentLight(at(fromNm), { ...screens, spectrum: powerLaw(slopeBeta) });
      const colour = -2.5 * (slopeBeta + 2) * Math.log10(toNm / fromNm);
      const expected = {
        spectrum: colour,
        'host-dust': hostAt(toNm, redshift) - (includes.hostDust ? hostAt(fromNm, redshift) : 0),
        intergalactic: hydrogenMag(toNm, redshift) - hydrogenMag(fromNm, redshift),
        lensing,
        'galactic-dust': galacticAt(toNm) - (includes.galacticDust ? galacticAt(fromNm) : 0),
      };
      const { by, totalMag, ids } = stepsOf(light, redshift, narrowAt(toNm));
      for (const [id, mag] of Object.entries(expected)) expect(Math.abs((by[id] ?? 0) - mag), id).toBeLessThan(3e-6);
      const sum = Object.values(expected).reduce((a, b) => a + b, 24);
      expect(Math.abs(totalMag - sum)).toBeLessThan(5e-6);
      expect(Math.abs(magnitudeOf(light, redshift, narrowAt(toNm)) - totalMag)).toBeLessThan(1e-11);
      const way = ['host-dust', 'intergalactic', ...(includes.lensing ? [] : ['lensing']), 'galactic-dust'];
      expect(ids).toEqual(['apparent-magnitude', 'spectrum', ...way]);
    }
  });

  it('an absolute magnitude becomes an apparent one, never containing the Milky Way', () => {
    const redshift = 2.8;
    const light = absoluteLight({ ...screens, spectrum: powerLaw(-1.5) });
    const toNm = 440;
    const expected = {
      'absolute-magnitude': -21,
      'distance-modulus': modulus(redshift),
      'redshift-bandwidth': -2.5 * Math.log10(1 + redshift),
      spectrum: -2.5 * 0.5 * Math.log10(toNm / (1 + redshift) / 150),
      'host-dust': hostAt(toNm, redshift) - (includes.hostDust ? hostAt(150, 0) : 0),
      intergalactic: hydrogenMag(toNm, redshift),
      lensing,
      'galactic-dust': galacticAt(toNm),
    };
    const { by, totalMag } = stepsOf(light, redshift, narrowAt(toNm));
    for (const [id, mag] of Object.entries(expected)) expect(Math.abs((by[id] ?? 0) - mag), id).toBeLessThan(3e-6);
    expect(Math.abs(magnitudeOf(light, redshift, narrowAt(toNm)) - totalMag)).toBeLessThan(1e-11);
    const sum = Object.values(expected).reduce((a, b) => a + b, 0);
    expect(Math.abs(totalMag - sum)).toBeLessThan(5e-6);
  });

  it('a line loses what it does not yet lack', () => {
    const redshift = 0.9;
    const nm = 656.4614 * (1 + redshift);
    const response = responseOf(boxCurve(1170, 1330));
    for (const frame of ['rest', 'observed'] as const) {
      const amount = frame === 'rest' ? 1e42 : 3e-17;
      const flux = frame === 'rest' ? lineFluxFromLuminosity(amount, PLANCK18.luminosityDistanceMpc(redshift)) : amount;
      const light = lineLight({ ...screens, frame, quoted: { kind: 'lineFlux', amount, inputs: [] } });
      const host = includes.hostDust ? 0 : hostAt(nm, redshift);
      const galactic = includes.galacticDust && frame === 'observed' ? 0 : galacticAt(nm);
      const expected = flux * 10 ** (-0.4 * (host + galactic + lensing));
      const arriving = arrivingLight(light, redshift, PLANCK18);
      if (arriving.kind !== 'line') throw new Error('not a line');
      // The table of Galactic dust is within 1e-6 of its law.
      expect(Math.abs(arriving.fluxErgSCm2()! / expected - 1)).toBeLessThan(1e-6);
      const magnitude = abMagnitudeOfPhotons(linePhotonIntegral(response, nm, expected), response);
      expect(Math.abs(magnitudeOf(light, redshift, response) - magnitude)).toBeLessThan(1e-6);
      expect(Math.abs(stepsOf(light, redshift, response).totalMag - magnitude)).toBeLessThan(1e-6);
    }
  });
});

describe('a magnitude averaged over the range looked at', () => {
  it('has no colour, only what it does not contain', () => {
    const J = responseOf(boxCurve(1170, 1330));
    const light = apparentLight(
      { kind: 'range' },
      {
        hostDust: HOST,
        galacticDust: { ...GALACTIC, scale: 'true' },
        includes: { hostDust: true, galacticDust: false, lensing: true },
      },
    );
    const { ids, by, totalMag } = stepsOf(light, 2, J);
    expect(ids).toEqual(['apparent-magnitude', 'host-dust', 'intergalactic', 'galactic-dust']);
    expect(by['host-dust']).toBe(0);
    expect(by['intergalactic']).toBe(0);
    // Averaged over the band: near the value in its middle.
    expect(by['galactic-dust']).toBeCloseTo(galacticAttenuationMag(1247, 0.15, 'true', 'ccm1989'), 2);
    expect(magnitudeOf(light, 2, J)).toBeCloseTo(totalMag, 11);
    expect(totalMag).toBeGreaterThan(24.03);
    const arriving = arrivingLight(light, 2, PLANCK18);
    expect(arriving.kind === 'continuum' ? arriving.normalisationMag() : NaN).toBeUndefined();
  });
});

describe('absolute magnitudes', () => {
  it('in a rest-frame band given in Vega magnitudes become apparent ones with the colour between the bands', () => {
    // Narrow bands: m = M + offset + DM − 2.5 log10(1 + z) + colour from 440 nm to 800/1.9 nm.
    const light = absoluteLight({
      quoted: { kind: 'absoluteMagnitude', magnitude: -20, toAbMag: -0.09, inputs: [] },
      at: at(440),
      spectrum: powerLaw(-1.2),
    });
    const expected = -20.09 + modulus(0.9) - 2.5 * Math.log10(1.9) - 2.5 * 0.8 * Math.log10(800 / 1.9 / 440);
    expect(Math.abs(magnitudeOf(light, 0.9, narrowAt(800)) - expected)).toBeLessThan(1e-6);
    expect(stepsOf(light, 0.9, narrowAt(800)).by['vega-to-ab']).toBe(-0.09);
  });

  it('quoted in the forest or in a band there are those of the source, without the forest', () => {
    const plain = magnitudeOf(absoluteLight(), 3, narrowAt(800));
    const quoted = { kind: 'wavelength', wavelengthNm: 100 } as const;
    expect(magnitudeOf(absoluteLight({ at: quoted }), 3, narrowAt(800))).toBeCloseTo(plain, 9);
    expect(magnitudeOf(absoluteLight({ at: at(110) }), 3, narrowAt(800))).toBeCloseTo(plain, 9);
    expect(stepsOf(absoluteLight({ at: at(110) }), 3, narrowAt(440)).by['intergalactic']).toBeCloseTo(
      hydrogenMag(440, 3),
      5,
    );
  });

  it('and lines of the literature keep the apparent light of their cosmology', () => {
    const change = modulus(2, CONV70) - modulus(2);
    const continuum = absoluteLight({ derivedWith: CONV70 });
    expect(magnitudeOf(continuum, 2, narrowAt(800)) - magnitudeOf(absoluteLight(), 2, narrowAt(800))).toBeCloseTo(
      change,
      11,
    );
    const light = lineLight({ restWavelengthNm: 500, derivedWith: CONV70 });
    const response = narrowAt(1500);
    expect(magnitudeOf(light, 2, response) - magnitudeOf({ ...light, derivedWith: PLANCK18 }, 2, response)).toBeCloseTo(
      change,
      11,
    );
    expect(stepsOf(light, 2, response).by['literature-cosmology']).toBeCloseTo(change, 11);
  });

  it('are found of what is seen, less lensing, dust of the Milky Way and hydrogen, with the dust of the source', () => {
    const expected = (light: ContinuumLight, redshift: number): number => {
      const arriving = arrivingLight(light, redshift, PLANCK18);
      return (arriving.kind === 'continuum' ? arriving.absoluteMagnitudeAt(150) : undefined) ?? NaN;
    };
    const nm = 150 * 4.6;
    const toSource = -modulus(3.6) + 2.5 * Math.log10(4.6);
    const galactic = galacticAttenuationMag(nm, 0.15, 'sfd', 'ccm1989');
    const screens = { hostDust: HOST, galacticDust: GALACTIC, magnification: 7 };
    for (const includes of EVERY_INCLUDES) {
      const found = expected(apparentLight(at(nm), { ...screens, includes }), 3.6);
      const dust = includes.hostDust ? 0 : attenuationMag('calzetti2000', 150, 0.2);
      const rest =
        24 + toSource + dust - (includes.galacticDust ? galactic : 0) + (includes.lensing ? 2.5 * Math.log10(7) : 0);
      expect(Math.abs(found - rest)).toBeLessThan(3e-6);
      const given = expected(absoluteLight({ ...screens, includes }), 3.6);
      expect(Math.abs(given - (-21 + dust + (includes.lensing ? 2.5 * Math.log10(7) : 0)))).toBeLessThan(3e-6);
    }
    // Of another cosmology: as bright on the sky, another luminosity.
    const literature = expected(absoluteLight({ derivedWith: CONV70 }), 3.6);
    expect(literature).toBeCloseTo(-21 + modulus(3.6, CONV70) - modulus(3.6), 11);
  });
});

describe('the way of an observed light told from its source', () => {
  it('begins with the luminosity it implies, at the rest wavelength looked at, before dust and lens', () => {
    const light = apparentLight(at(1250), {
      spectrum: powerLaw(-1.5),
      hostDust: HOST,
      galacticDust: GALACTIC,
      magnification: 7,
      includes: { hostDust: false, galacticDust: false, lensing: false },
    });
    const ledger = new Ledger();
    const arriving = arrivingLight(light, 2, PLANCK18);
    if (arriving.kind === 'line') throw new Error('not a continuum');
    expect(arriving.addStepsFromSource(ledger, narrowAt(800))).toBeUndefined();
    const by = Object.fromEntries(ledger.steps.map(({ id, deltaMag }) => [id, deltaMag]));
    const dust = attenuationMag(HOST.law, 800 / 3, HOST.colourExcessMag);
    expect(by['implied-magnitude']).toBeCloseTo(arriving.absoluteMagnitudeAt(800 / 3)! - dust, 5);
    expect(by['distance-modulus']).toBeCloseTo(modulus(2), 11);
    expect(by['redshift-bandwidth']).toBeCloseTo(-2.5 * Math.log10(3), 11);
    expect(by['host-dust']).toBeCloseTo(dust, 5);
    expect(by['lensing']).toBeCloseTo(-2.5 * Math.log10(7), 11);
    expect(ledger.totalMag).toBeCloseTo(arriving.magnitudeIn(narrowAt(800)) as number, 9);
  });
});

describe('Lyα', () => {
  it('of a star-formation rate at redshift 7 leaves by its escape fraction, and the mean medium takes nothing of it', () => {
    const light = lineLight({
      quoted: { kind: 'starFormationRate', amount: 8.7e43, inputs: [] },
      restWavelengthNm: 121.567,
      escapeFraction: 0.3,
    });
    const arriving = arrivingLight(light, 7, PLANCK18);
    if (arriving.kind !== 'line') throw new Error('not a line');
    const expected = 0.3 * lineFluxFromLuminosity(8.7e43, PLANCK18.luminosityDistanceMpc(7));
    expect(arriving.fluxErgSCm2()! / expected).toBeCloseTo(1, 12);
    const { ids, by } = stepsOf(light, 7, responseOf(boxCurve(960, 980)));
    expect(ids).toEqual(['line-star-formation-rate', 'escape-fraction', 'distance-modulus']);
    expect(by['escape-fraction']).toBeCloseTo(-2.5 * Math.log10(0.3), 12);
    expect(arriving.cautions().map(({ code }) => code)).toEqual(['lymanAlphaLine']);
    expect(arrivingLight(lineLight(), 7, PLANCK18)).toMatchObject({ kind: 'line' });
  });

  it('is left alone too where a line list gives it in a decimal less, as a line and in a spectrum', () => {
    const response = responseOf(boxCurve(600, 640));
    const loss = (restWavelengthNm: number): number => {
      const light = lineLight({ restWavelengthNm });
      return magnitudeOf(light, 4, response) - magnitudeOf({ ...light, medium: null }, 4, response);
    };
    expect(loss(121.56)).toBe(0);
    expect(loss(121.5)).toBeCloseTo(hydrogenMag(121.5 * 5, 4), 9);
    const factorAt = (restWavelengthNm: number): number => {
      const arriving = arrivingLight(absoluteLight(), 4, PLANCK18);
      return arriving.kind === 'continuum' ? arriving.lineFactors(restWavelengthNm).arrives : NaN;
    };
    expect(factorAt(121.56)).toBe(1);
    expect(factorAt(121.5)).toBeCloseTo(Math.exp(-INOUE.opticalDepth(121.5 * 5, 4)), 12);
  });

  it('is followed by lines that the forest does take, where they are given as luminosities', () => {
    const light = lineLight({ restWavelengthNm: 103 });
    const response = responseOf(boxCurve(440, 480));
    const dimming = (2.5 / Math.LN10) * INOUE.opticalDepth(103 * 4.5, 3.5);
    const bare = magnitudeOf({ ...light, medium: null }, 3.5, response);
    expect(magnitudeOf(light, 3.5, response) - bare).toBeCloseTo(dimming, 11);
    const observed = lineLight({
      restWavelengthNm: 103,
      frame: 'observed',
      quoted: { kind: 'lineFlux', amount: 1e-17, inputs: [] },
    });
    const without = magnitudeOf({ ...observed, medium: null }, 3.5, response);
    expect(magnitudeOf(observed, 3.5, response)).toBe(without);
  });
});

describe('a surface', () => {
  it('keeps its brightness behind a lens, as a continuum and as a line', () => {
    const lens = { magnification: 9, includes: { hostDust: true, galacticDust: true, lensing: false } };
    const light = apparentLight(at(800), lens);
    expect(magnitudeOf(light, 1, narrowAt(800), true)).toBeCloseTo(24, 12);
    expect(magnitudeOf(light, 1, narrowAt(800))).toBeCloseTo(24 - 2.5 * Math.log10(9), 12);
    const line = lineLight({ ...lens, frame: 'observed', quoted: { kind: 'lineFlux', amount: 1e-17, inputs: [] } });
    const response = responseOf(boxCurve(1170, 1330));
    const lensed = magnitudeOf(line, 0.9, response);
    expect(magnitudeOf(line, 0.9, response, true) - lensed).toBeCloseTo(2.5 * Math.log10(9), 12);
    const arriving = arrivingLight(light, 1, PLANCK18, true);
    expect(arriving.kind === 'continuum' ? arriving.absoluteMagnitudeAt(400) : NaN).toBeUndefined();
  });
});

describe('rules of thumb', () => {
  const bands = fc.double({ min: 350, max: 2300, noNaN: true }).map((nm) => responseOf(boxCurve(nm, nm * 1.15)));
  const lights = fc.record({
    redshift: fc.double({ min: 0.1, max: 6, noNaN: true }),
    slopeBeta: fc.constantFrom(-2.9, -2, -1.4, -0.3),
    hostMag: fc.double({ min: 0, max: 0.5, noNaN: true }),
    galacticMag: fc.double({ min: 0, max: 0.5, noNaN: true }),
    medium: fc.constantFrom(INOUE, MADAU, null),
    response: bands,
  });
  const lightOf = (
    {
      slopeBeta,
      hostMag,
      galacticMag,
      medium,
    }: { slopeBeta: number; hostMag: number; galacticMag: number; medium: typeof INOUE | null },
    overrides: Partial<ContinuumLight> = {},
  ): ContinuumLight =>
    absoluteLight({
      spectrum: powerLaw(slopeBeta, 1),
      hostDust: { law: 'calzetti2000', colourExcessMag: hostMag },
      galacticDust: { law: 'fitzpatrick1999', colourExcessMag: galacticMag, scale: 'true' },
      medium,
      includes: { hostDust: false, galacticDust: false, lensing: false },
      ...overrides,
    });

  it('fainter, further, dustier, through more hydrogen or less magnified is never brighter', () => {
    fc.assert(
      fc.property(lights, ({ response, redshift, ...light }) => {
        const base = arrivingLight(lightOf(light), redshift, PLANCK18).magnitudeIn(response);
        fc.pre(typeof base === 'number');
        const isFainter = (other: ContinuumLight, z = redshift, range = response): boolean => {
          const found = arrivingLight(other, z, PLANCK18).magnitudeIn(range);
          return typeof found !== 'number' || found >= base - 1e-9;
        };
        const quoted = { kind: 'absoluteMagnitude', magnitude: -20.9, toAbMag: 0, inputs: [] } as const;
        expect(isFainter(lightOf(light, { quoted }))).toBe(true);
        expect(isFainter(lightOf({ ...light, hostMag: light.hostMag + 0.05 }))).toBe(true);
        expect(isFainter(lightOf({ ...light, galacticMag: light.galacticMag + 0.05 }))).toBe(true);
        expect(isFainter(lightOf(light, { magnification: 0.8 }))).toBe(true);
        if (light.medium === null) expect(isFainter(lightOf({ ...light, medium: INOUE }))).toBe(true);
        // The same part of the rest-frame spectrum, further away and without the dust of the Milky Way, which reddens.
        const clear = { ...light, galacticMag: 0 };
        const near = magnitudeOf(lightOf(clear), redshift, response);
        const stretch = 1.1;
        const { wavelengthsNm } = response.curve;
        const further = (1 + redshift) * stretch - 1;
        const moved = responseOf(boxCurve(wavelengthsNm[0]! * stretch, wavelengthsNm[1]! * stretch));
        const far = arrivingLight(lightOf(clear), further, PLANCK18).magnitudeIn(moved);
        expect(typeof far !== 'number' || far > near).toBe(true);
      }),
      { numRuns: 150 },
    );
  });

  it('a magnification of μ brightens by 2.5 log10 μ, whatever else there is', () => {
    fc.assert(
      fc.property(lights, fc.double({ min: -6, max: 6, noNaN: true }), ({ response, redshift, ...light }, logMu) => {
        const base = arrivingLight(lightOf(light), redshift, PLANCK18).magnitudeIn(response);
        fc.pre(typeof base === 'number');
        const lensed = magnitudeOf(lightOf(light, { magnification: 10 ** logMu }), redshift, response);
        expect(lensed - base).toBeCloseTo(-2.5 * logMu, 9);
      }),
      { numRuns: 60 },
    );
  });

  it('another cosmology changes the luminosity of a measured light, and nothing that is measured', () => {
    fc.assert(
      fc.property(lights, ({ response, redshift, ...light }) => {
        const measured: ContinuumLight = { ...lightOf(light), ...apparentLight(at(1250)) };
        const [here, there] = [PLANCK18, CONV70].map((each) => arrivingLight(measured, redshift, each));
        expect(there!.magnitudeIn(response)).toEqual(here!.magnitudeIn(response));
        const absolute = [here, there].map((each) =>
          each?.kind === 'continuum' ? (each.absoluteMagnitudeAt(300) ?? NaN) : NaN,
        );
        expect(absolute[1]! - absolute[0]!).toBeCloseTo(modulus(redshift) - modulus(redshift, CONV70), 9);
      }),
      { numRuns: 60 },
    );
  });

  it('a factor of the response cancels', () => {
    fc.assert(
      fc.property(lights, fc.double({ min: 0.01, max: 1, noNaN: true }), ({ redshift, ...light }, factor) => {
        const values = [0, 0.7, 1, 0.3];
        const curve = (by: number) =>
          responseOf(
            sampledCurve(
              [900, 950, 1000, 1100],
              values.map((each) => each * by),
            ),
          );
        const base = arrivingLight(lightOf(light), redshift, PLANCK18).magnitudeIn(curve(1));
        fc.pre(typeof base === 'number');
        expect(magnitudeOf(lightOf(light), redshift, curve(factor))).toBeCloseTo(base, 10);
      }),
      { numRuns: 40 },
    );
  });

  it('the observed equivalent width of a line is (1 + z) times that at rest, and lifts a band accordingly', () => {
    const spectrum = powerLaw(-2);
    const equivalentWidthNm = 5;
    const level = (486.2683 / 150) ** -2;
    const line = {
      id: 'Hb',
      label: 'Hβ',
      restWavelengthNm: 486.2683,
      flux: equivalentWidthNm * level,
      velocityWidthKmS: 200,
    } as const;
    const withLine = { ...spectrum, lines: [line] };
    for (const redshift of [0.5, 1, 2]) {
      const nm = line.restWavelengthNm * (1 + redshift);
      const response = responseOf(boxCurve(nm * 0.95, nm * 1.05));
      const boost =
        magnitudeOf(absoluteLight({ spectrum }), redshift, response) -
        magnitudeOf(absoluteLight({ spectrum: withLine }), redshift, response);
      // A flat f_ν has f_λ λ² constant: the line adds W (1 + z) / λ to ∫ d ln λ.
      const expected = 2.5 * Math.log10(1 + (equivalentWidthNm * (1 + redshift)) / nm / response.logIntegral);
      expect(boost).toBeCloseTo(expected, 6);
      const arriving = arrivingLight(absoluteLight({ spectrum: withLine }), redshift, PLANCK18);
      if (arriving.kind === 'line') throw new Error('not a continuum');
      const strength = arriving.lineStrength(line)!;
      expect(strength.observedEquivalentWidthNm).toBeCloseTo(equivalentWidthNm * (1 + redshift), 5);
      // f_λ of the flat continuum times the width.
      const magnitudeAb = magnitudeOf(absoluteLight({ spectrum }), redshift, narrowAt(nm));
      const perNm = (10 ** (-0.4 * (magnitudeAb + 48.6)) * 2.99792458e17) / nm ** 2;
      expect(strength.fluxErgSCm2 / (perNm * equivalentWidthNm * (1 + redshift))).toBeCloseTo(1, 5);
    }
  });
});
