import { expect, it } from 'vitest';
import { changeLines } from './changeWords';

it('names only the parts that differ, with what they were', () => {
  const light = { kind: 'apparentMagnitude', bandId: 'J', magnitude: 23.25, spectralSlopeBeta: -1.83 };
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
