import { OutOfDomainError } from './domain.js';
import { curveValueAt, type SampledCurve } from './sampled-curve.js';

/** Ends of the common grid: 40 nm to 30 µm, in vacuum. */
export const REST_GRID_LOW_NM = 40;
export const REST_GRID_HIGH_NM = 30_000;
/** Step in ln λ, 300 km/s. */
export const REST_GRID_STEP = 1e-3;

/** Nodes nearer than this, relative, are one node: far below any wavelength's accuracy, far above rounding. */
const SAME_NODE = 1e-9;

/**
 * Rest-frame wavelengths on which spectra are sampled: from 40 nm to 30 µm in steps of 1e-3 in ln λ, ascending.
 *
 * A power law f_λ ∝ λ^β drawn straight between these nodes is off by at most 1.25e-7 |β (β − 1)| of itself: below 1e-6 mag for
 * −2.2 ≤ β ≤ 3.2.
 *
 * @param jumpsNm       where a spectrum may jump: these nodes stand twice, for the value to the left and to the right
 * @param extraNodesNm  nodes to be met exactly, once; a jump at the same place stays a jump
 * @returns wavelengths in nm, not to be written to; jumps and nodes outside the grid are left out
 * @throws {OutOfDomainError} naming the first wavelength that is not a number
 */
export function restGrid(jumpsNm: readonly number[], extraNodesNm: ArrayLike<number> = []): Float64Array {
  const jumps = sortedInside('jumpsNm', jumpsNm);
  const extras = sortedInside('extraNodesNm', extraNodesNm);
  // What is worked out on the points of a spectrum is kept with them, so spectra with the same points share one array.
  const key = `${jumps.join(' ')} and ${extras.join(' ')}`;
  const known = keptGrids.get(key);
  if (known !== undefined) return known;
  const made = makeGrid(jumps, extras);
  if (keptGrids.size < MOST_KEPT_GRIDS) keptGrids.set(key, made);
  return made;
}

const keptGrids = new Map<string, Float64Array>();
const MOST_KEPT_GRIDS = 16;

function makeGrid(jumps: readonly number[], extras: readonly number[]): Float64Array {
  const nodes: number[] = [];
  let [jump, extra] = [0, 0];
  for (let wavelengthNm = -Infinity; wavelengthNm < Infinity;) {
    const step = nextRegular(wavelengthNm);
    const atJump = jumps[jump] ?? Infinity;
    const atExtra = extras[extra] ?? Infinity;
    const next = Math.min(step, atJump, atExtra);
    if (next === Infinity) break;
    // Among nodes that coincide the jump's wavelength counts, then the extra node's.
    const isJump = isSame(atJump, next);
    const node = isJump ? atJump : isSame(atExtra, next) ? atExtra : next;
    nodes.push(node);
    if (isJump) nodes.push(node);
    while (isSame(jumps[jump] ?? Infinity, node)) jump++;
    while (isSame(extras[extra] ?? Infinity, node)) extra++;
    wavelengthNm = node;
  }
  return Float64Array.from(nodes);
}

const REGULAR_COUNT = Math.ceil(Math.log(REST_GRID_HIGH_NM / REST_GRID_LOW_NM) / REST_GRID_STEP) + 1;

function regularNode(index: number): number {
  if (index >= REGULAR_COUNT) return Infinity;
  return index === REGULAR_COUNT - 1 ? REST_GRID_HIGH_NM : REST_GRID_LOW_NM * Math.exp(index * REST_GRID_STEP);
}

/** The first node of the even grid that lies beyond a wavelength and is not the same node. */
function nextRegular(wavelengthNm: number): number {
  if (wavelengthNm === -Infinity) return REST_GRID_LOW_NM;
  const index = Math.max(0, Math.floor(Math.log(wavelengthNm / REST_GRID_LOW_NM) / REST_GRID_STEP));
  let next = index;
  while (regularNode(next) <= wavelengthNm * (1 + SAME_NODE)) next++;
  return regularNode(next);
}

function isSame(a: number, b: number): boolean {
  return a === b || Math.abs(a - b) <= SAME_NODE * Math.min(a, b);
}

function sortedInside(field: string, wavelengthsNm: ArrayLike<number>): number[] {
  const inside: number[] = [];
  for (let i = 0; i < wavelengthsNm.length; i++) {
    const wavelengthNm = wavelengthsNm[i]!;
    if (Number.isNaN(wavelengthNm)) throw new OutOfDomainError(`${field}.${i}`, wavelengthNm, 'a number');
    if (wavelengthNm >= REST_GRID_LOW_NM && wavelengthNm <= REST_GRID_HIGH_NM) inside.push(wavelengthNm);
  }
  return inside.sort((a, b) => a - b);
}

/** Which limit of a function is meant at a jump: from shorter wavelengths or from longer ones. */
export type Side = 'left' | 'right';

/** Whether a wavelength, approached from a side, is below an edge. */
export function isBelow(wavelengthNm: number, edgeNm: number, side: Side): boolean {
  return wavelengthNm < edgeNm || (wavelengthNm === edgeNm && side === 'left');
}

/**
 * A function of wavelength on given nodes; where a node stands twice, the first takes the limit from the left.
 *
 * @param nodesNm  ascending, as of {@link restGrid}; used as they are, not copied
 */
export function sampleOn(nodesNm: Float64Array, value: (wavelengthNm: number, side: Side) => number): SampledCurve {
  const values = new Float64Array(nodesNm.length);
  for (let i = 0; i < nodesNm.length; i++) {
    const isFirstOfTwo = nodesNm[i] === nodesNm[i + 1];
    values[i] = value(nodesNm[i]!, isFirstOfTwo ? 'left' : 'right');
  }
  return { wavelengthsNm: nodesNm, values };
}

/** Value of a curve at a wavelength inside its range, at a jump the limit from a side. */
export function limitAt(curve: SampledCurve, wavelengthNm: number, side: Side): number {
  if (side === 'right') return curveValueAt(curve, wavelengthNm);
  const { wavelengthsNm, values } = curve;
  let low = 0;
  let high = wavelengthsNm.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (wavelengthsNm[middle]! < wavelengthNm) low = middle + 1;
    else high = middle;
  }
  return wavelengthsNm[low] === wavelengthNm ? values[low]! : curveValueAt(curve, wavelengthNm);
}
