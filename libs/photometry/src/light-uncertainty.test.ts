import { createCosmology } from '@faintward/cosmology';
import { describe, expect, it } from 'vitest';
import { absoluteLight, apparentLight } from '../../../tests/factories/lights.js';
import { type LightSampling, quantileOf, sampleLight } from './light-uncertainty.js';
import { redshiftDistribution } from './redshift-distribution.js';
import { boxCurve } from './sampled-curve.js';
import { responseOf } from './synthetic.js';

const J = responseOf(boxCurve(1170, 1330));
const distances = createCosmology('planck18');

function sampling(overrides: Partial<LightSampling> = {}): LightSampling {
  return {
    lightAt: () => apparentLight({ kind: 'range' }),
    redshifts: redshiftDistribution(3, null),
    sigmaMag: 0,
    sigmaLnMagnification: 0,
    distances,
    isSurface: false,
    response: J,
    sampleCount: 2000,
    seed: 4,
    ...overrides,
  };
}

function meanAndDeviation(values: Float64Array): [number, number] {
  const mean = values.reduce((sum, value) => sum + value, 0) / values.length;
  return [mean, Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / values.length)];
}

describe('draws of a light', () => {
  it('are all the light itself where everything is certain', () => {
    expect(new Set(sampleLight(sampling()).magnitudesAb)).toEqual(new Set([24]));
  });

  it('scatter by the uncertainty of the brightness', () => {
    const [mean, deviation] = meanAndDeviation(sampleLight(sampling({ sigmaMag: 0.3 })).magnitudesAb);
    // Stratified draws: the mean of 2,000 is far nearer than 0.3/√2000.
    expect(mean).toBeCloseTo(24, 3);
    expect(deviation).toBeCloseTo(0.3, 2);
  });

  it('scatter by 1.086 times the uncertainty of ln μ, only where lensing is applied on top', () => {
    const lensed = apparentLight(
      { kind: 'range' },
      { magnification: 5, includes: { hostDust: true, galacticDust: true, lensing: false } },
    );
    const options = { lightAt: () => lensed, sigmaLnMagnification: 0.2 };
    const [mean, deviation] = meanAndDeviation(sampleLight(sampling(options)).magnitudesAb);
    expect(mean).toBeCloseTo(24 - 2.5 * Math.log10(5), 3);
    expect(deviation).toBeCloseTo((0.2 * 2.5) / Math.LN10, 2);
    expect(new Set(sampleLight(sampling({ sigmaLnMagnification: 0.2 })).magnitudesAb)).toEqual(new Set([24]));
    expect(new Set(sampleLight(sampling({ ...options, isSurface: true })).magnitudesAb)).toEqual(new Set([24]));
  });

  it('follow the redshift: fainter with distance, dark beyond the break', () => {
    const redshifts = redshiftDistribution(8.5, { kind: 'gaussian', sigma: 0.6 });
    const { redshifts: drawn, magnitudesAb } = sampleLight(
      sampling({ lightAt: () => absoluteLight(), redshifts, response: responseOf(boxCurve(1000, 1050)) }),
    );
    // Lyα leaves a box that ends at 1050 nm at redshift 7.637.
    const darkPart = magnitudesAb.filter(Number.isNaN).length / 2000;
    const beyond = drawn.filter((z) => z > 7.637).length / 2000;
    expect(Math.abs(darkPart - beyond)).toBeLessThan(0.01);
    expect(darkPart).toBeGreaterThan(0.9);
    drawn.forEach((z, k) => {
      if (z > 7.1) return;
      const expected = -21 + 5 * Math.log10(distances.luminosityDistanceMpc(z)) + 25 - 2.5 * Math.log10(1 + z);
      // Below 7.1 Lyα is outside the box: a flat f_ν without absorption.
      expect(magnitudesAb[k]).toBeCloseTo(expected, 9);
    });
  });

  it('take the light of each redshift, and are the same for the same seed', () => {
    const options = {
      lightAt: (z: number) =>
        apparentLight({ kind: 'range' }, { quoted: { kind: 'typical', magnitude: 20 + z, toAbMag: 0, inputs: [] } }),
      redshifts: redshiftDistribution(1, { kind: 'gaussian', sigma: 0.05 }),
    };
    const first = sampleLight(sampling(options));
    first.redshifts.forEach((z, k) => expect(first.magnitudesAb[k]).toBeCloseTo(20 + z, 12));
    expect(sampleLight(sampling(options))).toEqual(first);
    expect(sampleLight(sampling({ ...options, seed: 5 }))).not.toEqual(first);
  });
});

describe('quantiles', () => {
  it('are straight between the ordered values, without those that are no numbers', () => {
    const values = Float64Array.of(3, NaN, 1, 2, NaN, 10);
    expect([0, 0.5, 1].map((p) => quantileOf(values, p))).toEqual([1, 2.5, 10]);
    expect(quantileOf(values, 0.25)).toBeCloseTo(1.75, 12);
    expect(quantileOf(Float64Array.of(NaN), 0.5)).toBeUndefined();
    expect(quantileOf(Float64Array.of(7), 0.9)).toBe(7);
  });
});
