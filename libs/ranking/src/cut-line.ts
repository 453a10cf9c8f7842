export type MoonClass = 'dark' | 'grey' | 'bright';

export const moonClasses: readonly MoonClass[] = ['dark', 'grey', 'bright'];

export type HoursByMoonClass = Readonly<Record<MoonClass, number>>;

export interface CutLineInput {
  /** Hours asked for. */
  readonly requestedHours: HoursByMoonClass;
  /** Hours given; all zero for a proposal that was declined. Absent while nothing is decided: then the requested hours count. */
  readonly awardedHours?: HoursByMoonClass;
}

export interface CutLineRow {
  /** Hours that count for this row: awarded where decided, else requested. */
  readonly countedHours: HoursByMoonClass;
  /** Down to and including this row. */
  readonly cumulatedHours: HoursByMoonClass;
  /** Moon classes that this row needs and whose cumulated hours exceed what is available, in the order dark, grey, bright. */
  readonly exhaustedMoonClasses: readonly MoonClass[];
  readonly isAboveCut: boolean;
}

export interface CutLine {
  /** Same length and order as the input. */
  readonly rows: readonly CutLineRow[];
  /** Index of the first row whose hours do not fit, so the number of rows above the line; undefined if everything fits. */
  readonly cutIndex: number | undefined;
  /** Available minus all counted hours; negative where more is wanted than there is. */
  readonly remainingHours: HoursByMoonClass;
}

/**
 * Where the hours run out, going down a ranking.
 *
 * Each moon class has its own hours, and they are not exchanged: a row is below the cut if some class that it needs is used up by the rows down to and including it. The line itself stands before the
 * first such row; a later row that needs only other classes may still be above. A row that needs no hours is always above. Hours within a millionth of an hour count as equal.
 *
 * @param rows in rank order, best first
 * @throws {RangeError} if hours are negative or not finite
 */
export function cutLine(rows: readonly CutLineInput[], availableHours: HoursByMoonClass): CutLine {
  requireHours(availableHours, 'available');
  let cumulated: HoursByMoonClass = { dark: 0, grey: 0, bright: 0 };
  const result = rows.map((row, index): CutLineRow => {
    const countedHours = row.awardedHours ?? row.requestedHours;
    requireHours(countedHours, `of row ${index + 1}`);
    cumulated = combineHours(cumulated, countedHours, (a, b) => a + b);
    const cumulatedHours = cumulated;
    const exhaustedMoonClasses = moonClasses.filter(
      (moonClass) => countedHours[moonClass] > 0 && cumulatedHours[moonClass] > availableHours[moonClass] + equalHours,
    );
    return { countedHours, cumulatedHours, exhaustedMoonClasses, isAboveCut: exhaustedMoonClasses.length === 0 };
  });
  const cutIndex = result.findIndex((row) => !row.isAboveCut);
  return {
    rows: result,
    cutIndex: cutIndex === -1 ? undefined : cutIndex,
    remainingHours: combineHours(availableHours, cumulated, (a, b) => a - b),
  };
}

const equalHours = 1e-6;

function combineHours(
  a: HoursByMoonClass,
  b: HoursByMoonClass,
  combine: (a: number, b: number) => number,
): HoursByMoonClass {
  return { dark: combine(a.dark, b.dark), grey: combine(a.grey, b.grey), bright: combine(a.bright, b.bright) };
}

function requireHours(hours: HoursByMoonClass, whose: string): void {
  for (const moonClass of moonClasses) {
    const value = hours[moonClass];
    if (!(value >= 0 && Number.isFinite(value)))
      throw new RangeError(`The ${moonClass} hours ${whose} are ${value}; they must be 0 or more.`);
  }
}
