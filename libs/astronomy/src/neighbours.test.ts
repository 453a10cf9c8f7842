import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  angularSeparationArcsec,
  ArgumentOutOfRange,
  findCloseDuplicates,
  matchToCatalogue,
  type SkyPosition,
} from './index.js';

/** The obvious way: every pair. */
function nearestByEveryPair(positions: readonly SkyPosition[], radiusArcsec: number): Map<number, number> {
  const found = new Map<number, number>();
  positions.forEach((a, index) => {
    let nearest = Number.POSITIVE_INFINITY;
    positions.forEach((b, other) => {
      if (other !== index) nearest = Math.min(nearest, angularSeparationArcsec(a, b));
    });
    if (nearest <= radiusArcsec) found.set(index, nearest);
  });
  return found;
}

function around(raDeg: number, decDeg: number): fc.Arbitrary<SkyPosition> {
  const offset = fc.double({ min: -0.02, max: 0.02, noNaN: true });
  return fc
    .record({ raOffset: fc.oneof(offset, fc.double({ min: 0, max: 360, noNaN: true })), decOffset: offset })
    .map(({ raOffset, decOffset }) => ({
      raDeg: (raDeg + raOffset + 360) % 360,
      decDeg: Math.min(90, Math.max(-90, decDeg + decOffset)),
    }));
}

describe('close duplicates', () => {
  it('finds the same as comparing every pair: at 0h, at both poles and on the equator', () => {
    const places = fc.oneof(around(0, 0), around(0, 90), around(120, -90), around(30, 60));
    fc.assert(
      fc.property(fc.array(places, { maxLength: 60 }), fc.constantFrom(1, 20, 60), (positions, radiusArcsec) => {
        const expected = nearestByEveryPair(positions, radiusArcsec);
        const found = findCloseDuplicates(positions, radiusArcsec);
        expect(found.map((entry) => entry.index)).toEqual([...expected.keys()]);
        for (const entry of found)
          expect(entry.separationArcsec).toBeCloseTo(expected.get(entry.index) ?? Number.NaN, 6);
      }),
    );
  });

  it('names both of a pair across 0h and of a pair over the pole', () => {
    const positions = [
      { raDeg: 359.9999, decDeg: 10 },
      { raDeg: 0.0001, decDeg: 10 },
      { raDeg: 0, decDeg: 89.9999 },
      { raDeg: 180, decDeg: 89.9999 },
      { raDeg: 90, decDeg: -45 },
    ];
    expect(findCloseDuplicates(positions, 1).map(({ index, nearestIndex }) => [index, nearestIndex])).toEqual([
      [0, 1],
      [1, 0],
      [2, 3],
      [3, 2],
    ]);
  });

  it('names an identical place at separation 0, also with radius 0', () => {
    const positions = [
      { raDeg: 10, decDeg: -5 },
      { raDeg: 10, decDeg: -5 },
    ];
    expect(findCloseDuplicates(positions, 0)).toEqual([
      { index: 0, nearestIndex: 1, separationArcsec: 0 },
      { index: 1, nearestIndex: 0, separationArcsec: 0 },
    ]);
  });

  it('answers with one entry per target when thousands are at one place', () => {
    const positions = Array.from({ length: 5000 }, () => ({ raDeg: 150, decDeg: 2 }));
    const found = findCloseDuplicates(positions, 5);
    expect(found).toHaveLength(5000);
    expect(found.every((entry) => entry.separationArcsec === 0 && entry.nearestIndex !== entry.index)).toBe(true);
  });

  it('has nothing to say about an empty list or a single target', () => {
    expect(findCloseDuplicates([], 5)).toEqual([]);
    expect(findCloseDuplicates([{ raDeg: 1, decDeg: 1 }], 5)).toEqual([]);
  });

  it('refuses impossible radii and coordinates', () => {
    expect(() => findCloseDuplicates([], -1)).toThrow(ArgumentOutOfRange);
    expect(() => findCloseDuplicates([], Number.NaN)).toThrow(ArgumentOutOfRange);
    expect(() => findCloseDuplicates([{ raDeg: 1, decDeg: 91 }], 1)).toThrow(ArgumentOutOfRange);
    expect(() => findCloseDuplicates([{ raDeg: Number.NaN, decDeg: 1 }], 1)).toThrow(ArgumentOutOfRange);
  });
});

describe('matching to a catalogue', () => {
  it('names the nearest entry and may name a place itself', () => {
    const catalogue = [
      { raDeg: 10, decDeg: 0 },
      { raDeg: 10.0002, decDeg: 0 },
      { raDeg: 200, decDeg: 0 },
    ];
    const positions = [
      { raDeg: 10.00019, decDeg: 0 },
      { raDeg: 50, decDeg: 0 },
      { raDeg: 200, decDeg: 0 },
    ];
    const found = matchToCatalogue(positions, catalogue, 2);
    expect(found.map(({ index, nearestIndex }) => [index, nearestIndex])).toEqual([
      [0, 1],
      [2, 2],
    ]);
    expect(found[0]?.separationArcsec).toBeCloseTo(0.036, 9);
  });
});
