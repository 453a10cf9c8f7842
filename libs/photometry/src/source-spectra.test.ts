import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { photometryFiles } from '../../../tests/factories/photometry-files.js';
import { boxCurve, curveValueAt, sampledCurve, type SampledCurve } from './sampled-curve.js';
import { restSpectrum, sourceTemplates, supernovaPhaseMag, type SourceKind } from './source-spectra.js';
import { integral } from './sources/rebin.js';

const files = photometryFiles();
const templates = sourceTemplates(files);
const LYMAN = [91.175, 97.2537, 102.572, 121.567];
const of = (kind: SourceKind, jumpsNm: readonly number[] = LYMAN) => restSpectrum(kind, templates, jumpsNm);

const starForming = {
  kind: 'starForming',
  slopeBeta: -2,
  breakRatio: 1.2,
  lymanAlphaNm: 0,
  oxygenIINm: 0,
  oxygenIIIHydrogenBetaNm: 0,
  hydrogenAlphaNm: 0,
} as const;

const everyKind: SourceKind[] = [
  { kind: 'powerLaw', slopeBeta: -2, escapeFraction: 0.1 },
  starForming,
  { kind: 'passive' },
  { kind: 'quasar', template: 'powerLaws' },
  { kind: 'quasar', template: 'hewettWild2010' },
  { kind: 'supernovaIa', phaseDays: 3 },
  { kind: 'blackbody', temperatureK: 10_000 },
  { kind: 'sampled', label: 'mine', source: '', wavelengthsNm: [80, 200, 900], fluxPerWavelength: [1, 3, 2] },
];

describe('every kind of source', () => {
  it.each(everyKind.map((kind) => [JSON.stringify(kind).slice(0, 60), kind] as const))(
    '%s is a curve that a product can be taken of',
    (_, kind) => {
      const { continuum, validLowNm, validHighNm, label, source } = of(kind);
      // sampledCurve refuses what does not ascend, is negative or not finite.
      expect(() => sampledCurve(continuum.wavelengthsNm, continuum.values)).not.toThrow();
      expect(validLowNm).toBeGreaterThanOrEqual(continuum.wavelengthsNm[0]!);
      expect(validHighNm).toBeLessThanOrEqual(continuum.wavelengthsNm.at(-1)!);
      expect(label).not.toBe('');
      if (kind.kind !== 'sampled') expect(source).not.toBe('');
      const inside = LYMAN.filter((x) => x > continuum.wavelengthsNm[0]!);
      for (const jump of inside) expect(continuum.wavelengthsNm.filter((x) => x === jump)).toHaveLength(2);
      const middle = Math.sqrt(Math.max(validLowNm, 130) * Math.min(validHighNm, 2000));
      expect(curveValueAt(continuum, middle)).toBeGreaterThan(0);
    },
  );
});

describe('power law', () => {
  it('is λ^β above the Lyman limit and the escape fraction of it below', () => {
    const { continuum } = of({ kind: 'powerLaw', slopeBeta: -2.3, escapeFraction: 0.25 });
    const ratio = (a: number, b: number): number => curveValueAt(continuum, a) / curveValueAt(continuum, b);
    // Nodes are exact; between them the chord is off by up to 1.25e-7 |β (β − 1)| = 9.5e-7.
    expect(Math.abs(ratio(300, 150) / 2 ** -2.3 - 1)).toBeLessThan(1e-6);
    expect(Math.abs(ratio(91.1749999, 91.175) / 0.25 - 1)).toBeLessThan(1e-6);
    expect(curveValueAt(of({ kind: 'powerLaw', slopeBeta: 1, escapeFraction: 0 }).continuum, 91)).toBe(0);
  });

  it('refuses an escape fraction above 1', () => {
    expect(() => of({ kind: 'powerLaw', slopeBeta: -2, escapeFraction: 1.1 })).toThrow(/escapeFraction/);
  });
});

describe('star-forming galaxy', () => {
  it('rises by the break ratio in f_ν between 364.6 and 400 nm, is continuous there, and dark below the Lyman limit', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 4, noNaN: true }),
        fc.double({ min: -3, max: 0, noNaN: true }),
        (d, beta) => {
          const { continuum } = of({ ...starForming, slopeBeta: beta, breakRatio: d });
          const perFrequency = (x: number): number => curveValueAt(continuum, x) * x * x;
          const rise = perFrequency(400) / perFrequency(364.6);
          const isContinuous = [364.6, 400].every(
            (x) => Math.abs(curveValueAt(continuum, x * (1 - 1e-9)) / curveValueAt(continuum, x) - 1) < 1e-7,
          );
          return Math.abs(rise / d - 1) < 1e-9 && isContinuous && curveValueAt(continuum, 91) === 0;
        },
      ),
      { numRuns: 20 },
    );
  });

  it('has lines of the equivalent widths given, in the ratios of their atoms', () => {
    const { continuum, lines } = of({
      ...starForming,
      lymanAlphaNm: 3,
      oxygenIINm: 5,
      oxygenIIIHydrogenBetaNm: 60,
      hydrogenAlphaNm: 40,
    });
    const flux = (id: string): number => lines.find((line) => line.id === id)!.flux;
    // The continuum is drawn straight between nodes, hence 1e-6.
    const near = (value: number, expected: number): void => expect(Math.abs(value / expected - 1)).toBeLessThan(1e-6);
    near(flux('Lya') / curveValueAt(continuum, 121.567), 3);
    near((flux('OII_3727') + flux('OII_3729')) / curveValueAt(continuum, 372.9875), 5);
    near((flux('Hb') + flux('OIII_4960') + flux('OIII_5008')) / curveValueAt(continuum, 500.824), 60);
    near(flux('Ha') / curveValueAt(continuum, 656.4614), 40);
    near(flux('OIII_5008') / flux('OIII_4960'), 2.98);
    near(flux('OII_3729') / flux('OII_3727'), 1.5);
    expect(of(starForming).lines).toEqual([]);
  });
});

describe('passive galaxy', () => {
  it('steps by 1.9 at 400 nm, is flat to 800 nm and falls as 1/λ beyond', () => {
    const { continuum } = of({ kind: 'passive' });
    const at = (x: number): number => curveValueAt(continuum, x);
    expect(at(400) / at(400 - 1e-9)).toBeCloseTo(1.9, 6);
    expect(at(799)).toBe(at(401));
    expect(at(1600) / at(800)).toBeCloseTo(0.5, 6);
    expect(at(250) / at(500)).toBeCloseTo(0.05, 9);
  });
});

describe('blackbody', () => {
  it('peaks at Wien’s wavelength with 1 and has the Rayleigh–Jeans slope far beyond', () => {
    const { continuum } = of({ kind: 'blackbody', temperatureK: 10_000 });
    const top = continuum.values.indexOf(Math.max(...continuum.values));
    // b = 2.897771955e6 nm K (CODATA 2018); a node is within half a step, 5e-4.
    expect(Math.abs(continuum.wavelengthsNm[top]! / 289.7771955 - 1)).toBeLessThan(6e-4);
    expect(Math.abs(continuum.values[top]! - 1)).toBeLessThan(3e-6);
    const slope = Math.log(curveValueAt(continuum, 29_000) / curveValueAt(continuum, 28_000)) / Math.log(29 / 28);
    expect(slope).toBeCloseTo(-4 + 0.025, 2);
  });

  it('does not overflow where it is dark', () => {
    const { continuum } = of({ kind: 'blackbody', temperatureK: 100 });
    expect(curveValueAt(continuum, 50)).toBe(0);
    expect(curveValueAt(continuum, 28_977)).toBeCloseTo(1, 5);
  });
});

describe('quasar of power laws', () => {
  const { continuum } = of({ kind: 'quasar', template: 'powerLaws' });
  const perFrequencySlope = (a: number, b: number): number =>
    -(2 + Math.log(curveValueAt(continuum, b) / curveValueAt(continuum, a)) / Math.log(b / a));

  it('has the published slopes between its lines', () => {
    expect(perFrequencySlope(140, 220)).toBeCloseTo(-0.44, 5);
    expect(perFrequencySlope(560, 800)).toBeCloseTo(-2.45, 5);
    expect(perFrequencySlope(65, 85)).toBeCloseTo(-1.7, 5);
  });

  it.each([
    ['Lyα', 121.567, 9.3],
    ['C IV', 154.8195, 2.4],
    ['Mg II', 279.6352, 3.2],
    ['Hα', 656.4614, 19.5],
  ])('has %s with its equivalent width', (_, centre, width) => {
    const [low, high] = [centre * 0.93, centre * 1.07];
    const under = (x: number): number =>
      curveValueAt(continuum, low) *
      (curveValueAt(continuum, high) / curveValueAt(continuum, low)) ** (Math.log(x / low) / Math.log(high / low));
    const bare = sampledCurve(continuum.wavelengthsNm, continuum.wavelengthsNm.map(under));
    const excess = (integral(continuum, low, high) - integral(bare, low, high)) / under(centre);
    // 300 km/s nodes draw a Gaussian of 5000 km/s within 0.1 %.
    expect(Math.abs(excess / width - 1)).toBeLessThan(1e-3);
  });
});

describe('composite quasar', () => {
  const own = templates.quasarHewettWild2010.curve;
  const spectrum = of({ kind: 'quasar', template: 'hewettWild2010' });

  it('conserves the flux of the published points', () => {
    const [low, high] = [own.wavelengthsNm[0]!, own.wavelengthsNm.at(-1)!];
    const ownTotal = integral(own, low, high);
    expect(Math.abs(integral(spectrum.continuum, low, high) / ownTotal - 1)).toBeLessThan(1e-9);
    // In the bins of a band, too: edges cut bins, which costs up to one bin's change of flux.
    for (const [a, b] of [
      [150, 160],
      [275, 285],
      [480, 505],
      [640, 670],
    ] as const) {
      expect(Math.abs(integral(spectrum.continuum, a, b) / integral(own, a, b) - 1)).toBeLessThan(1e-3);
    }
  });

  it('is continued to the blue at its own level, with a caution, and ends where it ends', () => {
    const at = (x: number): number => curveValueAt(spectrum.continuum, x);
    expect(Math.abs(at(127.4) / at(127.8) - 1)).toBeLessThan(0.1);
    expect(at(121.567) / at(127.4)).toBeGreaterThan(2);
    expect(spectrum.cautions.map(({ code }) => code)).toContain('quasarContinued');
    expect(spectrum.validHighNm).toBeCloseTo(800.387, 3);
    expect(at(801)).toBe(0);
  });

  it('is in vacuum: [O III] peaks at 500.82 nm, not at 500.68 nm', () => {
    const near = own.wavelengthsNm.filter((x) => x > 499 && x < 503);
    const peak = near.reduce((best, x) => (curveValueAt(own, x) > curveValueAt(own, best) ? x : best));
    // The points are 0.12 nm apart, and air would be 0.14 nm to the blue.
    expect(Math.abs(peak - 500.824)).toBeLessThan(0.06);
  });
});

describe('supernova', () => {
  const b: SampledCurve = boxCurve(390, 490);

  it('fades by 1.1 mag in the 15 days after its maximum in B, as a normal one does', () => {
    // Δm15(B) = 1.1 for a normal type Ia (Phillips et al. 1999, AJ 118, 1766); 0.1 for the box and the 5-day phases.
    expect(Math.abs(supernovaPhaseMag(15, b, templates) - 1.1)).toBeLessThan(0.1);
    expect(supernovaPhaseMag(0, b, templates)).toBe(0);
  });

  it('is brightest at phase 0 and fades on either side', () => {
    const at = (phase: number): number => supernovaPhaseMag(phase, b, templates);
    for (let phase = 1; phase <= 60; phase++) expect(at(phase)).toBeGreaterThan(at(phase - 1));
    for (let phase = -1; phase >= -15; phase--) expect(at(phase)).toBeGreaterThan(at(phase + 1));
  });

  it('is the template at its phases and the mean of two half-way between', () => {
    const { wavelengthsNm, fluxPerWavelength } = files.supernovaIaHsiao.data;
    const [i, at10, at15] = [wavelengthsNm.indexOf(550), 5, 6];
    const flux = (phaseDays: number): number => curveValueAt(of({ kind: 'supernovaIa', phaseDays }).continuum, 550);
    expect(flux(10)).toBe(fluxPerWavelength[at10]![i]);
    expect(flux(12.5)).toBeCloseTo((fluxPerWavelength[at10]![i]! + fluxPerWavelength[at15]![i]!) / 2, 12);
  });

  it('refuses a phase outside the template', () => {
    expect(() => of({ kind: 'supernovaIa', phaseDays: -15.1 })).toThrow(/phaseDays/);
    expect(() => supernovaPhaseMag(61, b, templates)).toThrow(/phaseDays/);
  });
});

describe('sampled spectrum', () => {
  it('keeps its points and its jumps and adds nodes only inside its range', () => {
    const wavelengthsNm = [100, 120, 120, 121.567, 150];
    const fluxPerWavelength = [1, 2, 5, 4, 0];
    const { continuum } = of({ kind: 'sampled', label: 'x', source: '', wavelengthsNm, fluxPerWavelength });
    const at = (x: number): number => curveValueAt(continuum, x);
    expect(at(120)).toBe(5);
    expect(at(120 - 1e-7)).toBeCloseTo(2, 6);
    expect(at(110)).toBeCloseTo(1.5, 12);
    expect(at(135)).toBeCloseTo(4 * (15 / 28.433), 9);
    const both = [...continuum.wavelengthsNm.keys()].filter((i) => continuum.wavelengthsNm[i] === 121.567);
    expect(both.map((i) => continuum.values[i])).toEqual([4, 4]);
    expect(continuum.wavelengthsNm[0]).toBe(100);
    expect(continuum.wavelengthsNm.at(-1)).toBe(150);
  });

  it('refuses points that do not ascend', () => {
    expect(() =>
      of({ kind: 'sampled', label: 'x', source: '', wavelengthsNm: [2, 1], fluxPerWavelength: [1, 1] }),
    ).toThrow(/wavelengthsNm\.1/);
  });
});

describe('template files', () => {
  it('are refused where a row is missing or a phase falls back', () => {
    const { meta, data } = files.supernovaIaHsiao;
    const broken = (change: Partial<typeof data>) => () =>
      sourceTemplates({ ...files, supernovaIaHsiao: { meta, data: { ...data, ...change } } });
    expect(broken({ phasesDays: data.phasesDays.slice(1) })).toThrow(/phasesDays\.length/);
    expect(broken({ phasesDays: data.phasesDays.map(() => 0) })).toThrow(/phasesDays\.1/);
  });
});
