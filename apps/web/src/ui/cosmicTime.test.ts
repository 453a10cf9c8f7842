import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { columnsOf, discRadius, roomForDiscs, spacedMarks, spreadDiscs, timeAxis } from './cosmicTime';

/** planck18, from the calculator. */
const places = [
  { redshift: 0, ageGyr: 13.787 },
  { redshift: 1, ageGyr: 5.851 },
  { redshift: 3, ageGyr: 2.144 },
  { redshift: 6, ageGyr: 0.929 },
  { redshift: 11, ageGyr: 0.414 },
];

describe('the axis', () => {
  it('is even in time while most targets are near, and in ln(1+z) when most lie beyond z 4', () => {
    const near = timeAxis(places.slice(1, 4), places, 13.787, 20, 820);
    expect(near.kind).toBe('time');
    expect(near.at(places[0]!)).toBeCloseTo(820);
    expect(near.at({ redshift: 0, ageGyr: 13.787 / 2 })).toBeCloseTo(420);
    const far = timeAxis(places.slice(3), places, 13.787, 20, 820);
    expect(far.kind).toBe('logarithm');
    expect(far.at(places[0]!)).toBeCloseTo(820);
    expect(far.at(places[4]!)).toBeGreaterThan(20);
    expect(far.at(places[3]!) - far.at(places[4]!)).toBeGreaterThan(100);
  });
  it('keeps marks apart', () => {
    const axis = timeAxis([], places, 13.787, 20, 320);
    const marks = spacedMarks(places, axis, 20, 40);
    expect(marks[0]?.redshift).toBe(0);
    marks.slice(1).forEach((mark, index) => expect(marks[index]!.x - mark.x).toBeGreaterThanOrEqual(40));
  });
});

it('says hours by area', () => {
  const whole = discRadius(8, 8, 5);
  expect(discRadius(2, 8, 5)).toBeCloseTo(whole / 2);
  expect(discRadius(null, 8, 5)).toBe(4);
  expect(discRadius(null, 0, 5)).toBe(5);
});

it('spreads discs that would cover each other, and leaves a lone one on the line', () => {
  expect(spreadDiscs([{ x: 10, radius: 6 }], 30)).toEqual({ offsets: [0], coveringCount: 0 });
  const {
    offsets: [one, two, three],
  } = spreadDiscs(
    [
      { x: 10, radius: 8 },
      { x: 11, radius: 5 },
      { x: 12, radius: 5 },
    ],
    40,
  );
  expect(one).toBe(0);
  expect(Math.sign(two!)).toBe(-Math.sign(three!));
});

it('never moves a disc beyond its reach, and lets discs cover each other only when it says so', () => {
  const discs = fc.array(fc.record({ x: fc.integer({ min: 0, max: 900 }), radius: fc.integer({ min: 3, max: 12 }) }), {
    maxLength: 60,
  });
  fc.assert(
    fc.property(discs, (list) => {
      const { offsets, coveringCount } = spreadDiscs(list, 36);
      const inReach = list.every(
        (disc, index) => Math.abs(offsets[index]!) + disc.radius <= 36 || offsets[index] === 0,
      );
      const covering = list.filter((disc, index) =>
        list.some(
          (other, otherIndex) =>
            otherIndex !== index &&
            Math.hypot(disc.x - other.x, offsets[index]! - offsets[otherIndex]!) <
              (disc.radius + other.radius) * 0.92 - 1e-9,
        ),
      );
      return inReach && (coveringCount > 0 || covering.length === 0);
    }),
  );
});

it('takes more room only when discs need it', () => {
  expect(roomForDiscs([{ x: 0, radius: 8 }]).reach).toBe(22);
  expect(roomForDiscs(Array.from({ length: 7 }, () => ({ x: 0, radius: 8 }))).reach).toBeGreaterThan(48);
});

it('counts every target of a crowd in a column', () => {
  const axis = timeAxis(places.slice(3), places, 13.787, 20, 820);
  const crowd = Array.from({ length: 500 }, (_, index) => ({ redshift: 5 + index / 200, ageGyr: 1 }));
  const columns = columnsOf(crowd, axis, 8);
  expect(columns.reduce((sum, column) => sum + column.count, 0)).toBe(500);
  expect(columns[0]!.redshift).toBeGreaterThan(columns.at(-1)!.redshift);
});
