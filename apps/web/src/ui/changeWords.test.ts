import { expect, it } from 'vitest';
import { changeLines } from './changeWords';

it('names only the parts that differ, with what they were', () => {
  const light = {
    kind: 'apparentMagnitude',
    bandId: 'J',
    magnitude: 23.25,
    spectrum: { kind: 'powerLaw', slopeBeta: -1.83 },
  };
  expect(changeLines([{ field: 'light', before: light, after: { ...light, magnitude: 22.96 } }])).toEqual([
    { label: 'light, magnitude', before: '23.25', after: '22.96' },
  ]);
});

it('writes instants, signs and absences for people', () => {
  expect(
    changeLines([
      { field: 'signedAt', before: null, after: '2026-11-30T01:07:09.446Z' },
      { field: 'declinationDeg', before: -4.1, after: 4.1 },
      { field: 'keywords', before: ['a', 'b'], after: [] },
    ]),
  ).toEqual([
    { label: 'signed', before: '—', after: '2026-11-30 01:07 UTC' },
    { label: 'declination (deg)', before: '−4.1', after: '4.1' },
    { label: 'keywords', before: 'a, b', after: '—' },
  ]);
});

it('names the parts of a spectrum and of what happens on the way', () => {
  const light = { spectrum: { kind: 'powerLaw', slopeBeta: -2 }, galacticDust: null };
  const after = { spectrum: { kind: 'powerLaw', slopeBeta: -1.5 }, galacticDust: { colourExcessMag: 0.03 } };
  expect(changeLines([{ field: 'light', before: light, after }])).toEqual([
    { label: 'light, spectrum, slope β', before: '−2', after: '−1.5' },
    { label: 'light, Galactic dust, E(B−V)', before: '—', after: '0.03' },
  ]);
});

it('counts the numbers of a table, and says so when another table of the same length took its place', () => {
  const table = Array.from({ length: 60 }, (_, index) => index / 10);
  expect(
    changeLines([
      { field: 'redshiftUncertainty', before: null, after: { kind: 'table', redshifts: table } },
      { field: 'densities', before: table, after: table.toReversed() },
      { field: 'same', before: table, after: [...table] },
    ]),
  ).toEqual([
    { label: 'uncertainty of the redshift, kind', before: '—', after: 'table' },
    { label: 'uncertainty of the redshift, redshifts', before: '—', after: '60 numbers' },
    { label: 'densities', before: '60 numbers', after: '60 numbers, others' },
  ]);
});
