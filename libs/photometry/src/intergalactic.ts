import { OutOfDomainError, requirePositive, requireRedshift } from './domain.js';
import { type NodeTransmission, transmissionOnNodes } from './intergalactic-nodes.js';
import { branchesAt, type IntergalacticTable, type LineSeries } from './intergalactic-table.js';

export type { NodeTransmission } from './intergalactic-nodes.js';
export type { IntergalacticTable } from './intergalactic-table.js';

/**
 * Mean absorption by neutral hydrogen between a source and us.
 *
 * A line of rest wavelength λ_j absorbs where λ_j < λ_observed < λ_j (1 + z), strictly, and the continuum likewise with
 * the Lyman limit. It is the mean of many sightlines; a single one scatters by some 30 % at z = 3–5. There is no neutral
 * medium and no damping wing redward of Lyα in it, so that real sources beyond z = 6 can be fainter. Below 91.2 nm
 * *observed* the formulas are undefined; nothing is absorbed there, which matters to no telescope on the ground.
 */
export interface IntergalacticMedium {
  readonly id: 'inoue2014' | 'madau1995';
  readonly source: string;
  /** Rest wavelengths at which transmission jumps: each line and the limit. Ascending. */
  readonly jumpsRestNm: readonly number[];
  /** τ ≥ 0 at an observed wavelength for a source at a redshift. */
  opticalDepth(observedNm: number, redshift: number): number;
  /**
   * The same for many redshifts on fixed rest wavelengths, with all powers of wavelength computed once.
   *
   * Where two nodes are equal, the first stands for the wavelengths just left of it: a line at exactly that wavelength
   * absorbs at the first and not at the second.
   *
   * @param restNm  ascending; not copied
   */
  onNodes(restNm: Float64Array): NodeTransmission;
}

/**
 * Inoue, Shimizu, Iwata & Tanaka 2014, MNRAS 442, 1805: forest and damped systems in 39 Lyman lines, and their continuum.
 *
 * Optical depth as in the published formulas to rounding.
 */
export function createInoue2014(table: IntergalacticTable): IntergalacticMedium {
  requireTable(table, 'inoue2014');
  return mediumOf(table, table.lineSeries, 'Inoue, Shimizu, Iwata & Tanaka 2014, MNRAS 442, 1805');
}

/**
 * Madau 1995, ApJ 441, 18: four Lyman lines and the published approximation of the continuum, which is poor below
 * some 65 nm rest. For comparison with older work.
 *
 * @param options.withMetals  add its lines of other elements; left out by default, as most users of it do
 */
export function createMadau1995(
  table: IntergalacticTable,
  { withMetals = false }: { readonly withMetals?: boolean } = {},
): IntergalacticMedium {
  requireTable(table, 'madau1995');
  const series = withMetals && table.metals ? [...table.lineSeries, table.metals] : table.lineSeries;
  return mediumOf(table, series, 'Madau 1995, ApJ 441, 18');
}

/** The rest wavelengths where transmission jumps, ascending: put two nodes on each, and straight lines do for the rest. */
export function forestNodesNm(medium: IntergalacticMedium): number[] {
  return [...medium.jumpsRestNm];
}

function requireTable(table: IntergalacticTable, id: IntergalacticTable['id']): void {
  if (table.id !== id) throw new OutOfDomainError('table.id', table.id, `"${id}"`);
}

function mediumOf(table: IntergalacticTable, lineSeries: readonly LineSeries[], source: string): IntergalacticMedium {
  return {
    id: table.id,
    source,
    jumpsRestNm: [...table.lineWavelengthsNm, table.lymanLimitNm].sort((a, b) => a - b),
    opticalDepth: (observedNm, redshift) => {
      requirePositive('observedNm', observedNm);
      requireRedshift(redshift);
      const inLines = lineOpticalDepth(table.lineWavelengthsNm, lineSeries, observedNm, redshift);
      const inContinuum = continuumOpticalDepth(table, observedNm, redshift);
      // The rounded coefficients of the damped systems sum to −1e-5 at the limit, where no line absorbs at low redshift.
      return Math.max(0, inLines + inContinuum);
    },
    onNodes: (restNm) => transmissionOnNodes(table, lineSeries, restNm),
  };
}

function lineOpticalDepth(
  wavelengthsNm: readonly number[],
  series: readonly LineSeries[],
  observedNm: number,
  redshift: number,
): number {
  let depth = 0;
  wavelengthsNm.forEach((lineNm, j) => {
    if (!(lineNm < observedNm && observedNm < lineNm * (1 + redshift))) return;
    for (const { branches } of series) {
      const branch = branches.find(({ ratioBelow }) => isBelow(observedNm, ratioBelow, lineNm));
      if (branch) depth += branch.coefficients[j]! * (observedNm / lineNm) ** branch.power;
    }
  });
  return depth;
}

function continuumOpticalDepth(
  { lymanLimitNm, continuum }: IntergalacticTable,
  observedNm: number,
  redshift: number,
): number {
  if (!(lymanLimitNm < observedNm && observedNm < lymanLimitNm * (1 + redshift))) return 0;
  let depth = 0;
  for (const series of continuum) {
    const branch = branchesAt(series, redshift).find(({ ratioBelow }) => isBelow(observedNm, ratioBelow, lymanLimitNm));
    for (const { coefficient, redshiftPower, ratioPower } of branch?.terms ?? []) {
      depth += coefficient * (1 + redshift) ** redshiftPower * (observedNm / lymanLimitNm) ** ratioPower;
    }
  }
  return depth;
}

function isBelow(observedNm: number, ratioBelow: number | null, restNm: number): boolean {
  return ratioBelow === null || observedNm < ratioBelow * restNm;
}
