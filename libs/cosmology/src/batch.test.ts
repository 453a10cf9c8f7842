import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { distanceRows, luminosityDistancesMpc, type DistanceRow } from './batch.js';
import { createCosmology, MAX_REDSHIFT } from './cosmology.js';
import { createDistanceTable, type TableZone } from './distance-table.js';
import { AntipodeError, OutOfDomainError } from './errors.js';
import type { CosmologyParameters } from './parameters.js';

const base = { hubbleConstantKmSMpc: 70, omegaMatter: 0.3 };
/** The models of the reference set, and some that strain the tables. */
const models: Record<string, CosmologyParameters | 'planck18' | 'planck15' | 'wmap9' | 'conv70' | 'ladder73'> = {
  planck18: 'planck18',
  planck15: 'planck15',
  wmap9: 'wmap9',
  conv70: 'conv70',
  ladder73: 'ladder73',
  'flat w = −0.9': { ...base, w0: -0.9 },
  'flat w0 = −0.9, wa = 0.2': { ...base, w0: -0.9, wa: 0.2 },
  'massless neutrinos': { ...base, cmbTemperatureK: 2.725, effectiveNeutrinoCount: 3.04 },
  'Einstein–de Sitter': { ...base, omegaMatter: 1, omegaDarkEnergy: 0 },
  empty: { ...base, omegaMatter: 0, omegaDarkEnergy: 0 },
  'de Sitter': { ...base, omegaMatter: 0, omegaDarkEnergy: 1 },
  open: { ...base, omegaDarkEnergy: 0 },
  closed: { ...base, omegaDarkEnergy: 0.9 },
  'heavy neutrinos': { ...base, cmbTemperatureK: 2.7255, effectiveNeutrinoCount: 3.046, neutrinoMassesEv: [1, 2, 3] },
  'radiation alone': { ...base, omegaMatter: 0, cmbTemperatureK: 20, omegaDarkEnergy: 0.5, effectiveNeutrinoCount: 3 },
  loitering: { ...base, omegaDarkEnergy: 1.7 },
};

/** Bound stated in the doc comment of luminosityDistancesMpc. */
const DISTANCE_BOUND = 2e-12;
/** Bound stated in the doc comment of distanceRows. */
const ROW_BOUND = 1e-11;

/** Redshifts at, just below and just above some sixty cell edges of a zone. */
function edgesOf({ start, cellsPerUnit, lastRedshift, comoving }: TableZone): number[] {
  const cells = comoving.length / 8;
  const redshifts: number[] = [];
  for (let i = 0; i <= cells; i += cells / 64) {
    const edge = (1 - start - i / cellsPerUnit) ** -2 - 1;
    redshifts.push(edge * (1 - 1e-15), edge, edge * (1 + 1e-15));
  }
  return redshifts.filter((z) => z >= 0 && z <= lastRedshift);
}

/** The ends of everything, and a spread over the whole range. */
const spread = [0, 1e-300, 1e-12, 1e-9, 1e-6, 1e-4, 30 * (1 - 1e-15), 30, 30 * (1 + 1e-15), 1100, MAX_REDSHIFT];
for (let exponent = -6; exponent < 4; exponent += 0.12) spread.push(10 ** exponent);

describe.each(Object.entries(models))('batch of %s', (_name, source) => {
  const model = createCosmology(source);
  const table = createDistanceTable(model.expansion, MAX_REDSHIFT)!;
  const redshifts = Float64Array.from([...spread, ...edgesOf(table.near), ...edgesOf(table.far)]);

  it('gives the scalar luminosity distances, at the edges of its cells too', () => {
    const antipode = model.antipodeRedshift() ?? Infinity;
    const inReach = redshifts.filter((z) => z < antipode);
    const batch = luminosityDistancesMpc(model, inReach);
    inReach.forEach((z, i) => {
      const scalar = model.luminosityDistanceMpc(z);
      // Towards the antipode the sine goes through zero; what is kept there is the absolute accuracy.
      const steepness = antipode < Infinity ? antipode / (antipode - z) : 1;
      const error = scalar === 0 ? batch[i]! : Math.abs(batch[i]! / scalar - 1);
      expect(error, `z = ${z}: ${batch[i]} against ${scalar}`).toBeLessThan(DISTANCE_BOUND * steepness);
    });
  });

  it('gives rows equal to the scalar functions', () => {
    const inReach = redshifts.filter((z) => z < 0.9 * (model.antipodeRedshift() ?? Infinity));
    const rows = distanceRows(model, inReach);
    rows.forEach((row, i) => {
      const z = inReach[i]!;
      const age = model.ageGyr(z);
      const expected: DistanceRow = {
        redshift: z,
        comovingDistanceMpc: model.comovingDistanceMpc(z),
        transverseComovingDistanceMpc: model.transverseComovingDistanceMpc(z),
        angularDiameterDistanceMpc: model.angularDiameterDistanceMpc(z),
        luminosityDistanceMpc: model.luminosityDistanceMpc(z),
        distanceModulusMag: model.distanceModulusMag(z),
        kpcPerArcsec: model.kpcPerArcsec(z),
        comovingVolumeMpc3: model.comovingVolumeMpc3(z),
        lookbackTimeGyr: model.lookbackTimeGyr(z),
        ageGyr: age === Infinity ? undefined : age,
        hubbleKmSMpc: model.hubbleKmSMpc(z),
        criticalDensityGCm3: model.criticalDensityGCm3(z),
      };
      expect(Object.keys(row)).toEqual(Object.keys(expected));
      for (const key of Object.keys(expected) as (keyof DistanceRow)[]) {
        const want = expected[key];
        const got = row[key];
        if (want === undefined || want === 0) expect(got, `${key} at z = ${z}`).toBe(want);
        else if (key === 'distanceModulusMag') expect(Math.abs(got! - want), key).toBeLessThan(ROW_BOUND);
        else expect(Math.abs(got! / want - 1), `${key} at z = ${z}`).toBeLessThan(ROW_BOUND);
      }
    });
  });
});

describe('batches', () => {
  const model = createCosmology('planck18');

  it('equal the scalar for random redshifts, in order and length', () => {
    const redshift = fc.double({ min: -4, max: Math.log10(20), noNaN: true }).map((exponent) => 10 ** exponent);
    fc.assert(
      fc.property(fc.array(redshift, { maxLength: 40 }), (list) => {
        const batch = luminosityDistancesMpc(model, Float64Array.from(list));
        expect(batch).toHaveLength(list.length);
        list.forEach((z, i) => {
          expect(Math.abs(batch[i]! / model.luminosityDistanceMpc(z) - 1)).toBeLessThan(DISTANCE_BOUND);
        });
      }),
    );
  });

  it('write into an array that is handed in, and refuse one that is too short', () => {
    const redshifts = Float64Array.of(1, 2);
    const result = new Float64Array(2);
    expect(luminosityDistancesMpc(model, redshifts, result)).toBe(result);
    expect(result[1]).toBeGreaterThan(result[0]!);
    expect(() => luminosityDistancesMpc(model, redshifts, new Float64Array(1))).toThrow(OutOfDomainError);
  });

  it('name the element that is out of range', () => {
    for (const bad of [-1, NaN, Infinity, 1e9]) {
      expect(() => luminosityDistancesMpc(model, Float64Array.of(1, 2, bad))).toThrow(/redshifts\[2\]/);
      expect(() => distanceRows(model, [1, bad])).toThrow(/redshifts\[1\]/);
    }
    expect(() => distanceRows(model, ['2' as unknown as number])).toThrow(OutOfDomainError);
    expect(distanceRows(model, [])).toEqual([]);
  });

  it('refuse the antipode of a closed universe like the scalar', () => {
    const closed = createCosmology({ ...base, omegaMatter: 0.2, omegaDarkEnergy: 1.5 });
    const beyond = closed.antipodeRedshift()! * 1.001;
    expect(() => luminosityDistancesMpc(closed, Float64Array.of(beyond))).toThrow(AntipodeError);
    expect(() => distanceRows(closed, [beyond])).toThrow(AntipodeError);
  });

  it('stay as right as rounding allows in a universe that nearly stood still', () => {
    const edge = 4 * 0.3 * Math.cosh(Math.acosh(0.7 / 0.3) / 3) ** 3;
    for (const distance of [1e-6, 1e-5, 1e-4, 1e-3]) {
      const nearly = createCosmology({ ...base, omegaDarkEnergy: edge - distance });
      const reach = nearly.antipodeRedshift() ?? Infinity;
      const redshifts = Float64Array.of(0.1, 0.5, 0.9, 1, 1.1, 1.3, 1.5, 2).filter((z) => z < 0.95 * reach);
      expect(redshifts.length).toBeGreaterThan(2);
      const batch = luminosityDistancesMpc(nearly, redshifts);
      const rows = distanceRows(nearly, redshifts);
      redshifts.forEach((z, i) => {
        const tolerance = 2e-12 + 1e-14 / nearly.expansion.leastPurity;
        expect(Math.abs(batch[i]! / nearly.luminosityDistanceMpc(z) - 1)).toBeLessThan(tolerance);
        expect(Math.abs(rows[i]!.ageGyr! / nearly.ageGyr(z) - 1)).toBeLessThan(tolerance);
      });
    }
  });
});
