/**
 * What must hold for every observation: rules of thumb that observers check results against, made exact by taking a
 * noise regime to its limit. `sky`, `source` and `read` below are those limits; the tolerance of each test is the part
 * that the other kinds of noise still have there.
 */
import { createCosmology } from '@faintward/cosmology';
import {
  abMagnitudeFromFluxDensityJy,
  fluxDensityJyFromAbMagnitude,
  lineFluxFromLuminosity,
  surfaceBrightnessDimmingMag,
} from '@faintward/photometry';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { estimate, limitingMagnitude, readNoiseBoundSeconds, signalToNoise } from './index.js';
import { aSpectroscopyMode, anImagingMode, anInput, lightOf, type PlainLight } from './testing.js';
import type { Conditions, EstimateInput, FeasibleEstimate, ImagingMode, Target } from './types.js';

const cosmology = createCosmology('planck18');

function feasible(input: EstimateInput): FeasibleEstimate {
  const answer = estimate(input);
  if (answer.outcome !== 'feasible') throw new Error(answer.reason.message);
  return answer;
}
function seconds(input: EstimateInput): number {
  return feasible(input).openShutterSeconds;
}
function point(magnitudeAb: number): Target {
  return { redshift: 0, light: lightOf({ kind: 'apparentMagnitude', magnitudeAb }), extent: { kind: 'point' } };
}
function goal(value: number): EstimateInput['goal'] {
  return { kind: 'signalToNoise', value, per: 'aperture' };
}
function uniformSky(magnitude: number): ImagingMode['skyAbMagPerArcsec2'] {
  return { dark: magnitude, grey: magnitude, bright: magnitude };
}
const QUIET = { pixelScaleArcsec: 0.2, darkElectronsPerSecond: 0, readNoiseElectrons: 0, fullWellElectrons: 1e9 };
const OPEN = { minimumExposureSeconds: 1e-4, maximumExposureSeconds: 1e7 };
const BOUNDLESS = { maximumExposureCount: 1e9, maximumTotalSeconds: 1e10 };

/** Source 1e-5 of the sky in the aperture, no other noise. */
function sky(overrides: Partial<ImagingMode> = {}): EstimateInput {
  return anInput({
    target: point(24),
    mode: anImagingMode({ skyAbMagPerArcsec2: uniformSky(12), detector: QUIET, exposureLimits: OPEN, ...overrides }),
    limits: BOUNDLESS,
  });
}
/** Sky 1e-8 of the source. */
function source(overrides: Partial<ImagingMode> = {}): EstimateInput {
  return anInput({
    target: point(19),
    mode: anImagingMode({ skyAbMagPerArcsec2: uniformSky(40), detector: QUIET, exposureLimits: OPEN, ...overrides }),
    limits: BOUNDLESS,
  });
}
/** One read of 1e5 e⁻ noise, little else. */
function read(): EstimateInput {
  return anInput({
    target: point(22),
    mode: anImagingMode({
      skyAbMagPerArcsec2: uniformSky(40),
      detector: { ...QUIET, readNoiseElectrons: 1e5 },
      exposureLimits: OPEN,
    }),
    limits: BOUNDLESS,
  });
}
const SKY_TOLERANCE = 3e-4;
const SOURCE_TOLERANCE = 1e-6;

function expectRatio(actual: number, expected: number, tolerance: number): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(tolerance);
}
const LIMITS: [string, EstimateInput, number][] = [
  ['the sky', sky(), SKY_TOLERANCE],
  ['the source', source(), SOURCE_TOLERANCE],
];

describe('limited by either sky or source', () => {
  it.each(LIMITS)('S/N grows as the root of time, and time as the square of S/N: %s', (_, input, tolerance) => {
    const at = (exposureSeconds: number): number =>
      feasible({ ...input, goal: { kind: 'exposureTime', exposureSeconds, exposureCount: 1 } }).signalToNoise;
    expectRatio(at(40) / at(10), 2, 1e-9);
    expectRatio(seconds({ ...input, goal: goal(20) }) / seconds({ ...input, goal: goal(10) }), 4, tolerance);
  });

  it.each<[string, (overrides: Partial<ImagingMode>) => EstimateInput]>([
    ['the sky', sky],
    ['the source', source],
  ])('time goes as the inverse of the throughput: %s', (_, make) => {
    expectRatio(seconds(make({ throughput: 0.2 })) / seconds(make({ throughput: 0.4 })), 2, 1e-9);
  });
});

describe('limited by the sky', () => {
  it.each([0.5, 1, 2])('%d mag fainter takes 10^(0.8 Δm) as long', (fainter) => {
    const ratio = seconds({ ...sky(), target: point(24 + fainter) }) / seconds(sky());
    expectRatio(ratio, 10 ** (0.8 * fainter), SKY_TOLERANCE);
  });

  it('a sky brighter by 1 mag takes 10^0.4 as long', () => {
    expectRatio(seconds(sky({ skyAbMagPerArcsec2: uniformSky(11) })) / seconds(sky()), 10 ** 0.4, SKY_TOLERANCE);
  });

  it('time goes as the square of the seeing', () => {
    const at = (zenithSeeingArcsec: number): number => seconds({ ...sky(), site: { zenithSeeingArcsec } });
    expectRatio(at(1.2) / at(0.6), 4, SKY_TOLERANCE);
  });

  it('time goes as the inverse square of the diameter', () => {
    const at = (diameterM: number): number =>
      seconds({ ...sky(), telescope: { diameterM, obstructionDiameterM: diameterM / 4 } });
    expectRatio(at(4) / at(8), 4, SKY_TOLERANCE);
  });

  it('airmass 2 costs 10^(0.8 k) · 2^1.2 against the zenith', () => {
    const at = (airmass: number): number =>
      seconds({
        ...sky({ extinctionMagPerAirmass: 0.1 }),
        conditions: { airmass, moonClass: 'dark', transparency: 'clear' },
      });
    expectRatio(at(2) / at(1), 10 ** (0.8 * 0.1) * 2 ** 1.2, SKY_TOLERANCE);
  });

  it('a magnification of μ saves μ²', () => {
    const ratio =
      seconds(sky()) / seconds({ ...sky(), target: { ...point(24), light: { ...point(24).light, magnification: 3 } } });
    expectRatio(ratio, 9, SKY_TOLERANCE);
  });

  it('twice the time gains 0.376 mag of depth', () => {
    const { rates, aperture } = feasible(sky());
    const budget = {
      sourceElectronsPerSecond: rates.sourceElectronsPerSecond,
      backgroundElectronsPerSecondPerPixel: rates.skyElectronsPerSecondPerPixel,
      readVarianceElectrons2: 0,
      effectivePixelCount: aperture.pixelCount,
    };
    const gain = limitingMagnitude(24, budget, 5, 7200, 1) - limitingMagnitude(24, budget, 5, 3600, 1);
    expect(gain).toBeCloseTo(1.25 * Math.log10(2), 4);
  });

  it('the S/N of a resolved line falls as the root of its width', () => {
    const at = (intrinsicWidthKmS: number): number =>
      feasible({
        ...anInput(),
        target: {
          redshift: 0,
          light: lightOf({ kind: 'lineFlux', lineFluxErgSCm2: 1e-19, restWavelengthNm: 700, intrinsicWidthKmS }),
          extent: { kind: 'point' },
        },
        mode: aSpectroscopyMode({ skyAbMagPerArcsec2: uniformSky(15), detector: QUIET, resolvingPower: 50_000 }),
        goal: { kind: 'exposureTime', exposureSeconds: 900, exposureCount: 1 },
      }).signalToNoise;
    expectRatio(at(400) / at(1600), 2, 1e-3);
  });
});

describe('limited by the source', () => {
  it('1 mag fainter takes 10^0.4 as long', () => {
    expectRatio(seconds({ ...source(), target: point(20) }) / seconds(source()), 10 ** 0.4, SOURCE_TOLERANCE);
  });

  it('the seeing does not matter', () => {
    const at = (zenithSeeingArcsec: number): number => seconds({ ...source(), site: { zenithSeeingArcsec } });
    expectRatio(at(1.6) / at(0.6), 1, SOURCE_TOLERANCE);
  });
});

describe('limited by a single read', () => {
  it('S/N grows as time', () => {
    const at = (exposureSeconds: number): number =>
      feasible({ ...read(), goal: { kind: 'exposureTime', exposureSeconds, exposureCount: 1 } }).signalToNoise;
    expectRatio(at(20) / at(10), 2, 1e-5);
  });

  it('short exposures lose 5 % against one long one where the sky is 9.76 N_R² per exposure', () => {
    const [readVarianceElectrons2, skyRate] = [16, 0.5];
    const bound = readNoiseBoundSeconds(readVarianceElectrons2, skyRate, 0.05);
    expect((bound * skyRate) / readVarianceElectrons2).toBeCloseTo(9.756, 3);
    const budget = {
      sourceElectronsPerSecond: 1e-6,
      backgroundElectronsPerSecondPerPixel: skyRate,
      readVarianceElectrons2,
      effectivePixelCount: 20,
    };
    const noReads = { ...budget, readVarianceElectrons2: 0 };
    const loss = signalToNoise(noReads, 50 * bound, 50) / signalToNoise(budget, 50 * bound, 50);
    expect(loss).toBeCloseTo(1.05, 6);
  });
});

describe('whatever the limit', () => {
  it('binning without read noise and dark current changes nothing', () => {
    const at = (pixelScaleArcsec: number): number => seconds(sky({ detector: { ...QUIET, pixelScaleArcsec } }));
    expectRatio(at(0.1) / at(0.2), 1, 1e-9);
  });

  it('S/N per resolution element is that per pixel times the root of the pixels', () => {
    const mode = aSpectroscopyMode();
    const at = (per: 'pixel' | 'resolutionElement'): number =>
      feasible(anInput({ mode, goal: { kind: 'exposureTime', exposureSeconds: 600, exposureCount: 3, per } }))
        .signalToNoise;
    expectRatio(at('resolutionElement') / at('pixel'), Math.sqrt(mode.pixelsPerResolutionElement), 1e-12);
  });

  it('the surface brightness of a flat spectrum dims by 7.5 log10(1 + z), without being told to', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.05, max: 3.5, noNaN: true }), (redshift) => {
        const answer = feasible(
          anInput({
            target: {
              redshift,
              light: lightOf({
                kind: 'absoluteMagnitude',
                absoluteMagnitudeAb: -22,
                restWavelengthNm: 300,
                slopeBeta: -2,
              }),
              extent: { kind: 'sersic', halfLightRadiusKpc: 3, index: 1 },
            },
            goal: { kind: 'exposureTime', exposureSeconds: 100, exposureCount: 3 },
          }),
        );
        // ⟨μ⟩_e at rest: M + 2.5 log10(2π r²) with r in arcsec seen from 10 pc.
        const radiusArcsec = (3 / 1e-2) * (648_000 / Math.PI);
        const rest = -22 + 2.5 * Math.log10(2 * Math.PI * radiusArcsec ** 2);
        const dimmed = rest + surfaceBrightnessDimmingMag(redshift, 'perUnitFrequency');
        return Math.abs((answer.surfaceBrightnessAbMagPerArcsec2 ?? NaN) - dimmed) < 1e-8;
      }),
    );
  });

  it('units do not matter', () => {
    const jansky = fluxDensityJyFromAbMagnitude(24.5);
    expectRatio(
      seconds(anInput({ target: point(abMagnitudeFromFluxDensityJy(jansky)) })) /
        seconds(anInput({ target: point(24.5) })),
      1,
      1e-9,
    );

    const line = (light: PlainLight): number =>
      seconds(
        anInput({
          target: { redshift: 0.4, light: lightOf(light), extent: { kind: 'point' } },
          mode: aSpectroscopyMode(),
          goal: { kind: 'lineSignificance', sigma: 5 },
        }),
      );
    const shape = { restWavelengthNm: 500.824, intrinsicWidthKmS: 200 };
    const lineFluxErgSCm2 = lineFluxFromLuminosity(1e41, cosmology.luminosityDistanceMpc(0.4));
    const luminosity = line({ kind: 'lineLuminosity', lineLuminosityErgS: 1e41, ...shape });
    expectRatio(luminosity / line({ kind: 'lineFlux', lineFluxErgSCm2, ...shape }), 1, 1e-9);

    const sized = (extent: Target['extent']): number =>
      seconds(anInput({ target: { ...point(23), redshift: 2, extent } }));
    const halfLightRadiusArcsec = 3 / (cosmology.kpcPerArcsec(2) ?? NaN);
    expectRatio(
      sized({ kind: 'sersic', index: 1, halfLightRadiusKpc: 3 }) /
        sized({ kind: 'sersic', index: 1, halfLightRadiusArcsec }),
      1,
      1e-9,
    );
  });
});

/** Observations without a choice of regime: any source, sky, size, telescope, mode and goal within reason. */
const anyInput: fc.Arbitrary<EstimateInput> = fc
  .record({
    redshift: fc.double({ min: 0.01, max: 12, noNaN: true }),
    magnitude: fc.double({ min: 12, max: 31, noNaN: true }),
    lightKind: fc.constantFrom('apparentMagnitude', 'absoluteMagnitude', 'lineFlux', 'lineLuminosity'),
    extentKind: fc.constantFrom('point', 'sersic', 'uniform'),
    radius: fc.double({ min: 0.01, max: 5, noNaN: true }),
    index: fc.double({ min: 0.3, max: 8, noNaN: true }),
    isSpectrum: fc.boolean(),
    skyMagnitude: fc.double({ min: 13, max: 23, noNaN: true }),
    readNoise: fc.double({ min: 0, max: 20, noNaN: true }),
    seeing: fc.double({ min: 0.3, max: 2.5, noNaN: true }),
    airmass: fc.double({ min: 1, max: 3, noNaN: true }),
    wanted: fc.double({ min: 1, max: 500, noNaN: true }),
    subtraction: fc.constantFrom<ImagingMode['skySubtraction'][]>(
      undefined,
      { kind: 'ditheredFrames' },
      { kind: 'annulus', backgroundPixelRatio: 3 },
    ),
    isThinCloud: fc.boolean(),
  })
  .map((raw) => {
    const shape = { restWavelengthNm: 700 / (1 + raw.redshift), intrinsicWidthKmS: 100 * raw.radius };
    const lights: Record<typeof raw.lightKind, PlainLight> = {
      apparentMagnitude: { kind: 'apparentMagnitude', magnitudeAb: raw.magnitude },
      absoluteMagnitude: { kind: 'absoluteMagnitude', absoluteMagnitudeAb: raw.magnitude - 45, restWavelengthNm: 150 },
      lineFlux: { kind: 'lineFlux', lineFluxErgSCm2: 10 ** (-0.4 * raw.magnitude - 6), ...shape },
      lineLuminosity: { kind: 'lineLuminosity', lineLuminosityErgS: 10 ** (50 - 0.4 * raw.magnitude), ...shape },
    };
    const isIntrinsic = raw.lightKind === 'absoluteMagnitude' || raw.lightKind === 'lineLuminosity';
    const extents: Record<typeof raw.extentKind, Target['extent']> = {
      point: { kind: 'point' },
      sersic: { kind: 'sersic', index: raw.index, halfLightRadiusArcsec: raw.radius },
      uniform: isIntrinsic ? { kind: 'point' } : { kind: 'uniform', areaArcsec2: raw.radius },
    };
    const common = {
      skyAbMagPerArcsec2: uniformSky(raw.skyMagnitude),
      detector: { ...anImagingMode().detector, readNoiseElectrons: raw.readNoise },
      ...(raw.subtraction === undefined ? {} : { skySubtraction: raw.subtraction }),
    };
    const conditions: Conditions = {
      seeingArcsec: raw.seeing,
      airmass: raw.airmass,
      moonClass: 'grey',
      transparency: raw.isThinCloud ? 'thinCloud' : 'clear',
    };
    return anInput({
      target: { redshift: raw.redshift, light: lightOf(lights[raw.lightKind]), extent: extents[raw.extentKind] },
      mode: raw.isSpectrum ? aSpectroscopyMode(common) : anImagingMode(common),
      conditions,
      goal: goal(raw.wanted),
    });
  });

function everyNumberIsFinite(value: unknown): boolean {
  if (typeof value === 'number') return Number.isFinite(value);
  if (typeof value === 'object' && value !== null) return Object.values(value).every(everyNumberIsFinite);
  return true;
}

describe('any observation', () => {
  it('is answered without NaN or Infinity, feasible or not, and both occur', () => {
    const outcomes = new Set<string>();
    fc.assert(
      fc.property(anyInput, (input) => {
        const answer = estimate(input);
        outcomes.add(answer.outcome);
        return everyNumberIsFinite(answer);
      }),
      { numRuns: 2000 },
    );
    expect(outcomes).toEqual(new Set(['feasible', 'infeasible']));
  });

  it('reaches its goal, and the S/N of its exposures is the one it says', () => {
    let feasibleCount = 0;
    fc.assert(
      fc.property(anyInput, (input) => {
        const answer = estimate(input);
        if (answer.outcome !== 'feasible' || input.goal.kind !== 'signalToNoise') return true;
        feasibleCount++;
        const { exposureSeconds, exposureCount, signalToNoise: reached } = answer;
        const again = feasible({ ...input, goal: { kind: 'exposureTime', exposureSeconds, exposureCount } });
        return reached >= input.goal.value * (1 - 1e-8) && Math.abs(again.signalToNoise / reached - 1) < 1e-9;
      }),
      { numRuns: 1000 },
    );
    expect(feasibleCount).toBeGreaterThan(100);
  });

  it('gives the same answer twice', () => {
    fc.assert(
      fc.property(anyInput, (input) => {
        expect(estimate(input)).toEqual(estimate(input));
      }),
      { numRuns: 100 },
    );
  });

  /** Seconds, with infinity for what is out of reach, so that order can be compared. */
  function cost(input: EstimateInput): number {
    const answer = estimate({ ...input, limits: BOUNDLESS });
    return answer.outcome === 'feasible' ? answer.openShutterSeconds : Infinity;
  }
  const worse: [string, (input: EstimateInput) => EstimateInput][] = [
    [
      'a brighter sky',
      (input) => {
        const { mode } = input;
        return { ...input, mode: { ...mode, skyAbMagPerArcsec2: uniformSky(mode.skyAbMagPerArcsec2.dark - 0.5) } };
      },
    ],
    [
      'a larger airmass',
      (input) => ({ ...input, conditions: { ...input.conditions, airmass: input.conditions.airmass + 0.3 } }),
    ],
    ['thin cloud', (input) => ({ ...input, conditions: { ...input.conditions, transparency: 'thinCloud' } })],
    [
      'a worse seeing',
      (input) => ({
        ...input,
        conditions: { ...input.conditions, seeingArcsec: (input.conditions.seeingArcsec ?? 0.8) + 0.2 },
      }),
    ],
    ['less throughput', (input) => ({ ...input, mode: { ...input.mode, throughput: input.mode.throughput * 0.8 } })],
    ['a smaller mirror', (input) => ({ ...input, telescope: { diameterM: 3, obstructionDiameterM: 0.8 } })],
    [
      'a higher goal',
      (input) => ({ ...input, goal: goal(input.goal.kind === 'signalToNoise' ? input.goal.value * 1.2 : 5) }),
    ],
  ];
  it.each(worse)('never takes less time with %s', (_, degrade) => {
    let compared = 0;
    fc.assert(
      fc.property(anyInput, (drawn) => {
        // Exposures of one length: otherwise a brighter image is split by saturation and may cost an extra read-out.
        // A point source: the apertures of extended ones are near the best, not the best.
        const input = {
          ...drawn,
          target: { ...drawn.target, extent: { kind: 'point' } as const },
          mode: {
            ...drawn.mode,
            detector: { ...drawn.mode.detector, fullWellElectrons: 1e9 },
            exposureLimits: { minimumExposureSeconds: 1e-6, maximumExposureSeconds: 600 },
          },
        };
        const before = cost(input);
        if (!Number.isFinite(before)) return true;
        compared++;
        return cost(degrade(input)) >= before * (1 - 1e-9);
      }),
      { numRuns: 300 },
    );
    expect(compared).toBeGreaterThan(50);
  });

  it('never takes less time further away or fainter', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.05, max: 3.2, noNaN: true }),
        fc.double({ min: 0.01, max: 0.5, noNaN: true }),
        (redshift, step) => {
          const at = (z: number, absoluteMagnitudeAb: number): number =>
            cost(
              anInput({
                target: {
                  redshift: z,
                  light: lightOf({ kind: 'absoluteMagnitude', absoluteMagnitudeAb, restWavelengthNm: 150 }),
                  extent: { kind: 'point' },
                },
              }),
            );
          return at(redshift + step, -22) >= at(redshift, -22) && at(redshift, -22 + step) >= at(redshift, -22);
        },
      ),
    );
  });
});
