import { findRoot, normalCdf, normalDensity, normalQuantile } from '@faintward/numerics';

/** How one half of a distribution lies: by distance from the median, 0 to its limit. */
export interface Half {
  /** Distance within which the part q (0 to 1) of the half lies. */
  distanceOf(q: number): number;
  /** Per unit distance; integrates to 1 over the half. */
  density(distance: number): number;
  /** Distances, other than 0 and the limit, at which the density jumps. */
  readonly jumps: readonly { readonly distance: number; readonly inner: number; readonly outer: number }[];
}

/** Part of a half between the median and the 16th or 84th percentile: 34 of 50 %. */
const INNER_PART = 0.68;
/** Φ^−1(0.84). */
const SIGMAS_TO_PERCENTILE = normalQuantile(0.5 + INNER_PART / 2);
/** Beyond so many σ the limit cuts off nothing that a double can hold. */
const FAR_LIMIT_SIGMAS = 9;
/** Nearer than this to the flat shape, the flat pieces are used. */
const FLAT_MARGIN = 1e-6;

/**
 * Half of a distribution with 68 % of it within a distance: a half-normal that ends at the limit and is widened so that the
 * distance is met exactly; two even pieces where even a flat one would hold more than 68 % closer in.
 *
 * @param toPercentile  above 0
 * @param limit         above `toPercentile`
 */
export function halfOf(toPercentile: number, limit: number): Half {
  if (toPercentile / limit >= INNER_PART - FLAT_MARGIN) return evenPieces(toPercentile, limit);
  const narrow = toPercentile / SIGMAS_TO_PERCENTILE;
  return halfNormal(limit / narrow > FAR_LIMIT_SIGMAS ? narrow : widened(toPercentile, limit, narrow), limit);
}

function widened(toPercentile: number, limit: number, narrow: number): number {
  const excess = (inverseSigma: number): number =>
    central(toPercentile * inverseSigma) / central(limit * inverseSigma) - INNER_PART;
  // Where the limit cuts off less than rounding, 68 % may come out a digit short even at the narrow end: nothing to widen.
  if (excess(1 / narrow) <= 0) return narrow;
  // So wide a bell is flat, and a flat one holds less than 68 % by FLAT_MARGIN: the root lies between.
  return 1 / findRoot(excess, 1e-4 / limit, 1 / narrow, { absoluteTolerance: 1e-13 / narrow });
}

/** Probability of a normal variable between −x and x. */
function central(x: number): number {
  return 1 - 2 * normalCdf(-x);
}

function halfNormal(sigma: number, limit: number): Half {
  const kept = central(limit / sigma);
  return {
    distanceOf: (q) => Math.min(limit, -sigma * normalQuantile((1 - q * kept) / 2)),
    density: (distance) => (distance > limit ? 0 : (2 * normalDensity(distance / sigma)) / (sigma * kept)),
    jumps: [],
  };
}

function evenPieces(toPercentile: number, limit: number): Half {
  const inner = INNER_PART / toPercentile;
  const outer = (1 - INNER_PART) / (limit - toPercentile);
  return {
    distanceOf: (q) => (q <= INNER_PART ? q / inner : Math.min(limit, toPercentile + (q - INNER_PART) / outer)),
    density: (distance) => (distance < toPercentile ? inner : distance <= limit ? outer : 0),
    jumps: [{ distance: toPercentile, inner, outer }],
  };
}
