import { transverseFactor, volumeFactor } from './curvature.js';
import { distanceModulusFromMpc, MAX_REDSHIFT, type Cosmology } from './cosmology.js';
import { createDistanceTable, STRIDE, type DistanceTable } from './distance-table.js';
import { OutOfDomainError } from './errors.js';

/** Tables by model: made at the first batch, gone with the model. `null`: the model is not fit for one. */
const tables = new WeakMap<Cosmology, DistanceTable | null>();

function tableOf(cosmology: Cosmology): DistanceTable | null {
  let table = tables.get(cosmology);
  if (table === undefined) {
    table = createDistanceTable(cosmology.expansion, MAX_REDSHIFT) ?? null;
    tables.set(cosmology, table);
  }
  return table;
}

function refuse(redshift: number, index: number): never {
  throw new OutOfDomainError(`redshifts[${index}]`, redshift, { minimum: 0, maximum: MAX_REDSHIFT });
}

/**
 * Luminosity distances in Mpc of many redshifts.
 *
 * Equals `cosmology.luminosityDistanceMpc` element by element within 2e-12 relative (piecewise polynomials, made once per model);
 * close to the antipode of a closed universe, where the distance goes to zero, that grows.
 * About 10 ns per value up to z = 30 where the model is flat.
 *
 * @param redshifts  any order, repetitions allowed
 * @param result  where to write; a new array if left out
 * @returns `result`, same length and order as `redshifts`
 * @throws {OutOfDomainError} naming the first element outside 0 ≤ z ≤ MAX_REDSHIFT
 * @throws {AntipodeError} at and beyond the antipode of a closed universe
 */
export function luminosityDistancesMpc(
  cosmology: Cosmology,
  redshifts: Float64Array,
  result: Float64Array = new Float64Array(redshifts.length),
): Float64Array {
  if (result.length < redshifts.length) {
    throw new OutOfDomainError('result.length', result.length, { minimum: redshifts.length, maximum: Infinity });
  }
  const table = tableOf(cosmology);
  const scale = cosmology.hubbleDistanceMpc;
  const curvature = cosmology.omegaCurvature;
  // Nearly every value falls into the near zone: its table stays in the processor's fastest cache, and its v starts at 0.
  const limit = table ? table.near.lastRedshift : -1;
  const coefficients = table?.near.comoving ?? new Float64Array(0);
  const cellsPerUnit = table?.near.cellsPerUnit ?? 0;
  for (let i = 0; i < redshifts.length; i++) {
    const z = redshifts[i]!;
    if (!(z >= 0 && z <= limit)) {
      if (!(z >= 0 && z <= MAX_REDSHIFT)) refuse(z, i);
      result[i] = table ? tableRow(cosmology, table, z).luminosityDistanceMpc : cosmology.luminosityDistanceMpc(z);
      continue;
    }
    const s = 1 + z;
    const position = (z / (s + Math.sqrt(s))) * cellsPerUnit;
    const cell = position | 0;
    const comoving = polynomial(coefficients, cell << 3, position - cell);
    if (curvature === 0) {
      result[i] = scale * comoving * s;
    } else {
      const q = curvature * comoving * comoving;
      // Close to the antipode the slow path decides, and words the error.
      result[i] = q > -9.8 ? scale * comoving * transverseFactor(q) * s : cosmology.luminosityDistanceMpc(z);
    }
  }
  return result;
}

/** Eight coefficients from `at` on, ascending powers of t; in pairs and fours, so that the processor can do them side by side. */
function polynomial(c: Float64Array, at: number, t: number): number {
  const t2 = t * t;
  const low = c[at]! + t * c[at + 1]! + t2 * (c[at + 2]! + t * c[at + 3]!);
  const high = c[at + 4]! + t * c[at + 5]! + t2 * (c[at + 6]! + t * c[at + 7]!);
  return low + t2 * t2 * high;
}

/** One row of {@link distanceRows}. */
export interface DistanceRow {
  readonly redshift: number;
  readonly comovingDistanceMpc: number;
  readonly transverseComovingDistanceMpc: number;
  readonly angularDiameterDistanceMpc: number;
  readonly luminosityDistanceMpc: number;
  /** Undefined at z = 0. */
  readonly distanceModulusMag: number | undefined;
  /** Undefined at z = 0. */
  readonly kpcPerArcsec: number | undefined;
  readonly comovingVolumeMpc3: number;
  readonly lookbackTimeGyr: number;
  /** Undefined in a universe without a beginning. */
  readonly ageGyr: number | undefined;
  readonly hubbleKmSMpc: number;
  readonly criticalDensityGCm3: number;
}

/**
 * Distances, scale, volume, times and densities of many redshifts.
 *
 * Each field equals the method of the same name within 1e-11 relative (modulus 1e-11 mag). About 2 µs per row.
 *
 * @returns one row per redshift, same order
 * @throws {OutOfDomainError} naming the first element outside 0 ≤ z ≤ MAX_REDSHIFT
 * @throws {AntipodeError} at and beyond the antipode of a closed universe
 */
export function distanceRows(cosmology: Cosmology, redshifts: ArrayLike<number>): DistanceRow[] {
  const table = tableOf(cosmology);
  const rows: DistanceRow[] = [];
  for (let i = 0; i < redshifts.length; i++) {
    const z = redshifts[i]!;
    if (!(typeof z === 'number' && z >= 0 && z <= MAX_REDSHIFT)) refuse(z, i);
    rows.push(table ? tableRow(cosmology, table, z) : directRow(cosmology, z));
  }
  return rows;
}

/** The slow, obvious way. */
function directRow(cosmology: Cosmology, redshift: number): DistanceRow {
  const age = cosmology.ageGyr(redshift);
  return {
    redshift,
    comovingDistanceMpc: cosmology.comovingDistanceMpc(redshift),
    transverseComovingDistanceMpc: cosmology.transverseComovingDistanceMpc(redshift),
    angularDiameterDistanceMpc: cosmology.angularDiameterDistanceMpc(redshift),
    luminosityDistanceMpc: cosmology.luminosityDistanceMpc(redshift),
    distanceModulusMag: cosmology.distanceModulusMag(redshift),
    kpcPerArcsec: cosmology.kpcPerArcsec(redshift),
    comovingVolumeMpc3: cosmology.comovingVolumeMpc3(redshift),
    lookbackTimeGyr: cosmology.lookbackTimeGyr(redshift),
    ageGyr: age === Infinity ? undefined : age,
    hubbleKmSMpc: cosmology.hubbleKmSMpc(redshift),
    criticalDensityGCm3: cosmology.criticalDensityGCm3(redshift),
  };
}

const KPC_PER_ARCSEC_AND_MPC = (1e3 * Math.PI) / 648000;

function tableRow(cosmology: Cosmology, table: DistanceTable, redshift: number): DistanceRow {
  const s = 1 + redshift;
  const zone = redshift <= table.near.lastRedshift ? table.near : table.far;
  const position = (redshift / (s + Math.sqrt(s)) - zone.start) * zone.cellsPerUnit;
  // The first redshift of the far zone may come out a rounding error before its start.
  const cell = Math.max(0, Math.trunc(position));
  const at = cell * STRIDE;
  const inCell = position - cell;
  const comoving = polynomial(zone.comoving, at, inCell);
  const q = cosmology.omegaCurvature * comoving * comoving;
  if (q <= -9.8) return directRow(cosmology, redshift);
  const comovingDistanceMpc = cosmology.hubbleDistanceMpc * comoving;
  const transverse = comovingDistanceMpc * transverseFactor(q);
  const squaredRate = cosmology.expansion.squaredRate(s);
  return {
    redshift,
    comovingDistanceMpc,
    transverseComovingDistanceMpc: transverse,
    angularDiameterDistanceMpc: transverse / s,
    luminosityDistanceMpc: transverse * s,
    distanceModulusMag: transverse === 0 ? undefined : distanceModulusFromMpc(transverse * s),
    kpcPerArcsec: transverse === 0 ? undefined : (transverse / s) * KPC_PER_ARCSEC_AND_MPC,
    comovingVolumeMpc3: 4 * Math.PI * comovingDistanceMpc ** 3 * volumeFactor(q),
    lookbackTimeGyr: cosmology.hubbleTimeGyr * polynomial(zone.lookback, at, inCell),
    ageGyr: zone.age ? cosmology.hubbleTimeGyr * polynomial(zone.age, at, inCell) : undefined,
    hubbleKmSMpc: cosmology.parameters.hubbleConstantKmSMpc * Math.sqrt(squaredRate),
    criticalDensityGCm3: cosmology.criticalDensityTodayGCm3 * squaredRate,
  };
}
