import type { Expansion } from './expansion.js';
import { comovingBetween, timeBetween, timeSinceBigBang } from './line-of-sight.js';

/*
 * A fast path for many redshifts of one model: piecewise polynomials in
 *
 *     v = 1 − (1+z)^(−1/2) = z / (1 + z + √(1+z)),
 *
 * which runs from 0 (here) to 1 (big bang). Two reasons for it: in a universe of matter the comoving distance is exactly
 * linear in v, so few pieces do for a real one; and the second form costs one root and one division, and keeps the relative
 * accuracy of a small z. Each polynomial starts at the left end of its cell, and the first cell's has no constant, so that
 * the accuracy relative to the distance holds down to z = 0.
 */

/** Coefficients per cell: the derivative is interpolated in NODES points, so its integral has NODES + 1 coefficients. */
const NODES = 7;
export const STRIDE = NODES + 1;
const FIRST_CELL_COUNT = 256;
const LAST_CELL_COUNT = 32768;
/** Accepted estimate of the relative error inside a cell. */
const TAIL_LIMIT = 1e-12;
/** Where the cells of the near zone end: beyond, sources are rare, and radiation asks for narrower cells. */
const NEAR_ZONE_REDSHIFT = 30;

/** Cells of one width. Coefficients: STRIDE per cell, ascending powers of the position in the cell from 0 to 1. */
export interface TableZone {
  readonly lastRedshift: number;
  /** v at the left end of the first cell; exactly 0 in the near zone. */
  readonly start: number;
  /** Cells per unit of v. */
  readonly cellsPerUnit: number;
  /** Comoving distance in Hubble distances. */
  readonly comoving: Float64Array;
  /** Lookback time in Hubble times. */
  readonly lookback: Float64Array;
  /** Age in Hubble times; undefined where it is infinite. */
  readonly age: Float64Array | undefined;
}

/** Polynomials for every redshift up to the end of the far zone. */
export interface DistanceTable {
  readonly near: TableZone;
  readonly far: TableZone;
}

/** From values at Chebyshev nodes of [0, 1] to coefficients of ascending powers: one fixed matrix, made once. */
const interpolation = makeInterpolation();

interface Interpolation {
  readonly nodes: readonly number[];
  /** Chebyshev coefficients from values, row by row; only used to see how fast they fall. */
  readonly toChebyshev: readonly (readonly number[])[];
  readonly toPowers: readonly (readonly number[])[];
}

function makeInterpolation(): Interpolation {
  const angles = Array.from({ length: NODES }, (_, j) => (Math.PI * (j + 0.5)) / NODES);
  const nodes = angles.map((angle) => (1 + Math.cos(angle)) / 2);
  const toChebyshev = Array.from({ length: NODES }, (_, k) =>
    angles.map((angle) => ((k === 0 ? 1 : 2) / NODES) * Math.cos(k * angle)),
  );
  // Shifted Chebyshev polynomials T*_k(t) in powers of t: T*_{k+1} = 2(2t − 1) T*_k − T*_{k−1}. DLMF 18.9.1 with x = 2t − 1.
  const shifted: number[][] = [
    [1, ...Array<number>(NODES - 1).fill(0)],
    [-1, 2, ...Array<number>(NODES - 2).fill(0)],
  ];
  for (let k = 1; k + 1 < NODES; k++) {
    const current = shifted[k]!;
    const before = shifted[k - 1]!;
    shifted.push(current.map((c, i) => 4 * (i > 0 ? current[i - 1]! : 0) - 2 * c - before[i]!));
  }
  const toPowers = Array.from({ length: NODES }, (_, power) =>
    nodes.map((_node, j) => shifted.reduce((sum, polynomial, k) => sum + polynomial[power]! * toChebyshev[k]![j]!, 0)),
  );
  return { nodes, toChebyshev, toPowers };
}

/** v of a redshift, relative accuracy kept at small z. */
function tableCoordinate(redshift: number): number {
  const s = 1 + redshift;
  return redshift / (s + Math.sqrt(s));
}

/**
 * Builds the tables with as many cells as the model needs.
 *
 * Accepted cells have last Chebyshev coefficients below {@link TAIL_LIMIT} of the value there, and each zone's comoving distance
 * agrees with adaptive quadrature to as much. (In a universe that nearly stood still, where the terms of E² cancel, the limit is
 * what rounding leaves.)
 *
 * @returns undefined if even the narrowest cells are not good enough, so that the caller must integrate directly
 */
export function createDistanceTable(expansion: Expansion, lastRedshift: number): DistanceTable | undefined {
  const limit = Math.max(TAIL_LIMIT, 1e-15 / expansion.leastPurity);
  const boundary = tableCoordinate(NEAR_ZONE_REDSHIFT);
  // A hair more than the last redshift, so that rounding never points past the last cell.
  const end = tableCoordinate(lastRedshift) * (1 + 1e-13);
  const ageAtEnd = timeSinceBigBang(expansion, logFromCoordinate(end));
  const ageAtBoundary = timeSinceBigBang(expansion, logFromCoordinate(boundary));
  const near = createZone(
    expansion,
    NEAR_ZONE_REDSHIFT,
    { start: 0, end: boundary * (1 + 1e-13) },
    limit,
    ageAtBoundary,
  );
  const far = createZone(expansion, lastRedshift, { start: boundary, end }, limit, ageAtEnd);
  return near && far && { near, far };
}

/** x = ln(1 + z) at a table coordinate. */
function logFromCoordinate(v: number): number {
  return -2 * Math.log1p(-v);
}

interface Stretch {
  readonly start: number;
  readonly end: number;
}

function createZone(
  expansion: Expansion,
  lastRedshift: number,
  stretch: Stretch,
  limit: number,
  ageAtEnd: number,
): TableZone | undefined {
  const startX = logFromCoordinate(stretch.start);
  const endX = logFromCoordinate(stretch.end);
  const before = comovingBetween(expansion, 0, startX);
  const lookbackBefore = timeBetween(expansion, 0, startX);
  const whole = before + comovingBetween(expansion, startX, endX);
  for (let cells = FIRST_CELL_COUNT; cells <= LAST_CELL_COUNT; cells *= 2) {
    const made = tryCells(expansion, cells, stretch, limit, before, lookbackBefore, ageAtEnd);
    if (made && Math.abs(cellEnd(made.comoving, cells - 1) / whole - 1) < limit) return { ...made, lastRedshift };
  }
  return undefined;
}

function tryCells(
  expansion: Expansion,
  cells: number,
  { start, end }: Stretch,
  limit: number,
  comovingBefore: number,
  lookbackBefore: number,
  ageAtEnd: number,
): Omit<TableZone, 'lastRedshift'> | undefined {
  const width = (end - start) / cells;
  const comoving = new Float64Array(cells * STRIDE);
  const lookback = new Float64Array(cells * STRIDE);
  const distanceSlopes = new Float64Array(NODES);
  const timeSlopes = new Float64Array(NODES);
  const timeTails = new Float64Array(cells);
  let distance = comovingBefore;
  let time = lookbackBefore;
  for (let cell = 0; cell < cells; cell++) {
    for (let j = 0; j < NODES; j++) {
      // d(D_C)/dv = 2 s^{3/2}/E and d(t_L)/dv = 2 s^{1/2}/E, since dz = 2 s^{3/2} dv.
      const u = 1 - (start + width * (cell + interpolation.nodes[j]!));
      const s = 1 / (u * u);
      const slope = (2 * width) / (u * expansion.rate(s));
      timeSlopes[j] = slope;
      distanceSlopes[j] = slope * s;
    }
    comoving[cell * STRIDE] = distance;
    lookback[cell * STRIDE] = time;
    const distanceTail = fillCell(comoving, cell, distanceSlopes);
    timeTails[cell] = fillCell(lookback, cell, timeSlopes);
    distance = cellEnd(comoving, cell);
    time = cellEnd(lookback, cell);
    if (!(distanceTail < limit * distance && timeTails[cell]! < limit * time)) return undefined;
  }
  const age = ageAtEnd === Infinity ? undefined : ageFromLookback(lookback, cells, ageAtEnd);
  if (age && timeTails.some((tail, cell) => !(tail < limit * cellEnd(age, cell)))) return undefined;
  return { start, cellsPerUnit: 1 / width, comoving, lookback, age };
}

/** Writes the integral of the interpolated slopes behind the constant already there; returns the size of the last terms. */
function fillCell(coefficients: Float64Array, cell: number, slopes: Float64Array): number {
  const at = cell * STRIDE;
  for (let power = 0; power < NODES; power++) {
    let sum = 0;
    for (let j = 0; j < NODES; j++) sum += interpolation.toPowers[power]![j]! * slopes[j]!;
    coefficients[at + power + 1] = sum / (power + 1);
  }
  let last = 0;
  let lastButOne = 0;
  for (let j = 0; j < NODES; j++) {
    last += interpolation.toChebyshev[NODES - 1]![j]! * slopes[j]!;
    lastButOne += interpolation.toChebyshev[NODES - 2]![j]! * slopes[j]!;
  }
  // What was cut off is smaller than the last term by about the ratio of the last two; the last itself is a safe bound.
  return Math.max(Math.abs(last), Math.abs(lastButOne) * 1e-3);
}

/** The polynomial at the right end of its cell. */
function cellEnd(coefficients: Float64Array, cell: number): number {
  let sum = 0;
  for (let i = STRIDE - 1; i >= 0; i--) sum += coefficients[cell * STRIDE + i]!;
  return sum;
}

/** Age = age at the far end + what passes until then, summed from the far end so that early ages keep their digits. */
function ageFromLookback(lookback: Float64Array, cells: number, ageAtEnd: number): Float64Array {
  const age = lookback.map((coefficient) => -coefficient);
  let after = ageAtEnd;
  for (let cell = cells - 1; cell >= 0; cell--) {
    const at = cell * STRIDE;
    let passed = 0;
    for (let i = STRIDE - 1; i >= 1; i--) passed += lookback[at + i]!;
    after += passed;
    age[at] = after;
  }
  return age;
}
