import fc from 'fast-check';
import { expect, it } from 'vitest';
import { intoLanes, spacedTicks, spreadLabels } from './labels';

const spans = fc.array(
  fc
    .tuple(fc.integer({ min: 0, max: 900 }), fc.integer({ min: 1, max: 120 }))
    .map(([from, width]) => ({ item: `${from}+${width}`, from, to: from + width })),
  { maxLength: 40 },
);

it('never lets two labels of a lane touch, and loses none', () => {
  fc.assert(
    fc.property(spans, fc.integer({ min: 1, max: 5 }), (list, laneCount) => {
      const { placed, leftOut } = intoLanes(list, laneCount);
      const apart = placed.every((one) =>
        placed.every(
          (other) => one === other || one.lane !== other.lane || one.from >= other.to + 4 || other.from >= one.to + 4,
        ),
      );
      return apart && placed.length + leftOut.length === list.length && placed.every((one) => one.lane < laneCount);
    }),
  );
});

it('uses one lane when nothing collides', () => {
  const { placed } = intoLanes(
    [
      { item: 'a', from: 0, to: 10 },
      { item: 'b', from: 20, to: 30 },
    ],
    3,
  );
  expect(placed.map((label) => label.lane)).toEqual([0, 0]);
});

it('moves labels apart and keeps their order', () => {
  const spread = spreadLabels([{ y: 50 }, { y: 52 }, { y: 51 }], 10, 200);
  expect(spread.map((label) => label.y)).toEqual([50, 65, 80]);
});

it('keeps the first tick of each crowd', () => {
  expect(spacedTicks([0, 1, 2, 10, 11, 30], (tick) => tick, 5)).toEqual([0, 10, 30]);
});
