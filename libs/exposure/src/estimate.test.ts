import { readFileSync } from 'node:fs';
import {
  AB_ZERO_PHOTONS_PER_M2_S,
  createInoue2014,
  type IntergalacticTable,
  LYMAN_ALPHA_NM,
  OutOfDomainError,
  photonRateOfLinePerM2,
} from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { ENGINE_VERSION, SATURATION_FRACTION, collectingAreaM2, estimate } from './index.js';
import { deliveredSeeing } from './seeing.js';
import { aSpectroscopyMode, anImagingMode, anInput, lightOf, type PlainLight } from './testing.js';
import type { Estimate, EstimateInput, FeasibleEstimate, InfeasibleEstimate } from './types.js';

const INOUE = createInoue2014(
  (
    JSON.parse(readFileSync(new URL('../../../seed/reference/igm-inoue2014.json', import.meta.url), 'utf8')) as {
      data: IntergalacticTable;
    }
  ).data,
);

function feasible(input: EstimateInput): FeasibleEstimate {
  const answer = estimate(input);
  if (answer.outcome !== 'feasible') throw new Error(answer.reason.message);
  return answer;
}
function infeasible(input: EstimateInput): InfeasibleEstimate {
  const answer = estimate(input);
  if (answer.outcome !== 'infeasible') throw new Error('expected an infeasible answer');
  return answer;
}
function codes(answer: Estimate): string[] {
  return answer.warnings.map((warning) => warning.code);
}
function withLight(light: PlainLight, redshift = 3): EstimateInput {
  return anInput({ target: { redshift, light: { ...lightOf(light), medium: INOUE }, extent: { kind: 'point' } } });
}

const EVERY_KIND: [string, EstimateInput][] = [
  ['apparent magnitude', anInput()],
  [
    'apparent magnitude at another wavelength',
    withLight({ kind: 'apparentMagnitude', magnitudeAb: 24, wavelengthNm: 900, slopeBeta: -1.5 }),
  ],
  [
    'absolute magnitude',
    withLight({ kind: 'absoluteMagnitude', absoluteMagnitudeAb: -22, restWavelengthNm: 150, slopeBeta: -2.2 }),
  ],
  [
    'lensed galaxy under thin cloud, per arcsec²',
    anInput({
      target: {
        redshift: 2.5,
        light: lightOf({
          kind: 'absoluteMagnitude',
          absoluteMagnitudeAb: -21,
          restWavelengthNm: 170,
          magnification: 5,
        }),
        extent: { kind: 'sersic', halfLightRadiusKpc: 2, index: 1.5, axisRatio: 0.6 },
      },
      conditions: { airmass: 1.4, moonClass: 'grey', transparency: 'thinCloud' },
      goal: { kind: 'signalToNoise', value: 3, per: 'arcsec2' },
    }),
  ],
  [
    'line luminosity in a slit',
    anInput({
      target: {
        redshift: 0.4,
        light: lightOf({
          kind: 'lineLuminosity',
          lineLuminosityErgS: 1e41,
          restWavelengthNm: 500.824,
          intrinsicWidthKmS: 200,
          continuumMagnitudeAb: 23,
        }),
        extent: { kind: 'sersic', halfLightRadiusArcsec: 0.3, index: 1 },
      },
      mode: aSpectroscopyMode(),
      goal: { kind: 'lineSignificance', sigma: 8 },
    }),
  ],
  [
    'line flux through an imaging band',
    withLight({ kind: 'lineFlux', lineFluxErgSCm2: 1e-16, restWavelengthNm: 155, intrinsicWidthKmS: 300 }),
  ],
  [
    'uniform patch in a slit',
    anInput({
      target: {
        redshift: 0.5,
        light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 22 }),
        extent: { kind: 'uniform', areaArcsec2: 9 },
      },
      mode: aSpectroscopyMode(),
      goal: { kind: 'signalToNoise', value: 5, per: 'arcsec2' },
    }),
  ],
];

describe('the light budget', () => {
  it.each(EVERY_KIND)('of a %s adds up exactly, to electrons per second', (_, input) => {
    const answer = feasible(input);
    let total = 0;
    for (const step of answer.steps) {
      total += step.deltaMag;
      expect(step.totalMag).toBe(total);
    }
    const beforeCounting = answer.steps.filter((step) => step.stage !== 'counting');
    expect(beforeCounting.at(-1)?.totalMag).toBe(answer.apertureMagnitudeAb);
    const aboveAtmosphere = answer.steps.filter((step) => step.stage === 'source' || step.stage === 'space');
    expect(aboveAtmosphere.at(-1)?.totalMag).toBe(answer.apparentMagnitudeAb);
    expect(10 ** (-0.4 * total)).toBe(answer.rates.sourceElectronsPerSecond);
  });

  it.each(EVERY_KIND)('of a %s goes from source to counting, each step once and explained', (_, input) => {
    const { steps } = feasible(input);
    const order = ['source', 'space', 'atmosphere', 'instrument', 'counting'];
    const stages = steps.map((step) => order.indexOf(step.stage));
    expect(stages).toEqual([...stages].sort((a, b) => a - b));
    expect(new Set(steps.map((step) => step.id)).size).toBe(steps.length);
    for (const step of steps) {
      expect(step.inputs.length).toBeGreaterThan(0);
      for (const text of [step.title, step.formula, step.source]) expect(text).not.toBe('');
    }
  });

  it('counts the photons of a line, however broad the band', () => {
    const light = { kind: 'lineFlux', lineFluxErgSCm2: 1e-16, restWavelengthNm: 155, intrinsicWidthKmS: 0 } as const;
    const answer = feasible(withLight(light));
    const lost = answer.steps.filter((step) => step.stage === 'atmosphere' || step.stage === 'instrument');
    const through = lost.reduce((product, step) => product * 10 ** (-0.4 * step.deltaMag), 1);
    const photons = photonRateOfLinePerM2(1e-16, 155 * 4) * collectingAreaM2(5, 1.2) * through;
    expect(answer.rates.sourceElectronsPerSecond / photons).toBeCloseTo(1, 11);
  });

  it('does not let the cosmology touch a measured magnitude', () => {
    const near = { luminosityDistanceMpc: () => 1 };
    expect(feasible(anInput({ cosmology: near }))).toEqual(feasible(anInput()));
  });

  it('names the version of the engine', () => {
    expect(estimate(anInput()).engineVersion).toBe(ENGINE_VERSION);
  });
});

interface Chain {
  id: string;
  input: Record<string, number> & { kind: string };
  [key: string]: unknown;
}
const chains = JSON.parse(readFileSync(new URL('../../../tests/reference/snr.json', import.meta.url), 'utf8')) as {
  imaging: Chain[];
  spectra: Chain[];
};

/** The chains fix the delivered FWHM; the pipeline starts from the zenith at 500 nm. */
function zenithSeeing(fwhmArcsec: number, wavelengthNm: number, airmass: number): number {
  return fwhmArcsec / deliveredSeeing(1, wavelengthNm, airmass).deliveredFwhmArcsec;
}

function chainInput({ input }: Chain): EstimateInput {
  const at = (name: string): number => input[name] ?? NaN;
  const isSpectrum = input['R'] !== undefined;
  const sky = at('sky_AB_arcsec2');
  const basics = {
    bandId: 'chain',
    label: 'chain',
    throughput: at('throughput'),
    extinctionMagPerAirmass: at('extinction_mag_airmass'),
    skyAbMagPerArcsec2: { dark: sky, grey: sky, bright: sky },
    detector: {
      pixelScaleArcsec: at('pixel_arcsec'),
      darkElectronsPerSecond: at('dark_e_s_pix'),
      readNoiseElectrons: at('read_noise_e'),
      fullWellElectrons: 1e9,
    },
    exposureLimits: { minimumExposureSeconds: 0.1, maximumExposureSeconds: 1e5 },
    overheads: anImagingMode().overheads,
  };
  const wavelengthNm = isSpectrum ? at('lambda_A') / 10 : Math.sqrt(at('lambda1_A') * at('lambda2_A')) / 10;
  const mode = isSpectrum
    ? ({
        kind: 'slitSpectroscopy',
        ...basics,
        wavelengthLowNm: wavelengthNm * 0.8,
        wavelengthHighNm: wavelengthNm * 1.2,
        resolvingPower: at('R'),
        slitWidthArcsec: at('slit_arcsec'),
        pixelsPerResolutionElement: at('pixels_per_resolution_element'),
        extractionLengthFwhm: at('extraction_arcsec') / at('fwhm_arcsec'),
      } as const)
    : ({
        kind: 'imaging',
        ...basics,
        wavelengthLowNm: at('lambda1_A') / 10,
        wavelengthHighNm: at('lambda2_A') / 10,
      } as const);
  const light: PlainLight =
    input.kind === 'line'
      ? {
          kind: 'lineFlux',
          lineFluxErgSCm2: at('flux_cgs'),
          restWavelengthNm: wavelengthNm,
          intrinsicWidthKmS: at('line_fwhm_km_s'),
        }
      : { kind: 'apparentMagnitude', magnitudeAb: input['mag_AB'] ?? at('mag_AB_arcsec2') };
  const fwhm = input['fwhm_arcsec'] ?? 1;
  return anInput({
    target: {
      redshift: 0,
      light: lightOf(light),
      extent: input.kind === 'extended' ? { kind: 'uniform', areaArcsec2: at('area_arcsec2') } : { kind: 'point' },
    },
    site: { zenithSeeingArcsec: zenithSeeing(fwhm, wavelengthNm, at('airmass')) },
    telescope: { diameterM: at('diameter_m'), obstructionDiameterM: at('obstruction_m') },
    mode,
    conditions: { airmass: at('airmass'), moonClass: 'dark', transparency: 'clear' },
    goal: { kind: 'exposureTime', exposureSeconds: at('time_s') / at('nexp'), exposureCount: at('nexp') },
    ...(input['aperture_radius_arcsec'] === undefined ? {} : { apertureRadiusArcsec: input['aperture_radius_arcsec'] }),
    ...(isSpectrum ? { wavelengthNm } : {}),
  });
}

describe('the whole pipeline against the reference chains, 1e-9 relative', () => {
  it.each([...chains.imaging, ...chains.spectra])('$id', (chain) => {
    const answer = feasible(chainInput(chain));
    const expectRelative = (actual: number, expected: unknown): void => {
      expect(Math.abs(actual / Number(expected) - 1)).toBeLessThanOrEqual(1e-9);
    };
    const { rates, aperture } = answer;
    expectRelative(answer.signalToNoise, chain['snr']);
    if (chain['npix'] !== undefined) {
      expectRelative(aperture.pixelCount, chain['npix']);
      expectRelative(rates.sourceElectronsPerSecond / aperture.enclosedFraction, chain['source_e_s_total']);
      expectRelative(rates.skyElectronsPerSecondPerPixel, chain['sky_e_s_pix']);
      expectRelative(rates.peakElectronsPerSecondPerPixel, chain['peak_pixel_e_s_with_sky']);
    } else {
      expectRelative(aperture.pixelCount, chain['pixels_in_sum']);
      expectRelative(rates.sourceElectronsPerSecond, chain['source_e_s']);
      expectRelative(rates.skyElectronsPerSecond, chain['sky_e_s_in_sum']);
    }
    if (chain['snr_per_pixel_column'] !== undefined) {
      const input = chainInput(chain);
      const perPixel = feasible({ ...input, goal: { ...input.goal, per: 'pixel' } as typeof input.goal });
      expectRelative(perPixel.signalToNoise, chain['snr_per_pixel_column']);
    }
  });
});

describe('what cannot be reached is answered with a reason', () => {
  const uv = { kind: 'absoluteMagnitude', absoluteMagnitudeAb: -22, restWavelengthNm: 150 } as const;

  it.each<[string, EstimateInput, string]>([
    ['a band below the Lyman limit', withLight(uv, 7.5), 'noFluxInBand'],
    [
      'a band short of Lyα at z = 8',
      { ...withLight(uv, 8), mode: anImagingMode({ wavelengthLowNm: 800, wavelengthHighNm: 900 }) },
      'noFluxInBand',
    ],
    [
      'a magnitude measured where there is no light',
      withLight({ kind: 'apparentMagnitude', magnitudeAb: 25 }, 7),
      'noFluxInBand',
    ],
    [
      'a line outside the band',
      withLight({ kind: 'lineFlux', lineFluxErgSCm2: 1e-16, restWavelengthNm: 500, intrinsicWidthKmS: 100 }, 3),
      'lineOutsideBand',
    ],
    [
      'a line that hydrogen takes',
      withLight({ kind: 'lineFlux', lineFluxErgSCm2: 1e-16, restWavelengthNm: 85, intrinsicWidthKmS: 100 }, 6.5),
      'noFluxInBand',
    ],
    [
      'a wavelength outside the spectrum',
      anInput({ mode: aSpectroscopyMode(), wavelengthNm: 1200 }),
      'wavelengthOutsideBand',
    ],
    [
      'a star that saturates at once',
      withLight({ kind: 'apparentMagnitude', magnitudeAb: 5 }, 0),
      'saturatesAtMinimumExposure',
    ],
    [
      'an exposure that saturates',
      anInput({
        target: {
          redshift: 0,
          light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 14 }),
          extent: { kind: 'point' },
        },
        goal: { kind: 'exposureTime', exposureSeconds: 600, exposureCount: 1 },
      }),
      'exposureSaturates',
    ],
    ['a galaxy far too faint', withLight({ kind: 'apparentMagnitude', magnitudeAb: 33 }), 'tooManyExposures'],
    ['a source of magnitude 60', withLight({ kind: 'apparentMagnitude', magnitudeAb: 60 }), 'tooManyExposures'],
    [
      'a year of exposures',
      anInput({
        target: {
          redshift: 0,
          light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 29.6 }),
          extent: { kind: 'point' },
        },
        mode: anImagingMode({ exposureLimits: { minimumExposureSeconds: 1, maximumExposureSeconds: 1800 } }),
      }),
      'longerThanSemester',
    ],
    [
      'a S/N beyond the systematic error',
      anInput({
        mode: anImagingMode({ systematicErrorFraction: 0.1 }),
        goal: { kind: 'signalToNoise', value: 10, per: 'aperture' },
      }),
      'signalToNoiseUnreachable',
    ],
  ])('%s', (_, input, code) => {
    const answer = infeasible(input);
    expect(answer.reason.code).toBe(code);
    expect(JSON.stringify(answer)).not.toMatch(/null,"unit"|NaN|Infinity/);
    expect(answer.reason.message).not.toMatch(/NaN|Infinity/);
  });

  it('keeps the part of a straddled band that is left', () => {
    const inside = feasible(withLight(uv, 6.3 - 2));
    const mode = anImagingMode({ wavelengthLowNm: 800, wavelengthHighNm: 1000 });
    const straddling = feasible({ ...withLight(uv, 6.3), mode });
    const step = straddling.steps.find((each) => each.id === 'intergalactic');
    // Flat f_ν: the share of ln λ above Lyα, and the little that comes through below it.
    const share = Math.log(1000 / (LYMAN_ALPHA_NM * 7.3)) / Math.log(1000 / 800);
    expect(step?.deltaMag).toBeLessThan(-2.5 * Math.log10(share));
    expect(step?.deltaMag).toBeGreaterThan(-2.5 * Math.log10(share + 0.05 * (1 - share)));
    expect(codes(straddling)).toContain('lymanBreakInBand');
    expect(codes(inside)).toContain('lymanBreakInBand');
  });

  it('keeps Lyα itself', () => {
    const light = {
      kind: 'lineFlux',
      lineFluxErgSCm2: 2e-16,
      restWavelengthNm: 121.567,
      intrinsicWidthKmS: 200,
    } as const;
    const mode = aSpectroscopyMode();
    const answer = feasible({ ...withLight(light, 6.5), mode, goal: { kind: 'lineSignificance', sigma: 5 } });
    expect(codes(answer)).toContain('lymanAlphaLine');
  });
});

describe('the series of exposures', () => {
  it('reaches the goal exactly when it may choose the length', () => {
    const answer = feasible(anInput());
    expect(answer.signalToNoise).toBeCloseTo(10, 9);
    expect(answer.exposureSeconds).toBeLessThanOrEqual(900);
  });

  it('reaches at least the goal when the length is given, and not with one exposure less', () => {
    const goal = { kind: 'signalToNoise', value: 10, per: 'aperture', exposureSeconds: 120 } as const;
    const answer = feasible(anInput({ goal }));
    expect(answer.exposureSeconds).toBe(120);
    expect(answer.signalToNoise).toBeGreaterThanOrEqual(10 * (1 - 1e-9));
    const shorter = feasible(
      anInput({ goal: { kind: 'exposureTime', exposureSeconds: 120, exposureCount: answer.exposureCount - 1 } }),
    );
    expect(shorter.signalToNoise).toBeLessThan(10);
  });

  it('splits a bright source below saturation', () => {
    const bright = withLight({ kind: 'apparentMagnitude', magnitudeAb: 13.5 }, 0);
    const answer = feasible({ ...bright, goal: { kind: 'signalToNoise', value: 3000, per: 'aperture' } });
    expect(answer.exposureCount).toBeGreaterThan(1);
    expect(answer.peakElectronsPerPixel).toBeLessThanOrEqual(SATURATION_FRACTION.value * 100_000 * (1 + 1e-12));
    expect(answer.limitedBy).toBe('source');
    expect(codes(answer)).toContain('nearSaturation');
  });

  it('takes five exposures for a dithered sky', () => {
    const mode = anImagingMode({ skySubtraction: { kind: 'ditheredFrames' } });
    const easy = withLight({ kind: 'apparentMagnitude', magnitudeAb: 20 }, 0);
    expect(feasible({ ...easy, mode }).exposureCount).toBe(5);
  });

  it('pays the variance of a narrow annulus: with as many sky pixels as aperture pixels, twice the sky', () => {
    const faint = withLight({ kind: 'apparentMagnitude', magnitudeAb: 26.5 }, 0);
    const wide = feasible(faint);
    const mode = anImagingMode({ skySubtraction: { kind: 'annulus', backgroundPixelRatio: 1 } });
    const narrow = feasible({ ...faint, mode });
    expect(narrow.openShutterSeconds / wide.openShutterSeconds).toBeCloseTo(2, 1);
  });

  it('adds the shares of the noise to one', () => {
    for (const [, input] of EVERY_KIND) {
      const { noiseShares, limitedBy } = feasible(input);
      expect(Object.values(noiseShares).reduce((sum, share) => sum + share, 0)).toBeCloseTo(1, 12);
      expect(noiseShares[limitedBy]).toBe(Math.max(...Object.values(noiseShares)));
    }
  });

  it('itemises the overheads, acquiring again in every block', () => {
    const answer = feasible(anInput({ goal: { kind: 'exposureTime', exposureSeconds: 900, exposureCount: 12 } }));
    // 940 s a cycle, five cycles in 5400 s, so three blocks for twelve exposures.
    expect(answer.overheads).toEqual([
      { id: 'acquisition', title: 'Acquisition', seconds: 3 * 180, count: 3 },
      { id: 'setup', title: 'Set-up', seconds: 60, count: 1 },
      { id: 'readout', title: 'Read-out', seconds: 12 * 30, count: 12 },
      { id: 'dither', title: 'Dither', seconds: 12 * 10, count: 12 },
    ]);
    expect(answer.totalSeconds).toBe(12 * 900 + 540 + 60 + 360 + 120);
  });

  it('says that the S/N includes a systematic error', () => {
    const mode = anImagingMode({ systematicErrorFraction: 0.05 });
    const answer = feasible(anInput({ mode }));
    expect(answer.signalToNoise).toBeCloseTo(10, 9);
    expect(answer.openShutterSeconds).toBeGreaterThan(feasible(anInput()).openShutterSeconds);
  });
});

describe('a continuum under a line', () => {
  const line = (continuumMagnitudeAb?: number): EstimateInput =>
    anInput({
      target: {
        redshift: 0,
        light: lightOf({
          kind: 'lineFlux',
          lineFluxErgSCm2: 1e-17,
          restWavelengthNm: 700,
          intrinsicWidthKmS: 250,
          ...(continuumMagnitudeAb === undefined ? {} : { continuumMagnitudeAb }),
        }),
        extent: { kind: 'point' },
      },
      mode: aSpectroscopyMode(),
      goal: { kind: 'exposureTime', exposureSeconds: 900, exposureCount: 8 },
    });

  it('adds noise and no signal', () => {
    const [without, withContinuum] = [feasible(line()), feasible(line(20))];
    expect(withContinuum.rates.sourceElectronsPerSecond).toBe(without.rates.sourceElectronsPerSecond);
    expect(withContinuum.signalToNoise).toBeLessThan(without.signalToNoise);
  });

  it('is as bright as the same magnitude observed alone', () => {
    const answer = feasible(line(20));
    const alone = feasible({
      ...line(),
      target: {
        redshift: 0,
        light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 20 }),
        extent: { kind: 'point' },
      },
      wavelengthNm: 700,
    });
    const elements = answer.aperture.pixelCount / alone.aperture.pixelCount;
    const expected = alone.rates.sourceElectronsPerSecond * elements;
    expect(answer.rates.continuumElectronsPerSecond / expected).toBeCloseTo(1, 10);
  });
});

describe('warnings', () => {
  it.each<[string, EstimateInput, string]>([
    [
      'high airmass',
      anInput({ conditions: { airmass: 2.4, moonClass: 'dark', transparency: 'clear' } }),
      'highAirmass',
    ],
    ['a narrow slit', anInput({ mode: aSpectroscopyMode({ slitWidthArcsec: 0.5 }) }), 'slitNarrowerThanSeeing'],
    [
      'coarse pixels',
      anInput({ mode: anImagingMode({ detector: { ...anImagingMode().detector, pixelScaleArcsec: 0.6 } }) }),
      'undersampled',
    ],
    ['an aperture within a pixel', anInput({ apertureRadiusArcsec: 0.15 }), 'apertureSmallerThanPixel'],
    ['a long single exposure', withLight({ kind: 'apparentMagnitude', magnitudeAb: 24 }, 0), 'fewExposures'],
    [
      'short exposures against read noise',
      anInput({ goal: { kind: 'exposureTime', exposureSeconds: 2, exposureCount: 100 } }),
      'readNoiseLimited',
    ],
    ['a source lost in the sky', withLight({ kind: 'apparentMagnitude', magnitudeAb: 28.5 }, 0), 'sourceFarBelowSky'],
    ['several nights', withLight({ kind: 'apparentMagnitude', magnitudeAb: 28.5 }, 0), 'longRequest'],
    [
      'a power law across the Balmer jump',
      withLight({ kind: 'absoluteMagnitude', absoluteMagnitudeAb: -22, restWavelengthNm: 150 }, 0.5),
      'powerLawWithoutBreaks',
    ],
    ['a small outer scale', anInput({ site: { zenithSeeingArcsec: 0.5, outerScaleM: 3 } }), 'outerScaleOutsideModel'],
    [
      'a large galaxy in a slit',
      anInput({
        target: {
          redshift: 0.2,
          light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 20 }),
          extent: { kind: 'sersic', halfLightRadiusArcsec: 4, index: 1 },
        },
        mode: aSpectroscopyMode(),
      }),
      'extendedBeyondModel',
    ],
  ])('of %s', (_, input, code) => {
    expect(codes(feasible(input))).toContain(code);
  });

  it('are absent from an ordinary request', () => {
    expect(
      codes(feasible(anInput({ goal: { kind: 'exposureTime', exposureSeconds: 600, exposureCount: 4 } }))),
    ).toEqual([]);
  });
});

describe('input that cannot be computed with is refused by the path of its field', () => {
  const mode = anImagingMode();
  const wrong: [string, unknown][] = [
    ['target.redshift', { target: { ...anInput().target, redshift: -0.1 } }],
    ['target.redshift', { target: { ...anInput().target, redshift: NaN } }],
    [
      'target.light.magnitude',
      { target: { ...anInput().target, light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: Infinity }) } },
    ],
    ['target.light.kind', { target: { ...anInput().target, light: { ...anInput().target.light, kind: 'candles' } } }],
    [
      'target.light.magnification',
      {
        target: {
          ...anInput().target,
          light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 25, magnification: 0 }),
        },
      },
    ],
    [
      'target.extent.halfLightRadiusArcsec',
      {
        target: {
          ...anInput().target,
          extent: { kind: 'sersic', index: 1, halfLightRadiusKpc: 1, halfLightRadiusArcsec: 1 },
        },
      },
    ],
    [
      'target.extent.index',
      { target: { ...anInput().target, extent: { kind: 'sersic', index: 9, halfLightRadiusKpc: 1 } } },
    ],
    [
      'target.redshift',
      {
        target: {
          redshift: 0,
          light: lightOf({ kind: 'absoluteMagnitude', absoluteMagnitudeAb: -20, restWavelengthNm: 150 }),
          extent: { kind: 'point' },
        },
      },
    ],
    // Distances of next to nothing make a source brighter, and larger, than can be computed with.
    [
      'target.redshift',
      {
        target: {
          redshift: 1e-300,
          light: lightOf({ kind: 'absoluteMagnitude', absoluteMagnitudeAb: -20, restWavelengthNm: 150 }),
          extent: { kind: 'point' },
        },
      },
    ],
    [
      'target.redshift',
      {
        target: {
          ...anInput().target,
          redshift: 9e-7,
          extent: { kind: 'sersic', index: 1, halfLightRadiusKpc: 1e-4 },
        },
      },
    ],
    [
      'target.extent.halfLightRadiusKpc',
      {
        target: {
          ...anInput().target,
          redshift: 1e-6,
          extent: { kind: 'sersic', index: 1, halfLightRadiusKpc: 100 },
        },
      },
    ],
    [
      'target.light.kind',
      {
        target: {
          redshift: 1,
          light: lightOf({ kind: 'absoluteMagnitude', absoluteMagnitudeAb: -20, restWavelengthNm: 150 }),
          extent: { kind: 'uniform' },
        },
      },
    ],
    ['goal.value', { goal: { kind: 'signalToNoise', value: 0, per: 'aperture' } }],
    ['goal.value', { goal: { kind: 'signalToNoise', value: 1e300, per: 'aperture' } }],
    ['goal.value', { goal: { kind: 'signalToNoise', value: -5, per: 'aperture' } }],
    ['goal.per', { goal: { kind: 'signalToNoise', value: 5, per: 'resolutionElement' } }],
    ['goal.per', { goal: { kind: 'signalToNoise', value: 5, per: 'arcsec2' } }],
    ['goal.kind', { goal: { kind: 'lineSignificance', sigma: 5 } }],
    ['goal.exposureSeconds', { goal: { kind: 'signalToNoise', value: 5, per: 'aperture', exposureSeconds: 901 } }],
    ['goal.exposureCount', { goal: { kind: 'exposureTime', exposureSeconds: 10, exposureCount: 1.5 } }],
    ['conditions.airmass', { conditions: { airmass: 0.9, moonClass: 'dark', transparency: 'clear' } }],
    ['telescope.diameterM', { telescope: { diameterM: 1, obstructionDiameterM: 1 } }],
    ['mode.throughput', { mode: { ...mode, throughput: 1.2 } }],
    ['mode.wavelengthHighNm', { mode: { ...mode, wavelengthHighNm: 500 } }],
    ['mode.detector.readNoiseElectrons', { mode: { ...mode, detector: { ...mode.detector, readNoiseElectrons: -1 } } }],
    [
      'mode.exposureLimits.maximumExposureSeconds',
      { mode: { ...mode, exposureLimits: { minimumExposureSeconds: 5, maximumExposureSeconds: 1 } } },
    ],
    [
      'mode.skyAbMagPerArcsec2.bright',
      { mode: { ...mode, skyAbMagPerArcsec2: { dark: 21, grey: 20, bright: undefined } } },
    ],
    ['conditions.moonClass', { conditions: { airmass: 1, moonClass: 'blue', transparency: 'clear' } }],
    ['conditions.transparency', { conditions: { airmass: 1, moonClass: 'dark', transparency: 'fog' } }],
    ['goal.per', { goal: { kind: 'signalToNoise', value: 5, per: 'night' } }],
    ['mode.kind', { mode: { ...mode, kind: 'integralField' } }],
    ['mode.skySubtraction.kind', { mode: { ...mode, skySubtraction: { kind: 'none' } } }],
    ['limits.maximumExposureCount', { limits: { maximumExposureCount: 0 } }],
  ];

  it.each(wrong)('%s', (field, overrides) => {
    const input = anInput(overrides as Partial<EstimateInput>);
    let caught: unknown;
    try {
      estimate(input);
    } catch (error) {
      caught = error;
    }
    expect(caught).toBeInstanceOf(OutOfDomainError);
    expect((caught as OutOfDomainError).field).toBe(field);
    expect((caught as OutOfDomainError).allowed).not.toBe('');
  });
});

it('a patch per arcsec² does not depend on how large the patch is', () => {
  const patch = (areaArcsec2: number): FeasibleEstimate =>
    feasible(
      anInput({
        target: {
          redshift: 1,
          light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 25 }),
          extent: { kind: 'uniform', areaArcsec2 },
        },
        goal: { kind: 'signalToNoise', value: 5, per: 'arcsec2' },
      }),
    );
  expect(patch(7).openShutterSeconds / patch(1).openShutterSeconds).toBeCloseTo(1, 10);
  // A patch of 1 arcsec² holds the light of its magnitude.
  const electrons =
    AB_ZERO_PHOTONS_PER_M2_S * collectingAreaM2(5, 1.2) * Math.log(690 / 560) * 0.35 * 10 ** (-0.4 * (25 + 0.12));
  expect(patch(7).rates.sourceElectronsPerSecond / electrons).toBeCloseTo(1, 11);
});
