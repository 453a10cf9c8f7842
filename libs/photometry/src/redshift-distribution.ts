import { normalCdf, normalDensity, normalQuantile } from '@faintward/numerics';
import { OutOfDomainError, requirePositive } from './domain.js';
import { halfOf } from './redshift-halves.js';
import { densityTable, tableDensity, tablePeaks, tableQuantile, type RedshiftPeak } from './redshift-table.js';

export type { RedshiftPeak } from './redshift-table.js';

/** How well a redshift is known. */
export type RedshiftUncertainty =
  | { readonly kind: 'gaussian'; readonly sigma: number }
  | { readonly kind: 'percentiles'; readonly p16: number; readonly p50: number; readonly p84: number }
  /** Density over redshift, straight between the points; any scale. */
  | { readonly kind: 'table'; readonly redshifts: readonly number[]; readonly densities: readonly number[] };

/** What is known of a redshift as a distribution between 0 and {@link HIGHEST_REDSHIFT}. */
export interface RedshiftDistribution {
  /** No uncertainty: every draw is the redshift itself. */
  readonly isExact: boolean;
  /** A draw from a uniform number between 0 and 1: the quantile. */
  sample(uniform: number): number;
  /** The redshift below which the probability p lies. */
  quantile(p: number): number;
  /** Per unit redshift; 0 outside the limits. Of an exact redshift 0, and Infinity on it. */
  density(redshift: number): number;
  /** For drawing: ascending redshifts (two equal ones where the density jumps) and densities of unit trapezoidal area. Empty if exact. */
  curve(count: number): { redshifts: number[]; densities: number[] };
  /** Most probable first. */
  readonly peaks: readonly RedshiftPeak[];
  /** Part of a Gaussian that lay outside the limits and was cut off before scaling to 1. */
  readonly cutProbability: number;
}

/** No source is sought beyond; distributions end here. */
export const HIGHEST_REDSHIFT = 30;
/** Draws are kept off 0, where there is no distance. */
const LOWEST_DRAW = 1e-9;

/** A distribution without its drawing. */
interface Shape {
  quantile(p: number): number;
  density(redshift: number): number;
  readonly peaks: readonly RedshiftPeak[];
  readonly cutProbability: number;
  /** Where the density jumps, and its limits from below and above. */
  readonly jumps: readonly { readonly redshift: number; readonly below: number; readonly above: number }[];
  /** Points that the density is straight between. */
  readonly nodes?: ArrayLike<number>;
}

/**
 * The distribution of a redshift.
 *
 * - `null`: exact.
 * - `gaussian`: normal around the redshift, cut at 0 and 30 and scaled to 1.
 * - `percentiles`: a skewed bell, the exponential of a normal variable shifted and scaled, whose 16th, 50th and 84th percentile are
 *   exactly those given. Where that would reach below 0 or above 30, two half-normals, one on each side of the median: a half
 *   ends at the limit and is widened to keep its percentile; where that is too near the limit, two even pieces. Then the density
 *   jumps at the median. The redshift itself is not used.
 * - `table`: straight between the points; the redshift itself is not used.
 *
 * @param redshift  0 to 30
 * @throws {OutOfDomainError} naming what cannot be
 */
export function redshiftDistribution(redshift: number, uncertainty: RedshiftUncertainty | null): RedshiftDistribution {
  if (!(redshift >= 0 && redshift <= HIGHEST_REDSHIFT)) {
    throw new OutOfDomainError('redshift', redshift, `between 0 and ${HIGHEST_REDSHIFT}`);
  }
  if (uncertainty === null) return exact(redshift);
  const shape = shapeOf(redshift, uncertainty);
  const quantile = (p: number): number => {
    if (!(p >= 0 && p <= 1)) throw new OutOfDomainError('p', p, 'between 0 and 1');
    return Math.min(HIGHEST_REDSHIFT, Math.max(LOWEST_DRAW, shape.quantile(p)));
  };
  return {
    isExact: false,
    sample: quantile,
    quantile,
    density: (at) => (at < 0 || at > HIGHEST_REDSHIFT ? 0 : shape.density(at)),
    curve: (count) => drawn(shape, count),
    peaks: shape.peaks,
    cutProbability: shape.cutProbability,
  };
}

function exact(redshift: number): RedshiftDistribution {
  return {
    isExact: true,
    sample: () => redshift,
    quantile: () => redshift,
    density: (at) => (at === redshift ? Infinity : 0),
    curve: () => ({ redshifts: [], densities: [] }),
    peaks: [{ redshift, probability: 1 }],
    cutProbability: 0,
  };
}

function shapeOf(redshift: number, uncertainty: RedshiftUncertainty): Shape {
  switch (uncertainty.kind) {
    case 'gaussian':
      return gaussian(redshift, uncertainty.sigma);
    case 'percentiles':
      return twoHalves(uncertainty.p16, uncertainty.p50, uncertainty.p84);
    case 'table': {
      const table = densityTable(uncertainty.redshifts, uncertainty.densities, 0, HIGHEST_REDSHIFT);
      return {
        quantile: (p) => tableQuantile(table, p),
        density: (at) => tableDensity(table, at),
        peaks: tablePeaks(table),
        cutProbability: 0,
        jumps: [],
        nodes: table.redshifts,
      };
    }
  }
}

function gaussian(mean: number, sigma: number): Shape {
  requirePositive('sigma', sigma);
  const below = normalCdf(-mean / sigma);
  const above = normalCdf((mean - HIGHEST_REDSHIFT) / sigma);
  const kept = 1 - below - above;
  return {
    quantile: (p) => mean + sigma * normalQuantile(Math.min(1, below + p * kept)),
    density: (at) => normalDensity((at - mean) / sigma) / (sigma * kept),
    peaks: [{ redshift: mean, probability: 1 }],
    cutProbability: below + above,
    jumps: [],
  };
}

function twoHalves(p16: number, p50: number, p84: number): Shape {
  if (!(p16 > 0 && p16 < p50)) throw new OutOfDomainError('p16', p16, `above 0 and below p50 = ${p50}`);
  if (!(p84 > p50 && p84 < HIGHEST_REDSHIFT)) {
    throw new OutOfDomainError('p84', p84, `above p50 = ${p50} and below ${HIGHEST_REDSHIFT}`);
  }
  const bell = skewedBell(p16, p50, p84);
  if (bell.cutProbability < NEGLIGIBLE_CUT) return bell;
  const left = halfOf(p50 - p16, p50);
  const right = halfOf(p84 - p50, HIGHEST_REDSHIFT - p50);
  return {
    quantile: (p) => (p < 0.5 ? p50 - left.distanceOf(1 - 2 * p) : p50 + right.distanceOf(2 * p - 1)),
    density: (at) => (at < p50 ? left.density(p50 - at) / 2 : right.density(at - p50) / 2),
    peaks: [{ redshift: p50, probability: 1 }],
    cutProbability: 0,
    jumps: [
      ...left.jumps.map(({ distance, inner, outer }) => ({
        redshift: p50 - distance,
        below: outer / 2,
        above: inner / 2,
      })),
      { redshift: p50, below: left.density(0) / 2, above: right.density(0) / 2 },
      ...right.jumps.map(({ distance, inner, outer }) => ({
        redshift: p50 + distance,
        below: inner / 2,
        above: outer / 2,
      })),
    ],
  };
}

/** A tail beyond the limits that is as small as this is drawn as the limit itself, so that no percentile moves. */
const NEGLIGIBLE_CUT = 1e-4;
/** Φ^−1(0.84). */
const SIGMAS_TO_PERCENTILE = normalQuantile(0.84);
/** Nearly equal sides make a normal distribution: the skewness would be lost to rounding. */
const LEAST_SKEWNESS = 1e-6;

/**
 * z = p50 + A (e^(g x) − 1) / g with a standard normal x: g from the ratio of the two sides, A from their size, so that the
 * percentiles are met.
 *
 * @see Tukey's g distribution: Hoaglin, in Exploring Data Tables, Trends and Shapes, Wiley 1985 (cited from memory)
 */
function skewedBell(p16: number, p50: number, p84: number): Shape {
  const ratio = (p84 - p50) / (p50 - p16);
  const g = Math.log(ratio) / SIGMAS_TO_PERCENTILE;
  const isEven = Math.abs(g) < LEAST_SKEWNESS;
  const scale = isEven ? (p84 - p16) / (2 * SIGMAS_TO_PERCENTILE) : ((p84 - p50) * g) / (ratio - 1);
  const redshiftAt = (x: number): number => p50 + scale * (isEven ? x : Math.expm1(g * x) / g);
  const normalAt = (redshift: number): number => {
    const distance = (redshift - p50) / scale;
    if (isEven) return distance;
    // Beyond the end that a skewed bell has on one side there is nothing.
    return g * distance <= -1 ? -Math.sign(g) * Infinity : Math.log1p(g * distance) / g;
  };
  const density = (redshift: number): number => {
    const x = normalAt(redshift);
    return Number.isFinite(x) ? normalDensity(x) / (scale * (isEven ? 1 : Math.exp(g * x))) : 0;
  };
  return {
    quantile: (p) => redshiftAt(normalQuantile(p)),
    density,
    // The mode of φ(x) e^(−g x) is at x = −g.
    peaks: [{ redshift: redshiftAt(-g), probability: 1 }],
    cutProbability: normalCdf(normalAt(0)) + normalCdf(-normalAt(HIGHEST_REDSHIFT)),
    jumps: [],
  };
}

/** A tail of this probability is not drawn. */
const UNDRAWN_TAIL = 1e-4;

function drawn(shape: Shape, count: number): { redshifts: number[]; densities: number[] } {
  if (!(Number.isSafeInteger(count) && count >= 2)) throw new OutOfDomainError('count', count, 'a whole number from 2');
  const { nodes, jumps } = shape;
  const redshifts = nodes !== undefined && nodes.length <= count ? Array.from(nodes) : spread(shape, count);
  const smooth = redshifts.filter((redshift) => jumps.every((jump) => jump.redshift !== redshift));
  const points = [
    ...smooth.map((redshift) => [redshift, shape.density(redshift)] as const),
    ...jumps.flatMap(({ redshift, below, above }) => [[redshift, below] as const, [redshift, above] as const]),
  ];
  // A stable sort leaves the two points of a jump in their order.
  points.sort(([a], [b]) => a - b);
  const area = points.reduce((sum, [redshift, density], i) => {
    const [before, densityBefore] = points[i - 1] ?? [redshift, density];
    return sum + ((density + densityBefore) / 2) * (redshift - before);
  }, 0);
  return { redshifts: points.map(([redshift]) => redshift), densities: points.map(([, density]) => density / area) };
}

/** Half of the points evenly over redshift, half evenly over probability, so that narrow peaks are met too. */
function spread({ quantile }: Shape, count: number): number[] {
  const low = Math.max(0, quantile(UNDRAWN_TAIL));
  const high = quantile(1 - UNDRAWN_TAIL);
  const even = Math.ceil(count / 2);
  const redshifts = new Set<number>([low, high]);
  for (let i = 0; i < even; i++) redshifts.add(low + ((high - low) * (i + 0.5)) / even);
  for (let i = 0; i < count - even; i++) {
    redshifts.add(quantile(UNDRAWN_TAIL + ((1 - 2 * UNDRAWN_TAIL) * (i + 0.5)) / (count - even)));
  }
  return [...redshifts].sort((a, b) => a - b);
}
