import { expect, it } from 'vitest';
import { changeText, infeasibleText, whatDependsText } from './words';

const chosen = {
  cosmologyId: 'planck18',
  title: 'Planck 2018',
  isChosen: true,
  medianDeltaDistanceModulusMag: 0,
  largestDeltaDistanceModulusMag: 0,
  medianScaleRatio: 1,
  requestedSeconds: 36_000,
  infeasibleCount: 1,
  changedObservationCount: 0,
};
const other = { ...chosen, cosmologyId: 'conv70', isChosen: false };

it('says a change in time with its sign, its part and where', () => {
  expect(changeText({ ...other, requestedSeconds: 33_120, changedObservationCount: 4 }, chosen)).toBe(
    '−48 min (−8.0 %), in 4 observations',
  );
  expect(changeText({ ...other, requestedSeconds: 36_900, changedObservationCount: 1 }, chosen)).toBe(
    '+15 min (+2.5 %), in 1 observation',
  );
  expect(changeText(other, chosen)).toBe('none');
  expect(changeText(chosen, chosen)).toBe('as asked');
});

it('says what becomes infeasible or feasible', () => {
  expect(infeasibleText({ ...other, infeasibleCount: 3 }, chosen)).toBe('2 observations newly infeasible');
  expect(infeasibleText({ ...other, infeasibleCount: 0 }, chosen)).toBe('1 observation feasible instead');
  expect(infeasibleText(chosen, chosen)).toBe('1 observation not feasible');
});

it('says that an apparent brightness does not depend on the cosmology', () => {
  const base = { observationCount: 5, rows: [] };
  expect(whatDependsText({ ...base, targetCount: 5, apparentCount: 5, intrinsicCount: 0 })).toMatch(
    /^All targets are given by their apparent/,
  );
  const mixed = whatDependsText({ ...base, targetCount: 5, apparentCount: 4, intrinsicCount: 1 });
  expect(mixed).toMatch(/^4 targets are given by their apparent brightness\./);
  expect(mixed).toMatch(/1 target is given by what it emits/);
  expect(whatDependsText({ ...base, targetCount: 2, apparentCount: 0, intrinsicCount: 2 })).toMatch(
    /^2 targets are given by what they emit/,
  );
  expect(whatDependsText({ ...base, targetCount: 3, apparentCount: 2, intrinsicCount: 0 })).not.toMatch(/emit/);
});
