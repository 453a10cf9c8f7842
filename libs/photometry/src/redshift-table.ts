import { OutOfDomainError } from './domain.js';
import { firstAbove } from './sampled-curve.js';

/** A probability density given by points, straight between them, scaled to unit area. */
export interface DensityTable {
  readonly redshifts: Float64Array;
  readonly densities: Float64Array;
  /** Probability below each point; the last is 1. */
  readonly cumulative: Float64Array;
}

/**
 * @throws {OutOfDomainError} naming the first point that does not ascend, lies outside the limits or is negative, or if all are zero
 */
export function densityTable(
  redshifts: readonly number[],
  densities: readonly number[],
  lowest: number,
  highest: number,
): DensityTable {
  if (redshifts.length < 2) throw new OutOfDomainError('redshifts.length', redshifts.length, 'at least 2');
  if (densities.length !== redshifts.length) {
    throw new OutOfDomainError('densities.length', densities.length, `as many as redshifts, ${redshifts.length}`);
  }
  const cumulative = new Float64Array(redshifts.length);
  for (let i = 0; i < redshifts.length; i++) {
    const redshift = redshifts[i]!;
    if (!(redshift >= lowest && redshift <= highest)) {
      throw new OutOfDomainError(`redshifts.${i}`, redshift, `between ${lowest} and ${highest}`);
    }
    if (!(densities[i]! >= 0 && densities[i]! < Infinity)) {
      throw new OutOfDomainError(`densities.${i}`, densities[i], 'a finite number, 0 or more');
    }
    if (i === 0) continue;
    const before = redshifts[i - 1]!;
    if (!(redshift > before)) throw new OutOfDomainError(`redshifts.${i}`, redshift, `above the one before, ${before}`);
    cumulative[i] = cumulative[i - 1]! + ((densities[i - 1]! + densities[i]!) / 2) * (redshift - before);
  }
  const area = cumulative.at(-1)!;
  if (!(area > 0 && area < Infinity))
    throw new OutOfDomainError('densities', area, 'above 0 somewhere, with a finite area');
  return {
    redshifts: Float64Array.from(redshifts),
    densities: Float64Array.from(densities, (density) => density / area),
    cumulative: cumulative.map((below) => below / area),
  };
}

/** The redshift below which the probability p lies: exact, a root of a quadratic in each piece. */
export function tableQuantile({ redshifts, densities, cumulative }: DensityTable, p: number): number {
  const last = redshifts.length - 1;
  const i = Math.min(Math.max(firstAbove(cumulative, p) - 1, 0), last - 1);
  const rest = p - cumulative[i]!;
  if (rest <= 0) return redshifts[i]!;
  const width = redshifts[i + 1]! - redshifts[i]!;
  const start = densities[i]!;
  const slope = (densities[i + 1]! - start) / width;
  const root = Math.sqrt(Math.max(0, start * start + 2 * slope * rest));
  return redshifts[i]! + Math.min(width, (2 * rest) / (start + root));
}

/** Density at a redshift; 0 outside the points. */
export function tableDensity({ redshifts, densities }: DensityTable, redshift: number): number {
  const last = redshifts.length - 1;
  if (!(redshift >= redshifts[0]! && redshift <= redshifts[last]!)) return 0;
  const i = Math.min(firstAbove(redshifts, redshift) - 1, last - 1);
  const t = (redshift - redshifts[i]!) / (redshifts[i + 1]! - redshifts[i]!);
  return densities[i]! * (1 - t) + densities[i + 1]! * t;
}

/** A maximum of a density. */
export interface RedshiftPeak {
  readonly redshift: number;
  /** Of the basin around it, from the minimum before to the minimum after. */
  readonly probability: number;
}

/** A dip that is not deeper than this part of the lower of two maxima does not divide them: it is noise of a fit. */
const SHALLOW = 0.9;
const LEAST_PROBABILITY = 0.01;

/**
 * The maxima of the density, most probable first, each with the probability of its basin. Basins meet at the minima; shallow dips
 * (above 90 % of the lower maximum) do not divide, and peaks below 1 % are left out.
 */
export function tablePeaks(table: DensityTable): RedshiftPeak[] {
  const summits = summitsOf(table);
  mergeShallow(summits);
  const { redshifts } = table;
  const basins = summits.map(({ redshift }, i) => {
    const from = i === 0 ? 0 : cumulativeAt(table, summits[i - 1]!.dipAfter!.redshift);
    const to = i === summits.length - 1 ? 1 : cumulativeAt(table, summits[i]!.dipAfter!.redshift);
    return { redshift, probability: to - from };
  });
  const peaks = basins.filter(({ probability }) => probability >= LEAST_PROBABILITY);
  // Hundreds of small peaks, each under a per cent, are one distribution without structure.
  if (peaks.length === 0) return [{ redshift: redshifts[indexOfLargest(table.densities)]!, probability: 1 }];
  return peaks.sort((a, b) => b.probability - a.probability);
}

interface Summit {
  redshift: number;
  density: number;
  /** The minimum on the way to the next summit; of a flat one, its middle. */
  dipAfter: { redshift: number; density: number } | undefined;
}

/** Maxima and the minima between them; a plateau counts as its middle. */
function summitsOf({ redshifts, densities }: DensityTable): Summit[] {
  const summits: Summit[] = [];
  let dip: Summit['dipAfter'];
  for (let first = 0; first < densities.length;) {
    let last = first;
    while (densities[last + 1] === densities[first]) last++;
    const here = { redshift: (redshifts[first]! + redshifts[last]!) / 2, density: densities[first]! };
    const before = densities[first - 1] ?? -1;
    const after = densities[last + 1] ?? -1;
    if (here.density > before && here.density > after && here.density > 0) {
      if (summits.length > 0) summits.at(-1)!.dipAfter = dip;
      summits.push({ ...here, dipAfter: undefined });
    } else if (here.density < before && here.density < after) {
      dip = here;
    }
    first = last + 1;
  }
  return summits;
}

/** Joins neighbours over the shallowest dip until every dip is deep. */
function mergeShallow(summits: Summit[]): void {
  for (;;) {
    let shallowest = -1;
    let most = SHALLOW;
    for (let i = 0; i + 1 < summits.length; i++) {
      const depth = summits[i]!.dipAfter!.density / Math.min(summits[i]!.density, summits[i + 1]!.density);
      if (depth > most) [shallowest, most] = [i, depth];
    }
    if (shallowest === -1) return;
    const [left, right] = [summits[shallowest]!, summits[shallowest + 1]!];
    const higher = left.density >= right.density ? left : right;
    summits.splice(shallowest, 2, { ...higher, dipAfter: right.dipAfter });
  }
}

function cumulativeAt(table: DensityTable, redshift: number): number {
  const { redshifts, densities, cumulative } = table;
  const i = Math.min(Math.max(firstAbove(redshifts, redshift) - 1, 0), redshifts.length - 2);
  const distance = redshift - redshifts[i]!;
  return cumulative[i]! + ((densities[i]! + tableDensity(table, redshift)) / 2) * distance;
}

function indexOfLargest(values: Float64Array): number {
  return values.reduce((best, value, i) => (value > values[best]! ? i : best), 0);
}
