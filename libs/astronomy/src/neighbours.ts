import { requireBetween } from './argument-out-of-range.js';
import { angularSeparationArcsec } from './separation.js';
import { toRadians, type SkyPosition } from './sky-position.js';

export interface CloseNeighbour {
  /** Index into `positions`. */
  readonly index: number;
  /** Index of its nearest neighbour: into `positions` for {@link findCloseDuplicates}, into `catalogue` for {@link matchToCatalogue}. */
  readonly nearestIndex: number;
  readonly separationArcsec: number;
}

/**
 * Every position that has another one of the same list within a radius, with the nearest of them, in the order of the list.
 *
 * Correct across right ascension 0h and at the poles. Takes O(n log n) time and memory in proportion to n whatever the arrangement, also when all positions are
 * the same. A separation equal to the radius counts as within. Of several neighbours at exactly the same separation any one is named, the same one each time.
 *
 * @param radiusArcsec 0 to 36,000 (ten degrees)
 * @throws {ArgumentOutOfRange} if the radius or a declination is out of range, or a coordinate is not finite
 */
export function findCloseDuplicates(positions: readonly SkyPosition[], radiusArcsec: number): CloseNeighbour[] {
  return search(positions, positions, radiusArcsec, true);
}

/**
 * Every position that has an entry of the catalogue within a radius, with the nearest of them, in the order of `positions`. Same method, limits and edges as
 * {@link findCloseDuplicates}.
 */
export function matchToCatalogue(
  positions: readonly SkyPosition[],
  catalogue: readonly SkyPosition[],
  radiusArcsec: number,
): CloseNeighbour[] {
  return search(positions, catalogue, radiusArcsec, false);
}

function search(
  positions: readonly SkyPosition[],
  catalogue: readonly SkyPosition[],
  radiusArcsec: number,
  skipSelf: boolean,
): CloseNeighbour[] {
  requireBetween('radiusArcsec', radiusArcsec, 0, 36_000);
  const queries = unitVectors(positions);
  const tree = new DirectionTree(skipSelf ? queries : unitVectors(catalogue));
  // Rounding of the unit vectors shifts a chord by about 2e-16; the exact separation decides afterwards.
  const chord = 2 * Math.sin(toRadians(radiusArcsec / 3600) / 2) + 1e-15;
  const found: CloseNeighbour[] = [];
  positions.forEach((position, index) => {
    const nearestIndex = tree.nearest(queries, index, chord, skipSelf ? index : -1);
    const neighbour = nearestIndex === -1 ? undefined : catalogue[nearestIndex];
    if (neighbour === undefined) return;
    const separationArcsec = angularSeparationArcsec(position, neighbour);
    if (separationArcsec <= radiusArcsec) found.push({ index, nearestIndex, separationArcsec });
  });
  return found;
}

/** Three coordinates per position, one after the other. */
function unitVectors(positions: readonly SkyPosition[]): Float64Array {
  const vectors = new Float64Array(positions.length * 3);
  positions.forEach(({ raDeg, decDeg }, index) => {
    requireBetween(`positions[${index}].raDeg`, raDeg, -Number.MAX_VALUE, Number.MAX_VALUE);
    requireBetween(`positions[${index}].decDeg`, decDeg, -90, 90);
    const ra = toRadians(raDeg);
    const dec = toRadians(decDeg);
    vectors[3 * index] = Math.cos(dec) * Math.cos(ra);
    vectors[3 * index + 1] = Math.cos(dec) * Math.sin(ra);
    vectors[3 * index + 2] = Math.sin(dec);
  });
  return vectors;
}

/**
 * A balanced binary tree over unit vectors, split at the median along x, y and z in turn (Bentley 1975, Communications of the ACM 18, 509). On the sphere of
 * directions there is no seam at 0h and nothing special at a pole. The tree is the array `order` itself: the middle of a range is the node, the halves are its children.
 */
class DirectionTree {
  private readonly order: Uint32Array;
  private bestSquared = 0;
  private best = -1;

  constructor(private readonly vectors: Float64Array) {
    const count = vectors.length / 3;
    this.order = Uint32Array.from({ length: count }, (_, index) => index);
    this.build(0, count, 0);
  }

  /** Index of the nearest vector closer than a chord length to vector `query` of `queries`, except `excluded`; −1 if there is none. */
  nearest(queries: Float64Array, query: number, chord: number, excluded: number): number {
    this.bestSquared = chord * chord;
    this.best = -1;
    this.visit(0, this.order.length, 0, queries, 3 * query, excluded);
    return this.best;
  }

  private build(start: number, end: number, axis: number): void {
    if (end - start <= 1) return;
    const { vectors } = this;
    this.order
      .subarray(start, end)
      .sort((a, b) => (vectors[3 * a + axis] ?? 0) - (vectors[3 * b + axis] ?? 0) || a - b);
    const middle = (start + end) >> 1;
    const next = (axis + 1) % 3;
    this.build(start, middle, next);
    this.build(middle + 1, end, next);
  }

  private visit(
    start: number,
    end: number,
    axis: number,
    queries: Float64Array,
    offset: number,
    excluded: number,
  ): void {
    if (start >= end) return;
    const { vectors } = this;
    const middle = (start + end) >> 1;
    const node = this.order[middle] ?? 0;
    const dx = (queries[offset] ?? 0) - (vectors[3 * node] ?? 0);
    const dy = (queries[offset + 1] ?? 0) - (vectors[3 * node + 1] ?? 0);
    const dz = (queries[offset + 2] ?? 0) - (vectors[3 * node + 2] ?? 0);
    const squared = dx * dx + dy * dy + dz * dz;
    if (node !== excluded && squared < this.bestSquared) {
      this.bestSquared = squared;
      this.best = node;
    }
    const across = axis === 0 ? dx : axis === 1 ? dy : dz;
    const next = (axis + 1) % 3;
    if (across < 0) this.visit(start, middle, next, queries, offset, excluded);
    else this.visit(middle + 1, end, next, queries, offset, excluded);
    // Strictly closer only: with many equal positions a perfect neighbour ends the search at once.
    if (across * across >= this.bestSquared) return;
    if (across < 0) this.visit(middle + 1, end, next, queries, offset, excluded);
    else this.visit(start, middle, next, queries, offset, excluded);
  }
}
