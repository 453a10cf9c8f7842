import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { cutLine, moonClasses, type CutLineInput, type HoursByMoonClass } from './index.js';

function hours(dark: number, grey = 0, bright = 0): HoursByMoonClass {
  return { dark, grey, bright };
}

function asking(dark: number, grey = 0, bright = 0): CutLineInput {
  return { requestedHours: hours(dark, grey, bright) };
}

describe('cut line', () => {
  it('stands before the first row whose hours do not fit', () => {
    const { rows, cutIndex, remainingHours } = cutLine([asking(10), asking(15), asking(6), asking(1)], hours(30));
    expect(cutIndex).toBe(2);
    expect(rows.map(({ isAboveCut }) => isAboveCut)).toEqual([true, true, false, false]);
    expect(rows.map(({ cumulatedHours }) => cumulatedHours.dark)).toEqual([10, 25, 31, 32]);
    expect(rows[2]?.exhaustedMoonClasses).toEqual(['dark']);
    expect(remainingHours).toEqual(hours(-2));
  });

  it('lets a row that fits exactly stand above, also when its hours add up with rounding', () => {
    expect(cutLine([asking(0.1), asking(0.2)], hours(0.3)).cutIndex).toBeUndefined();
  });

  it('keeps the moon classes apart', () => {
    const { rows, cutIndex } = cutLine(
      [asking(10, 0, 5), asking(10), asking(0, 0, 5), asking(1, 1, 1)],
      hours(15, 20, 20),
    );
    expect(cutIndex).toBe(1);
    expect(rows.map(({ isAboveCut }) => isAboveCut)).toEqual([true, false, true, false]);
    expect(rows[3]?.exhaustedMoonClasses).toEqual(['dark']);
  });

  it('counts awarded hours where decided, and none for a declined row', () => {
    const given = [
      { requestedHours: hours(20), awardedHours: hours(12) },
      { requestedHours: hours(50), awardedHours: hours(0) },
      asking(10),
      asking(10),
    ];
    const { rows, cutIndex } = cutLine(given, hours(30));
    expect(rows.map(({ cumulatedHours }) => cumulatedHours.dark)).toEqual([12, 12, 22, 32]);
    expect(rows[1]?.isAboveCut).toBe(true);
    expect(cutIndex).toBe(3);
  });

  it('follows an award into another moon class', () => {
    const { rows } = cutLine([{ requestedHours: hours(20), awardedHours: hours(0, 18) }], hours(10, 20));
    expect(rows[0]).toMatchObject({ isAboveCut: true, cumulatedHours: hours(0, 18) });
  });

  it('says that everything fits, also when there is nothing', () => {
    expect(cutLine([], hours(30))).toEqual({ rows: [], cutIndex: undefined, remainingHours: hours(30) });
    expect(cutLine([asking(0)], hours(0)).cutIndex).toBeUndefined();
  });

  it('refuses negative and missing hours', () => {
    expect(() => cutLine([asking(-1)], hours(10))).toThrow(/of row 1/);
    expect(() => cutLine([], hours(Number.NaN))).toThrow(/available/);
  });

  it('never has more above the line with fewer hours available', () => {
    const someHours = fc.record({ dark: fc.nat(50), grey: fc.nat(50), bright: fc.nat(50) });
    fc.assert(
      fc.property(fc.array(someHours, { maxLength: 20 }), someHours, (requests, available) => {
        const rows = requests.map((requestedHours) => ({ requestedHours }));
        const more = { dark: available.dark + 10, grey: available.grey + 10, bright: available.bright + 10 };
        const tight = cutLine(rows, available);
        const loose = cutLine(rows, more);
        expect(tight.cutIndex ?? rows.length).toBeLessThanOrEqual(loose.cutIndex ?? rows.length);
        // What stands above the line in unbroken order fits into the hours of every class.
        const last = tight.rows[(tight.cutIndex ?? rows.length) - 1];
        if (last)
          for (const moonClass of moonClasses)
            if (last.countedHours[moonClass] > 0)
              expect(last.cumulatedHours[moonClass]).toBeLessThanOrEqual(available[moonClass]);
      }),
    );
  });
});
