import type { SemesterStage } from '@faintward/contracts/semesters';

export interface SemesterDates {
  callOpensAt: Date;
  deadlineAt: Date;
  decidedAt: Date | null;
  /** First and last civil date, in the site's time zone. */
  startsOn: string;
  endsOn: string;
}

/**
 * Where a semester stands at `now`. Undecided, it stays in review even when its own nights have begun: without awards there
 * is nothing to observe.
 */
export function stageOf(semester: SemesterDates, siteTimeZone: string, now: Date): SemesterStage {
  if (now < semester.callOpensAt) return 'announced';
  if (now < semester.deadlineAt) return 'open';
  if (semester.decidedAt === null || now < semester.decidedAt) return 'reviewing';
  const today = civilDateAt(now, siteTimeZone);
  if (today < semester.startsOn) return 'decided';
  return today <= semester.endsOn ? 'observing' : 'closed';
}

/** The date on the wall calendar of a time zone, `YYYY-MM-DD`. */
export function civilDateAt(instant: Date, timeZone: string): string {
  const parts = new Intl.DateTimeFormat('en-GB', { timeZone, year: 'numeric', month: '2-digit', day: '2-digit' })
    .formatToParts(instant)
    .map(({ type, value }) => [type, value] as const);
  const { year, month, day } = Object.fromEntries(parts) as Record<'year' | 'month' | 'day', string>;
  return `${year}-${month}-${day}`;
}
