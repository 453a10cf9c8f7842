/** Parts of an estimate against relations that hold whatever the code does: conservation, closed forms written out, sums. */
import type { SourceLight } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { estimate } from './index.js';
import { deliveredSeeing } from './seeing.js';
import { aSpectroscopyMode, anImagingMode, anInput, lightOf, type PlainLine } from './testing.js';
import type { EstimateInput, FeasibleEstimate, Target } from './types.js';

function feasible(input: EstimateInput): FeasibleEstimate {
  const answer = estimate(input);
  if (answer.outcome !== 'feasible') throw new Error(answer.reason.message);
  return answer;
}

const point = { kind: 'point' } as const;

/** Share of a Gaussian of the given FWHM within ±width/2, summed by the midpoint rule. */
function gaussianShare(width: number, fwhm: number): number {
  const sigma = fwhm / Math.sqrt(8 * Math.LN2);
  const steps = 2000;
  let sum = 0;
  for (let i = 0; i < steps; i++) {
    const x = width * ((i + 0.5) / steps - 0.5);
    sum += Math.exp((-x * x) / (2 * sigma * sigma)) / (sigma * Math.sqrt(2 * Math.PI));
  }
  return (sum * width) / steps;
}

/** Electrons per second that the source alone puts into the brightest pixel. */
function peakOfSource({ rates, aperture }: FeasibleEstimate): number {
  const background = rates.skyElectronsPerSecondPerPixel + rates.darkElectronsPerSecond / aperture.pixelCount;
  return rates.peakElectronsPerSecondPerPixel - background;
}

/** Variance that the S/N implies, e⁻². */
function varianceOf({ rates, openShutterSeconds, signalToNoise }: FeasibleEstimate): number {
  return ((rates.sourceElectronsPerSecond * openShutterSeconds) / signalToNoise) ** 2;
}

describe('seeing', () => {
  it('with an outer scale of 25 m is 0.833 of a 1 arcsec Kolmogorov seeing', () => {
    // Tokovinin 2002, eq. 19: r0 = 0.100657 m at 500 nm, √(1 − 2.183 (r0/25 m)^0.356).
    expect(deliveredSeeing(1, 500, 1).friedParameterM).toBeCloseTo(0.100657, 6);
    expect(deliveredSeeing(1, 500, 1, 25).deliveredFwhmArcsec).toBeCloseTo(0.8327794, 6);
  });
});

describe('the brightest pixel', () => {
  const goal = { kind: 'exposureTime', exposureSeconds: 60, exposureCount: 5 } as const;

  it('of a patch behind a slit is as bright as any other', () => {
    const target: Target = {
      redshift: 0,
      light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 21 }),
      extent: { kind: 'uniform' },
    };
    const answer = feasible(anInput({ target, mode: aSpectroscopyMode(), goal }));
    expect(peakOfSource(answer) / (answer.rates.sourceElectronsPerSecond / answer.aperture.pixelCount)).toBeCloseTo(
      1,
      9,
    );
  });

  const line = (overrides: Partial<PlainLine> = {}): Target => ({
    redshift: 0,
    light: lightOf({
      kind: 'lineFlux',
      lineFluxErgSCm2: 1e-14,
      restWavelengthNm: 700,
      intrinsicWidthKmS: 0,
      ...overrides,
    }),
    extent: point,
  });

  it.each([0, 250])('of a line of %d km/s holds the middles of two Gaussians', (intrinsicWidthKmS) => {
    const mode = aSpectroscopyMode({ resolvingPower: 2000, pixelsPerResolutionElement: 2.5 });
    const answer = feasible(anInput({ target: line({ intrinsicWidthKmS }), mode, goal }));
    const widthKmS = Math.hypot(299_792.458 / 2000, intrinsicWidthKmS);
    const lineFwhmPixels = (2.5 * widthKmS) / (299_792.458 / 2000);
    const expected =
      (gaussianShare(1, lineFwhmPixels) * gaussianShare(mode.detector.pixelScaleArcsec, answer.fwhmArcsec)) /
      gaussianShare(mode.extractionLengthFwhm, 1);
    expect(peakOfSource(answer) / answer.rates.sourceElectronsPerSecond / expected).toBeCloseTo(1, 5);
  });

  it('holds the continuum under the line as if that were alone', () => {
    const mode = aSpectroscopyMode();
    const shared = { mode, goal, wavelengthNm: 700 };
    const width = { intrinsicWidthKmS: 250 };
    const both = feasible(anInput({ ...shared, target: line({ ...width, continuumMagnitudeAb: 15 }) }));
    const lineOnly = feasible(anInput({ ...shared, target: line(width) }));
    const continuum: Target = { ...line(), light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 15 }) };
    const continuumOnly = feasible(anInput({ ...shared, target: continuum }));
    expect(peakOfSource(both) / (peakOfSource(lineOnly) + peakOfSource(continuumOnly))).toBeCloseTo(1, 9);
  });
});

describe('lensing', () => {
  it('brightens a line, and the continuum that its equivalent width puts under it', () => {
    const line = {
      kind: 'lineFlux',
      lineFluxErgSCm2: 1e-17,
      restWavelengthNm: 700,
      intrinsicWidthKmS: 250,
    } as const;
    const continuum = { kind: 'equivalentWidth', restEquivalentWidthNm: 3 } as const;
    const goal = { kind: 'exposureTime', exposureSeconds: 900, exposureCount: 4 } as const;
    const at = (magnification: number): FeasibleEstimate =>
      feasible(
        anInput({
          target: {
            redshift: 0,
            light: { ...lightOf({ ...line, magnification }), continuum } as SourceLight,
            extent: point,
          },
          mode: aSpectroscopyMode(),
          goal,
        }),
      );
    const [plain, lensed] = [at(1).rates, at(4).rates];
    expect(lensed.sourceElectronsPerSecond / plain.sourceElectronsPerSecond).toBeCloseTo(4, 10);
    expect(lensed.continuumElectronsPerSecond / plain.continuumElectronsPerSecond).toBeCloseTo(4, 10);
  });

  it('conserves the surface brightness of a source whose size is its own', () => {
    const at = (magnification: number): number | null =>
      feasible(
        anInput({
          target: {
            redshift: 2,
            light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: 25, magnification }),
            extent: { kind: 'sersic', index: 1, halfLightRadiusKpc: 2 },
          },
        }),
      ).surfaceBrightnessAbMagPerArcsec2;
    expect(at(9)).toBeCloseTo(at(1) ?? NaN, 10);
  });
});

describe('the sky known badly', () => {
  const input = (overrides: Partial<EstimateInput>): EstimateInput =>
    anInput({ goal: { kind: 'exposureTime', exposureSeconds: 300, exposureCount: 6 }, ...overrides });

  it('from the other frames of a series of 6 has 6/5 of the variance', () => {
    const wide = feasible(input({}));
    const dithered = feasible(input({ mode: anImagingMode({ skySubtraction: { kind: 'ditheredFrames' } }) }));
    const counted = wide.rates.sourceElectronsPerSecond * wide.openShutterSeconds;
    expect((varianceOf(dithered) - counted) / (varianceOf(wide) - counted)).toBeCloseTo(6 / 5, 9);
  });

  it('does not multiply the noise of a continuum under a line', () => {
    const target: Target = {
      redshift: 0,
      light: lightOf({
        kind: 'lineFlux',
        lineFluxErgSCm2: 1e-17,
        restWavelengthNm: 700,
        intrinsicWidthKmS: 250,
        continuumMagnitudeAb: 20,
      }),
      extent: point,
    };
    const wide = feasible(input({ target, mode: aSpectroscopyMode() }));
    const annulus = { kind: 'annulus', backgroundPixelRatio: 1 } as const;
    const narrow = feasible(input({ target, mode: aSpectroscopyMode({ skySubtraction: annulus }) }));
    const { sourceElectronsPerSecond, continuumElectronsPerSecond } = wide.rates;
    const counted = (sourceElectronsPerSecond + continuumElectronsPerSecond) * wide.openShutterSeconds;
    expect((varianceOf(narrow) - counted) / (varianceOf(wide) - counted)).toBeCloseTo(2, 8);
  });
});

it('acquires no more often than blocks are begun', () => {
  // 940 s a cycle, five cycles in a block of 5400 s.
  const blocks = (exposureCount: number): number | undefined =>
    feasible(anInput({ goal: { kind: 'exposureTime', exposureSeconds: 900, exposureCount } })).overheads[0]?.count;
  expect([1, 5, 6, 10, 11].map(blocks)).toEqual([1, 1, 2, 2, 3]);
});

it('a magnitude averaged over a spectrograph’s range, with a slope, averages to itself', () => {
  const mode = aSpectroscopyMode({ wavelengthLowNm: 550, wavelengthHighNm: 1000, resolvingPower: 5000 });
  const slopeBeta = -0.4;
  const light = lightOf({ kind: 'apparentMagnitude', magnitudeAb: 22, slopeBeta, averagedOverNm: [550, 1000] });
  const magnitudeAt = (wavelengthNm: number): number =>
    feasible(anInput({ target: { redshift: 0, light, extent: point }, mode, wavelengthNm })).apparentMagnitudeAb;
  const steps = 400;
  let flux = 0;
  for (let i = 0; i < steps; i++) {
    const wavelengthNm = 550 * (1000 / 550) ** ((i + 0.5) / steps);
    flux += 10 ** (-0.4 * (magnitudeAt(wavelengthNm) - 22)) / steps;
  }
  expect(flux).toBeCloseTo(1, 5);
  expect(magnitudeAt(900) - magnitudeAt(600)).toBeCloseTo(-2.5 * (slopeBeta + 2) * Math.log10(900 / 600), 6);
});
