import fc from 'fast-check';
import { expect, it } from 'vitest';
import { extent, linearTicks, logTicks, makeScale } from './scale';

it('puts ticks on round numbers inside the range', () => {
  expect(linearTicks(0, 1, 5)).toEqual([0, 0.2, 0.4, 0.6, 0.8, 1]);
  expect(linearTicks(-3, 14, 4)).toEqual([0, 5, 10]);
  expect(logTicks(10, 100_000, 5)).toEqual([10, 100, 1000, 10_000, 100_000]);
});

it('never ticks outside the range', () => {
  const range = fc.tuple(
    fc.double({ min: -1e6, max: 1e6, noNaN: true }),
    fc.double({ min: 1e-3, max: 1e6, noNaN: true }),
  );
  fc.assert(
    fc.property(range, fc.integer({ min: 2, max: 9 }), ([low, span], count) => {
      const slack = span * 1e-6;
      return linearTicks(low, low + span, count).every((tick) => tick >= low - slack && tick <= low + span + slack);
    }),
  );
});

it('maps the ends of the domain to the ends of the range, and leaves ≤ 0 out of a logarithmic axis', () => {
  const scale = makeScale('log', [1, 100], [0, 200], 3);
  expect([scale(1), scale(10), scale(100)]).toEqual([0, 100, 200]);
  expect(Number.isFinite(scale(0))).toBe(false);
  expect(scale(-1)).toBeNaN();
});

it('widens an extent of one value and survives none', () => {
  expect(extent([5])).toEqual([2.5, 7.5]);
  expect(extent([])).toEqual([0, 1]);
  expect(extent([NaN, -1, 3], true)).toEqual([1.5, 6]);
});
