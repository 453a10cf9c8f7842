/**
 * Two worked examples, each computed independently of this library (Python, numpy and astropy 8.0.1) from the published
 * formulas: a bare CCD equation and a galaxy at z = 7 followed from its absolute magnitude to hours.
 *
 * Tolerances: magnitudes 1e-4, rates 1e-4 relative, numbers of exposures exact. Printed digits set the rest.
 */
import { createCosmology, type CosmologyPresetId } from '@faintward/cosmology';
import { abMagnitudeFromFluxDensityJy } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { noiseBudgetOf, realExposureCount } from './exposure-series.js';
import { estimate, exposureCountFor, limitingMagnitude, openShutterSecondsFor } from './index.js';
import { deliveredSeeing } from './seeing.js';
import { aSite, anImagingMode, anInput, lightOf } from './testing.js';
import type { EstimateInput, FeasibleEstimate, ImagingMode } from './types.js';

/** The examples put AB = 0 at 3631 Jy, which is rounded: their magnitudes are this much off those of the 48.60 definition. */
const ROUNDED_ZERO_MAG = abMagnitudeFromFluxDensityJy(3631);
const fromRounded = (magnitude: number): number => magnitude + ROUNDED_ZERO_MAG;

function feasible(input: EstimateInput): FeasibleEstimate {
  const answer = estimate(input);
  if (answer.outcome !== 'feasible') throw new Error(answer.reason.message);
  return answer;
}
function expectRelative(actual: number, expected: number, tolerance = 1e-4): void {
  expect(Math.abs(actual / expected - 1)).toBeLessThanOrEqual(tolerance);
}
/** A box band of the given Δλ/λ around a wavelength, in the sense ∫dλ/λ. */
function box(wavelengthNm: number, logWidth: number): Pick<ImagingMode, 'wavelengthLowNm' | 'wavelengthHighNm'> {
  return {
    wavelengthLowNm: wavelengthNm * Math.exp(-logWidth / 2),
    wavelengthHighNm: wavelengthNm * Math.exp(logWidth / 2),
  };
}

describe('a point source of AB = 25 with an 8 m telescope', () => {
  const mode = anImagingMode({
    ...box(800, 0.15),
    throughput: 0.3,
    extinctionMagPerAirmass: 0.08,
    skyAbMagPerArcsec2: { dark: fromRounded(20.9), grey: fromRounded(20.9), bright: fromRounded(20.9) },
    detector: {
      pixelScaleArcsec: 0.2,
      darkElectronsPerSecond: 0.01,
      readNoiseElectrons: 5,
      fullWellElectrons: 1e6,
    },
    exposureLimits: { minimumExposureSeconds: 1, maximumExposureSeconds: 3600 },
  });
  const fwhmArcsec = 0.7;
  const input = (exposureSeconds: number, exposureCount: number): EstimateInput =>
    anInput({
      target: {
        redshift: 0,
        light: lightOf({ kind: 'apparentMagnitude', magnitudeAb: fromRounded(25) }),
        extent: { kind: 'point' },
      },
      telescope: { diameterM: 8, obstructionDiameterM: 1.1 },
      site: { zenithSeeingArcsec: fwhmArcsec / deliveredSeeing(1, 800, 1.2).deliveredFwhmArcsec },
      mode,
      conditions: { airmass: 1.2, moonClass: 'dark', transparency: 'clear' },
      goal: { kind: 'exposureTime', exposureSeconds, exposureCount },
      apertureRadiusArcsec: 0.6732 * fwhmArcsec,
    });

  it('makes the expected electrons', () => {
    const { rates, aperture, fwhmArcsec: delivered } = feasible(input(300, 1));
    expectRelative(delivered, fwhmArcsec, 1e-12);
    expectRelative(rates.sourceElectronsPerSecond, 7.9632);
    expectRelative(rates.sourceElectronsPerSecond / aperture.enclosedFraction, 11.1317);
    expectRelative(aperture.pixelCount, 17.4411);
    expectRelative(rates.skyElectronsPerSecondPerPixel, 21.2336);
  });

  it.each([
    [300, 1, 7.0762],
    [300, 12, 24.5126],
    [3600, 1, 24.5557],
  ])('reaches with %d s × %d a S/N of %d', (seconds, count, expected) => {
    expectRelative(feasible(input(seconds, count)).signalToNoise, expected);
  });

  it('has the expected limit and times', () => {
    const { rates, aperture } = feasible(input(300, 1));
    const budget = noiseBudgetOf(rates, aperture, mode)(1);
    expect(Math.abs(limitingMagnitude(fromRounded(25), budget, 5, 3600, 12) - 26.735)).toBeLessThan(5e-4);
    expectRelative(openShutterSecondsFor(budget, 10, 1), 597.994);
    expectRelative(exposureCountFor(budget, 10, 300), 1.9971);
    const goal = { kind: 'signalToNoise', value: 10, per: 'aperture' } as const;
    const free = feasible({ ...input(300, 1), goal });
    expect(free.exposureCount).toBe(1);
    expectRelative(free.exposureSeconds, 597.994);
    expect(feasible({ ...input(300, 1), goal: { ...goal, exposureSeconds: 300 } }).exposureCount).toBe(2);
  });
});

describe('a galaxy at z = 7 in the near infrared', () => {
  const mode = anImagingMode({
    ...box(1250, 0.13),
    throughput: 0.3,
    extinctionMagPerAirmass: 0.06,
    skyAbMagPerArcsec2: { dark: fromRounded(16.86), grey: fromRounded(15.86), bright: fromRounded(15.86) },
    detector: {
      pixelScaleArcsec: 0.15,
      darkElectronsPerSecond: 0.02,
      readNoiseElectrons: 10,
      fullWellElectrons: 1e5,
    },
    exposureLimits: { minimumExposureSeconds: 1, maximumExposureSeconds: 120 },
    skySubtraction: { kind: 'ditheredFrames' },
  });
  /** Shibuya, Ouchi & Harikane 2015, ApJS 219, 15: 6.9 (1+z)^−1.2 kpc (L/L0)^0.27 with L0 at M = −21. */
  const radiusKpc = (absoluteMagnitude: number): number =>
    6.9 * 8 ** -1.2 * 10 ** (-0.4 * 0.27 * (absoluteMagnitude + 21));

  interface Variant {
    preset?: CosmologyPresetId;
    absoluteMagnitudeAb?: number;
    moonClass?: 'dark' | 'bright';
    seeingArcsec?: number;
    magnification?: number;
  }
  const input = (variant: Variant = {}): EstimateInput => {
    const absoluteMagnitudeAb = variant.absoluteMagnitudeAb ?? -21;
    const cosmology = createCosmology(variant.preset ?? 'planck18');
    const lensed = variant.magnification === undefined ? {} : { magnification: variant.magnification };
    return {
      target: {
        redshift: 7,
        light: lightOf({
          kind: 'absoluteMagnitude',
          absoluteMagnitudeAb: fromRounded(absoluteMagnitudeAb),
          restWavelengthNm: 150,
          slopeBeta: -2,
          ...lensed,
        }),
        // The example keeps the observed size when the source is lensed, so it is given as an angle.
        extent: {
          kind: 'sersic',
          index: 1,
          halfLightRadiusArcsec: radiusKpc(absoluteMagnitudeAb) / (cosmology.kpcPerArcsec(7) ?? NaN),
        },
      },
      cosmology,
      site: aSite({ zenithSeeingArcsec: 0.8, outerScaleM: 25 }),
      telescope: { diameterM: 8, obstructionDiameterM: 1.1 },
      mode,
      goal: { kind: 'signalToNoise', value: 7, per: 'aperture', exposureSeconds: 60 },
      conditions: {
        seeingArcsec: variant.seeingArcsec ?? 0.8,
        airmass: 1.2,
        moonClass: variant.moonClass ?? 'dark',
        transparency: 'clear',
      },
    };
  };
  const base = feasible(input());

  it('arrives at AB = 25.983', () => {
    const modulus = base.steps.find((step) => step.id === 'distance-modulus');
    expect(Math.abs((modulus?.deltaMag ?? NaN) - 49.2407)).toBeLessThan(1e-4);
    expect(Math.abs(base.apparentMagnitudeAb - 25.983)).toBeLessThan(1e-4);
  });

  it('has the expected size and seeing', () => {
    // The table prints four decimals of an arcsecond, so half of the last one is the tolerance.
    const seeing = deliveredSeeing(0.8, 1250, 1.2, 25);
    expect(Math.abs(radiusKpc(-21) - 0.569)).toBeLessThan(5e-5);
    expect(Math.abs(radiusKpc(-21) / (createCosmology('planck18').kpcPerArcsec(7) ?? NaN) - 0.1066)).toBeLessThan(5e-5);
    expect(Math.abs(seeing.kolmogorovFwhmArcsec - 0.743)).toBeLessThan(5e-5);
    expect(Math.abs(seeing.friedParameterM - 0.3387)).toBeLessThan(5e-5);
    expect(Math.abs(seeing.deliveredFwhmArcsec - 0.5399)).toBeLessThan(5e-5);
    expect(base.fwhmArcsec).toBe(seeing.deliveredFwhmArcsec);
    expectRelative(base.aperture.pixelCount, 21.319);
  });

  it('makes the expected electrons', () => {
    expectRelative(base.rates.sourceElectronsPerSecond / base.aperture.enclosedFraction, 3.98859);
    expectRelative(base.rates.sourceElectronsPerSecond, 2.85328);
    expectRelative(base.rates.skyElectronsPerSecondPerPixel, 427.56);
    expectRelative(base.rates.skyElectronsPerSecondPerPixel * 60, 25_654);
  });

  it('needs 919.26, so 920 exposures of a minute', () => {
    const real = realExposureCount(noiseBudgetOf(base.rates, base.aperture, mode), 7, 60);
    expectRelative(real, 919.26);
    expect(base.exposureCount).toBe(920);
    expect(Math.abs(base.openShutterSeconds / 3600 - 15.33)).toBeLessThan(5e-3);
  });

  it.each<[string, Variant, number]>([
    ['the 70/0.3 cosmology', { preset: 'conv70' }, 850],
    ['M = −20', { absoluteMagnitudeAb: -20 }, 5488],
    ['a sky brighter by 1 mag', { moonClass: 'bright' }, 2302],
    ['a seeing of 1.0″', { seeingArcsec: 1 }, 1451],
    ['a lens of μ = 3', { magnification: 3 }, 104],
  ])('with %s', (_, variant, expected) => {
    expect(feasible(input(variant)).exposureCount).toBe(expected);
  });
});
