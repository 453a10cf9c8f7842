import type { DistanceRow, DistancesResponse } from '@faintward/contracts/distances';
import { expect, it } from 'vitest';
import { lightReport } from '../../testing/lightReportExample';
import { againstFirst, angleArcsec, curveChoices, curveOf, curvesOf } from './curves';
import { readState, writeState } from './calculatorState';

const model = (id: string, rows: Partial<DistanceRow>[]): DistancesResponse => ({
  cosmology: { id, title: id.toUpperCase(), source: null },
  engineVersion: '0',
  notices: [],
  rows: rows.map((row) => ({ ...lightReport.distances, ...row })),
});
const a = model('a', [
  { redshift: 0, luminosityDistanceMpc: 0, distanceModulusMag: null },
  { redshift: 7, luminosityDistanceMpc: 70_492, distanceModulusMag: 49.2407 },
]);
const b = model('b', [
  { redshift: 0, luminosityDistanceMpc: 0, distanceModulusMag: null },
  { redshift: 7, luminosityDistanceMpc: 69_021, distanceModulusMag: 49.1949 },
]);

it('draws every quantity of the calculator, and what is only of use together', () => {
  const ids = curveChoices.map((choice) => choice.id);
  expect(new Set(ids).size).toBe(ids.length);
  for (const field of [
    'bolometricDimmingMag',
    'perFrequencyDimmingMag',
    'perWavelengthDimmingMag',
    'photonRateDimmingMag',
  ])
    expect(ids).toContain(field);
  expect(curveOf('scale').id).toBe('kpcPerArcsec');
  expect(curveOf('nonsense').id).toBe('distances');
});

it('compares distances by ratio and moduli by difference, and nothing at z = 0', () => {
  const [distance] = againstFirst(curveOf('luminosityDistanceMpc'), [a, b], 1);
  expect(distance?.values).toEqual([
    { x: 0, y: null },
    { x: 7, y: 69_021 / 70_492 },
  ]);
  const [modulus] = againstFirst(curveOf('distanceModulusMag'), [a, b], 1);
  expect(modulus?.values[0]).toEqual({ x: 0, y: null });
  expect(modulus?.values[1]?.y).toBeCloseTo(-0.0458, 4);
});

it('leaves out redshifts that two cosmologies do not share', () => {
  const [curve] = againstFirst(curveOf('ageGyr'), [a, model('c', [{ redshift: 3 }, { redshift: 7 }])], 1);
  expect(curve?.values.map((value) => value.x)).toEqual([7]);
});

it('an angle is a length over the scale, and has no bound at z = 0', () => {
  // The half-light radius of 0.569 kpc at z = 7 in planck18: 0.1066″.
  expect(angleArcsec(lightReport.distances, 0.569)).toBeCloseTo(0.1066, 4);
  expect(angleArcsec({ kpcPerArcsec: 0 }, 1)).toBeNull();
  expect(curvesOf(curveOf('angle'), [a], 10)[0]?.values[1]?.y).toBeCloseTo(10 / 5.339957, 6);
});

it('the address holds the curve, the length, the cosmologies beside and how they are compared', () => {
  const state = {
    ...readState(new URLSearchParams('z=7')),
    curve: 'angle',
    sizeKpc: '2.5',
    beside: ['wmap9', 'ladder73'] as const,
    against: true,
  };
  expect(readState(writeState(state))).toEqual(state);
});

it('an old link still compares with the conventional model, or does not', () => {
  expect(readState(new URLSearchParams('z=1')).beside).toEqual(['conv70']);
  expect(readState(new URLSearchParams('z=1&compare=no')).beside).toEqual([]);
  expect(readState(new URLSearchParams('z=1&beside=wmap9.nonsense')).beside).toEqual(['wmap9']);
});
