import { normalCdf } from '@faintward/numerics';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { redshiftDistribution, type RedshiftDistribution, type RedshiftUncertainty } from './redshift-distribution.js';

/** Midpoint sum of the density: shares nothing with the quantiles. */
function probabilityBelow({ density }: RedshiftDistribution, redshift: number, from = 0, steps = 20_000): number {
  const step = (redshift - from) / steps;
  let sum = 0;
  for (let i = 0; i < steps; i++) sum += density(from + (i + 0.5) * step) * step;
  return sum;
}

const trapezoid = ({ redshifts, densities }: { redshifts: number[]; densities: number[] }): number =>
  redshifts.reduce(
    (sum, x, i) => (i === 0 ? 0 : sum + ((densities[i]! + densities[i - 1]!) / 2) * (x - redshifts[i - 1]!)),
    0,
  );

/** A broad peak at 7 with a second, low one at 1.6, as galaxies with a break in the spectrum have. */
const twoPeaks = (() => {
  const redshifts = Array.from({ length: 901 }, (_, i) => i / 100);
  const peak = (z: number, at: number, sigma: number): number => Math.exp(-0.5 * ((z - at) / sigma) ** 2) / sigma;
  const densities = redshifts.map((z) => 0.8 * peak(z, 7, 0.2) + 0.2 * peak(z, 1.6, 0.15));
  return { kind: 'table', redshifts, densities } as const;
})();

const everyKind: [string, number, RedshiftUncertainty][] = [
  ['gaussian', 3, { kind: 'gaussian', sigma: 0.2 }],
  ['gaussian cut at 0', 0.3, { kind: 'gaussian', sigma: 0.4 }],
  ['gaussian cut at 30', 29.8, { kind: 'gaussian', sigma: 0.5 }],
  ['percentiles', 7, { kind: 'percentiles', p16: 6.7, p50: 7, p84: 7.9 }],
  ['percentiles near 0', 1, { kind: 'percentiles', p16: 0.4, p50: 1, p84: 1.3 }],
  ['percentiles nearer 0 than any bell', 1, { kind: 'percentiles', p16: 0.05, p50: 1, p84: 1.3 }],
  ['table', 7, twoPeaks],
];

describe.each(everyKind)('%s', (_, redshift, uncertainty) => {
  const distribution = redshiftDistribution(redshift, uncertainty);

  it('has density and quantiles that belong together', () => {
    for (const p of [0.02, 0.16, 0.5, 0.84, 0.98]) {
      // The midpoint sum crosses the jump of the percentiles within one step: 30/20000 of a density of a few.
      expect(Math.abs(probabilityBelow(distribution, distribution.quantile(p)) - p)).toBeLessThan(1e-3);
    }
    expect(Math.abs(probabilityBelow(distribution, 30, 0, 300_000) - 1)).toBeLessThan(1e-3);
  });

  it('stays above 0 and up to 30, and its quantiles ascend', () => {
    let before = 0;
    for (let p = 0; p <= 1; p += 1 / 512) {
      const here = distribution.sample(p);
      expect(here).toBeGreaterThan(0);
      expect(here).toBeLessThanOrEqual(30);
      expect(here).toBeGreaterThanOrEqual(before);
      before = here;
    }
  });

  it('is drawn with unit area, ascending, close to the density', () => {
    const curve = distribution.curve(400);
    expect(trapezoid(curve)).toBeCloseTo(1, 12);
    curve.redshifts.forEach((x, i) => i > 0 && expect(x).toBeGreaterThanOrEqual(curve.redshifts[i - 1]!));
    const top = Math.max(...curve.densities);
    const jumps = new Set(curve.redshifts.filter((x, i) => x === curve.redshifts[i - 1]));
    curve.redshifts.forEach((x, i) => {
      // A part of 2e-4 is not drawn, and straight lines between 400 points are 1e-3 off in area.
      if (!jumps.has(x)) expect(Math.abs(curve.densities[i]! - distribution.density(x))).toBeLessThan(2e-3 * top);
    });
  });

  it('has peaks that add up to no more than 1', () => {
    const total = distribution.peaks.reduce((sum, { probability }) => sum + probability, 0);
    expect(total).toBeGreaterThan(0.98);
    expect(total).toBeLessThanOrEqual(1 + 1e-12);
  });
});

describe('a redshift without uncertainty', () => {
  it('is drawn as itself', () => {
    const distribution = redshiftDistribution(6.6, null);
    expect([0, 0.3, 1].map(distribution.sample)).toEqual([6.6, 6.6, 6.6]);
    expect(distribution.isExact).toBe(true);
    expect(distribution.peaks).toEqual([{ redshift: 6.6, probability: 1 }]);
    expect(distribution.curve(10)).toEqual({ redshifts: [], densities: [] });
  });
});

describe('gaussian', () => {
  it('has its 16th and 84th percentile one σ away, within the digits of 0.16', () => {
    const { quantile, cutProbability } = redshiftDistribution(5, { kind: 'gaussian', sigma: 0.1 });
    expect(quantile(normalCdf(1))).toBeCloseTo(5.1, 12);
    expect(quantile(0.5)).toBeCloseTo(5, 12);
    expect(cutProbability).toBeLessThan(1e-100);
  });

  it('says how much was cut', () => {
    expect(redshiftDistribution(0.4, { kind: 'gaussian', sigma: 0.4 }).cutProbability).toBeCloseTo(0.158655, 6);
  });
});

describe('percentiles', () => {
  it('are met exactly, wherever they lie', () => {
    const three = fc.tuple(
      fc.double({ min: 0.01, max: 0.99, noNaN: true }),
      fc.double({ min: 0.01, max: 0.99, noNaN: true }),
      fc.double({ min: 0.05, max: 25, noNaN: true }),
    );
    fc.assert(
      fc.property(three, ([low, high, p50]) => {
        const p16 = p50 * low;
        const p84 = p50 + (30 - p50) * high;
        const { quantile } = redshiftDistribution(p50, { kind: 'percentiles', p16, p50, p84 });
        const isNear = (p: number, expected: number): boolean => Math.abs(quantile(p) - expected) < 1e-11;
        return isNear(0.16, p16) && isNear(0.5, p50) && isNear(0.84, p84);
      }),
    );
  });

  it.each([
    // A limit 8 to 9 σ away cuts off less than rounding, and 68 % can come out 1e-16 short of themselves.
    [0.004069266922197527, 0.406926692219752, 3.8497553368261026],
    [10.865626552992028, 12.297398820584718, 13.372076996311682],
    [0.06144303564348708, 0.1667150090735524, 3.5527266746471327],
  ])('are met where a limit is just too far to matter: %d, %d, %d', (p16, p50, p84) => {
    const { quantile } = redshiftDistribution(p50, { kind: 'percentiles', p16, p50, p84 });
    expect(quantile(0.16)).toBeCloseTo(p16, 11);
    expect(quantile(0.84)).toBeCloseTo(p84, 11);
  });

  it('far from the limits are a smooth bell, even where the sides are', () => {
    const even = redshiftDistribution(7, { kind: 'percentiles', p16: 6.8, p50: 7, p84: 7.2 });
    // σ = distance / Φ⁻¹(0.84): density at the median 1 / (σ √(2π)).
    expect(even.density(7)).toBeCloseTo(0.994457883 / (0.2 * Math.sqrt(2 * Math.PI)), 6);
    const skewed = redshiftDistribution(7, { kind: 'percentiles', p16: 6.8, p50: 7, p84: 7.5 });
    expect(skewed.density(7 + 1e-9) / skewed.density(7 - 1e-9)).toBeCloseTo(1, 6);
    const [peak] = skewed.peaks;
    expect(peak!.redshift).toBeLessThan(7);
    for (const offset of [-0.02, 0.02]) {
      expect(skewed.density(peak!.redshift + offset)).toBeLessThan(skewed.density(peak!.redshift));
    }
  });

  it('near a limit are two half-normals of their own widths', () => {
    const { density } = redshiftDistribution(1, { kind: 'percentiles', p16: 0.8, p50: 1, p84: 1.01 });
    // Half of the probability each; the left one ends at 0, five of its σ away.
    expect(density(1 - 1e-12)).toBeCloseTo(0.994457883 / (0.2 * Math.sqrt(2 * Math.PI)), 4);
    expect(density(1)).toBeCloseTo(0.994457883 / (0.01 * Math.sqrt(2 * Math.PI)), 4);
  });

  it('are refused where they do not ascend between 0 and 30', () => {
    const given = (p16: number, p50: number, p84: number) => () =>
      redshiftDistribution(1, { kind: 'percentiles', p16, p50, p84 });
    expect(given(0, 1, 2)).toThrow(/p16/);
    expect(given(2, 1, 3)).toThrow(/p16/);
    expect(given(1, 2, 2)).toThrow(/p84/);
    expect(given(1, 2, 30)).toThrow(/p84/);
  });
});

describe('table', () => {
  it('has its quantiles by hand: a triangle', () => {
    const { quantile, density } = redshiftDistribution(1, {
      kind: 'table',
      redshifts: [1, 2, 3],
      densities: [0, 5, 0],
    });
    expect(quantile(0.125)).toBeCloseTo(1.5, 12);
    expect(quantile(0.5)).toBeCloseTo(2, 12);
    expect(quantile(0.875)).toBeCloseTo(2.5, 12);
    expect(density(2)).toBeCloseTo(1, 12);
    expect(density(0.9)).toBe(0);
  });

  it('passes over a gap without probability', () => {
    const { quantile } = redshiftDistribution(1, {
      kind: 'table',
      redshifts: [1, 2, 2.001, 5, 5.001, 6],
      densities: [1, 1, 0, 0, 1, 1],
    });
    for (let p = 0.01; p < 1; p += 0.01) {
      const z = quantile(p);
      expect(z < 2.002 || z > 4.999).toBe(true);
    }
  });

  it('finds two peaks with the probability of their basins', () => {
    const { peaks } = redshiftDistribution(7, twoPeaks);
    expect(peaks.map(({ redshift }) => redshift)).toEqual([7, 1.6]);
    // 0.8 and 0.2 by construction; the basins meet far out on both sides.
    expect(peaks[0]!.probability).toBeCloseTo(0.8, 6);
    expect(peaks[1]!.probability).toBeCloseTo(0.2, 6);
  });

  it('does not take noise or a trace for a peak', () => {
    const { redshifts, densities } = twoPeaks;
    const rough = densities.map((density, i) => density * (1 + (i % 2 === 0 ? 0.04 : -0.04)));
    const noisy = redshiftDistribution(7, { kind: 'table', redshifts, densities: rough });
    expect(noisy.peaks.map(({ redshift }) => Math.round(redshift * 10) / 10)).toEqual([7, 1.6]);
    const trace = densities.map((density, i) => density + (i === 400 ? 0.5 : 0));
    expect(redshiftDistribution(7, { kind: 'table', redshifts, densities: trace }).peaks).toHaveLength(2);
  });

  it('divides a flat minimum in its middle', () => {
    const { peaks } = redshiftDistribution(1, {
      kind: 'table',
      redshifts: [0, 1, 2, 3, 4, 5],
      densities: [0, 3, 1, 1, 3, 0],
    });
    expect(peaks.map(({ probability }) => probability)).toEqual([0.5, 0.5]);
  });

  it.each([
    ['one point', [1], [1], /redshifts\.length/],
    ['lists of two lengths', [1, 2], [1], /densities\.length/],
    ['redshifts that fall back', [1, 3, 2], [1, 1, 1], /redshifts\.2/],
    ['a redshift beyond 30', [1, 31], [1, 1], /redshifts\.1/],
    ['a negative density', [1, 2], [1, -1], /densities\.1/],
    ['no probability anywhere', [1, 2], [0, 0], /densities/],
  ])('is refused with %s', (_, redshifts, densities, message) => {
    expect(() => redshiftDistribution(1, { kind: 'table', redshifts, densities })).toThrow(message);
  });
});
