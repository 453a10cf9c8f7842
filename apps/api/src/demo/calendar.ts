import type { SemesterKey } from './demo-data.js';

const DAY_MS = 86_400_000;
const MONTHS = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

export interface SemesterDates {
  /** "Oct 2027 to Mar 2028". */
  name: string;
  /** Year and month of the first night, "2710": sorts by time and says nothing else. */
  labelPrefix: string;
  startsOn: string;
  endsOn: string;
  callOpensAt: Date;
  deadlineAt: Date;
  reviewsDueAt: Date;
  decidedAt: Date | null;
}

/** First month of each semester, counted from the month of `now`; each lasts six months. */
const FIRST_MONTH: Record<SemesterKey, number> = { running: -4, reviewing: 2, open: 8 };

/** Days from `now` to each step. An evening's hour at the site, whatever the hour the demo is opened at. */
const STEPS: Record<SemesterKey, { opens: number; deadline: number; due: number; decided: number | null }> = {
  running: { opens: -302, deadline: -258, due: -214, decided: -189 },
  reviewing: { opens: -88, deadline: -43, due: 9, decided: null },
  open: { opens: -26, deadline: 12, due: 66, decided: null },
};
const STEP_HOUR_UTC = 20;

/**
 * The dates of a demo semester as seen from `now`: one is being observed, one is in review, one is open, on whatever day the
 * demo begins.
 */
export function semesterDates(key: SemesterKey, now: Date): SemesterDates {
  const first = firstOfMonth(now, FIRST_MONTH[key]);
  const last = new Date(firstOfMonth(now, FIRST_MONTH[key] + 6).getTime() - DAY_MS);
  const steps = STEPS[key];
  return {
    name: `${monthName(first)} to ${monthName(last)}`,
    labelPrefix: civilDate(first).slice(2, 7).replace('-', ''),
    startsOn: civilDate(first),
    endsOn: civilDate(last),
    callOpensAt: eveningOf(now, steps.opens),
    deadlineAt: eveningOf(now, steps.deadline),
    reviewsDueAt: eveningOf(now, steps.due),
    decidedAt: steps.decided === null ? null : eveningOf(now, steps.decided),
  };
}

/** `now`, moved by whole or broken days. */
export function daysFrom(now: Date, days: number): Date {
  return new Date(now.getTime() + days * DAY_MS);
}

/** The middle of a semester. */
export function middleOf(dates: Pick<SemesterDates, 'startsOn' | 'endsOn'>): Date {
  return new Date((Date.parse(dates.startsOn) + Date.parse(dates.endsOn)) / 2);
}

function firstOfMonth(now: Date, monthsLater: number): Date {
  return new Date(Date.UTC(now.getUTCFullYear(), now.getUTCMonth() + monthsLater, 1));
}

function eveningOf(now: Date, daysLater: number): Date {
  return new Date(Date.UTC(now.getUTCFullYear(), now.getUTCMonth(), now.getUTCDate() + daysLater, STEP_HOUR_UTC));
}

function monthName(date: Date): string {
  return `${MONTHS[date.getUTCMonth()] ?? ''} ${date.getUTCFullYear()}`;
}

function civilDate(date: Date): string {
  return date.toISOString().slice(0, 10);
}
