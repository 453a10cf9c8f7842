import { OutOfDomainError, requireRedshift } from './domain.js';
import { branchesAt, type ContinuumSeries, type IntergalacticTable, type LineSeries } from './intergalactic-table.js';
import { firstAbove } from './sampled-curve.js';

/** Mean transmission of a medium on fixed rest wavelengths. */
export interface NodeTransmission {
  /**
   * Writes e^−τ at each rest node for a source at a redshift.
   *
   * @param out   as long as the nodes from `first` on
   * @param first  index of the first node that is wanted
   * @throws {OutOfDomainError} if `out` has another length, or the redshift is negative
   */
  transmission(redshift: number, out: Float64Array, first?: number): void;
}

/**
 * At a fixed rest wavelength r every term is coefficient · r^p · (1 + z)^q with fixed p and q in each branch, and the
 * lines in a branch are neighbours. So powers of r and running sums over the lines are computed once; a redshift then
 * costs a few powers, and each node some multiplications and one exponential.
 */
export function transmissionOnNodes(
  table: IntergalacticTable,
  lineSeries: readonly LineSeries[],
  restNm: Float64Array,
): NodeTransmission {
  requireAscending(restNm);
  const linesNm = Float64Array.from(table.lineWavelengthsNm);
  const lineCounts = countsOfLinesAbove(restNm, linesNm);
  const absorbedCount = lineCounts.filter((count) => count > 0).length;
  const limitedCount = countLeftOf(restNm, table.lymanLimitNm);
  const branches = lineSeries.flatMap((series) => preparedBranches(series, linesNm, restNm, absorbedCount));
  const addContinuum = continuumAdder(table, restNm, limitedCount);
  return {
    transmission: (redshift, out, first = 0) => {
      requireRedshift(redshift);
      const count = restNm.length - first;
      if (out.length !== count) throw new OutOfDomainError('out.length', out.length, String(count));
      const absorbed = Math.max(0, absorbedCount - first);
      const depths = out.fill(0, 0, absorbed);
      for (const branch of branches) addLines(branch, restNm, lineCounts, first, absorbedCount, 1 + redshift, depths);
      addContinuum(redshift, first, depths);
      for (let i = 0; i < absorbed; i++) out[i] = depths[i]! > 0 ? Math.exp(-depths[i]!) : 1;
      out.fill(1, absorbed);
    },
  };
}

function requireAscending(restNm: Float64Array): void {
  for (let i = 0; i < restNm.length; i++) {
    const low = i === 0 ? Number.MIN_VALUE : restNm[i - 1]!;
    if (!(restNm[i]! >= low && restNm[i]! < Infinity)) {
      throw new OutOfDomainError(`restNm.${i}`, restNm[i], 'finite, above 0 and ascending');
    }
  }
}

/** Whether a node stands for the wavelengths just left of it: it is the first of two equal ones. */
function isLeftOfJump(restNm: Float64Array, i: number): boolean {
  return restNm[i + 1] === restNm[i];
}

/** How many nodes, from the first on, lie left of a wavelength. */
function countLeftOf(restNm: Float64Array, wavelengthNm: number): number {
  let count = 0;
  while (count < restNm.length && liesLeftOf(restNm, count, wavelengthNm)) count++;
  return count;
}

function liesLeftOf(restNm: Float64Array, i: number, wavelengthNm: number): boolean {
  return restNm[i]! < wavelengthNm || (restNm[i] === wavelengthNm && isLeftOfJump(restNm, i));
}

/** For each node, how many lines, from Lyα on, lie to the right of it and so can absorb there. */
function countsOfLinesAbove(restNm: Float64Array, linesNm: Float64Array): Uint16Array {
  return Uint16Array.from(restNm, (_, i) => linesNm.findLastIndex((lineNm) => liesLeftOf(restNm, i, lineNm)) + 1);
}

interface PreparedBranch {
  readonly power: number;
  /** Observed wavelengths at which each line enters and leaves the branch; descending. */
  readonly fromNm: Float64Array;
  readonly toNm: Float64Array;
  /** A line acts above its own wavelength, but in a later branch from its bound on. */
  readonly isFirst: boolean;
  /** Sum over the first so many lines of coefficient · λ_line^−power. */
  readonly sums: Float64Array;
  /** r^power. */
  readonly nodePowers: Float64Array;
}

function preparedBranches(
  { branches }: LineSeries,
  linesNm: Float64Array,
  restNm: Float64Array,
  absorbedCount: number,
): PreparedBranch[] {
  return branches.map(({ ratioBelow, power, coefficients }, b) => {
    const ratioFrom = b === 0 ? 1 : (branches[b - 1]!.ratioBelow ?? Infinity);
    const sums = new Float64Array(linesNm.length + 1);
    linesNm.forEach((lineNm, j) => {
      sums[j + 1] = sums[j]! + coefficients[j]! * lineNm ** -power;
    });
    return {
      power,
      fromNm: linesNm.map((lineNm) => ratioFrom * lineNm),
      toNm: linesNm.map((lineNm) => (ratioBelow ?? Infinity) * lineNm),
      isFirst: b === 0,
      sums,
      nodePowers: restNm.slice(0, absorbedCount).map((rest) => rest ** power),
    };
  });
}

function addLines(
  { power, fromNm, toNm, isFirst, sums, nodePowers }: PreparedBranch,
  restNm: Float64Array,
  lineCounts: Uint16Array,
  first: number,
  absorbedCount: number,
  stretch: number,
  depths: Float64Array,
): void {
  const stretchPower = stretch ** power;
  // Lines from `entered` up to `leaving` are in the branch. Towards longer wavelengths both only fall.
  let entered = fromNm.length;
  let leaving = toNm.length;
  const start = Math.max(first, firstAbove(restNm, fromNm[fromNm.length - 1]! / stretch) - 1);
  for (let i = start; i < absorbedCount; i++) {
    const observedNm = restNm[i]! * stretch;
    while (entered > 0 && (isFirst ? observedNm > fromNm[entered - 1]! : observedNm >= fromNm[entered - 1]!)) entered--;
    while (leaving > 0 && observedNm >= toNm[leaving - 1]!) leaving--;
    if (leaving === 0) return;
    const end = Math.min(leaving, lineCounts[i]!);
    if (end > entered) depths[i - first]! += stretchPower * nodePowers[i]! * (sums[end]! - sums[entered]!);
  }
}

/** Adds the continuum of all absorbers to the optical depths of a redshift. */
function continuumAdder(
  { lymanLimitNm, continuum }: IntergalacticTable,
  restNm: Float64Array,
  limitedCount: number,
): (redshift: number, first: number, depths: Float64Array) => void {
  const powers = new Map<number, Float64Array>();
  for (const { ratioPower } of allTerms(continuum)) {
    if (powers.has(ratioPower)) continue;
    const ofNodes = restNm.slice(0, limitedCount).map((rest) => (rest / lymanLimitNm) ** ratioPower);
    powers.set(ratioPower, ofNodes);
  }
  return (redshift, first, depths) => {
    const stretch = 1 + redshift;
    const firstInside = firstFrom(restNm, limitedCount, first, (rest) => rest * stretch > lymanLimitNm);
    for (const series of continuum) {
      let start = firstInside;
      for (const { ratioBelow, terms } of branchesAt(series, redshift)) {
        const belowNm = (ratioBelow ?? Infinity) * lymanLimitNm;
        const end = firstFrom(restNm, limitedCount, start, (rest) => rest * stretch >= belowNm);
        for (const { coefficient, redshiftPower, ratioPower } of terms) {
          const weight = coefficient * stretch ** (redshiftPower + ratioPower);
          const ofNodes = powers.get(ratioPower)!;
          for (let i = start; i < end; i++) depths[i - first]! += weight * ofNodes[i]!;
        }
        start = end;
      }
    }
  };
}

function allTerms(continuum: readonly ContinuumSeries[]) {
  return continuum.flatMap(({ epochs }) => epochs.flatMap(({ branches }) => branches.flatMap(({ terms }) => terms)));
}

/** Index of the first of the nodes from `start` up to `count` that passes a test which all later ones pass too. */
function firstFrom(restNm: Float64Array, count: number, start: number, passes: (restNm: number) => boolean): number {
  let low = start;
  let high = count;
  while (low < high) {
    const middle = (low + high) >> 1;
    if (passes(restNm[middle]!)) high = middle;
    else low = middle + 1;
  }
  return low;
}
