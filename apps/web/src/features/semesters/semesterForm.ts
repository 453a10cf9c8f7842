import { SemesterInput, type Semester, type SemesterPatch } from '@faintward/contracts/semesters';
import { z } from 'zod';

const date = z.iso.date({ error: 'A date, as 2027-10-01.' });
const instant = z.iso.datetime({ error: 'A date and time in UTC, as 2027-03-31 18:00.' });

/** The contract's schema, with words for what people type. */
export const SemesterForm = SemesterInput.extend({
  startsOn: date,
  endsOn: date,
  callOpensAt: instant,
  deadlineAt: instant,
  reviewsDueAt: instant.nullable().optional(),
  criteria: SemesterInput.shape.criteria.check(
    z.superRefine((criteria, context) => {
      for (const [index, criterion] of criteria.entries()) {
        if (criterion.title.trim() === '') {
          context.addIssue({ code: 'custom', path: [index, 'title'], message: 'Please fill this in.' });
        }
      }
    }),
  ),
});
export type SemesterFormInput = z.input<typeof SemesterForm>;

export const fieldWords: Record<keyof SemesterInput, string> = {
  name: 'Name',
  startsOn: 'First night',
  endsOn: 'Last night',
  callOpensAt: 'Call opens',
  deadlineAt: 'Deadline',
  reviewsDueAt: 'Reviews due',
  isAnonymised: 'Names',
  callText: 'Text of the call',
  criteria: 'Criteria',
  telescopes: 'Hours',
};

/** What the form holds of a stored semester. */
export function toForm(semester: Semester): SemesterInput {
  return {
    name: semester.name,
    startsOn: semester.startsOn,
    endsOn: semester.endsOn,
    callOpensAt: semester.callOpensAt,
    deadlineAt: semester.deadlineAt,
    reviewsDueAt: semester.reviewsDueAt,
    isAnonymised: semester.isAnonymised,
    callText: semester.callText,
    criteria: semester.criteria,
    telescopes: semester.telescopes.map(({ telescopeId, availableHours }) => ({ telescopeId, availableHours })),
  };
}

/** A new semester begins with what the newest one asked for; its dates are its own. */
export function emptyForm(newest: Semester | undefined): SemesterFormInput {
  const before = newest ? toForm(newest) : undefined;
  return {
    name: '',
    startsOn: '',
    endsOn: '',
    callOpensAt: '',
    deadlineAt: '',
    reviewsDueAt: null,
    isAnonymised: before?.isAnonymised ?? true,
    callText: '',
    criteria: before?.criteria ?? [newCriterion()],
    telescopes: before?.telescopes ?? [],
  };
}

export function newCriterion(): SemesterInput['criteria'][number] {
  return { criterionId: 'new', title: '', weight: 1, anchors: { low: '', middle: '', high: '' } };
}

/** Names within the data for criteria that have none yet, from their titles; those that reviews may refer to stay. */
export function withCriterionIds(
  criteria: SemesterInput['criteria'],
  stored: SemesterInput['criteria'],
): SemesterInput['criteria'] {
  const kept = new Set(stored.map((criterion) => criterion.criterionId));
  const taken = new Set(criteria.map((criterion) => criterion.criterionId).filter((id) => kept.has(id)));
  return criteria.map((criterion) => {
    if (kept.has(criterion.criterionId)) return criterion;
    const stem = idFromTitle(criterion.title);
    let criterionId = stem;
    for (let number = 2; taken.has(criterionId); number += 1) criterionId = `${stem}${number}`;
    taken.add(criterionId);
    return { ...criterion, criterionId };
  });
}

function idFromTitle(title: string): string {
  const words = title
    .normalize('NFKD')
    .replaceAll(/[\u0300-\u036f]/g, '')
    .toLowerCase()
    .split(/[^a-z0-9]+/)
    .filter((word) => word !== '');
  const joined = words.map((word, index) => (index === 0 ? word : word[0]?.toUpperCase() + word.slice(1))).join('');
  const id = joined.replace(/^[^a-z]+/, '').slice(0, 28);
  return id.length >= 2 ? id : 'criterion';
}

const keys = Object.keys(fieldWords) as (keyof SemesterInput)[];

/** Only what was changed: what a colleague changed meanwhile elsewhere stays. */
export function patchOf(base: SemesterInput, values: SemesterInput): SemesterPatch {
  return Object.fromEntries(
    keys.filter((key) => !isSame(base[key] ?? null, values[key] ?? null)).map((key) => [key, values[key] ?? null]),
  );
}

export function isSame(left: unknown, right: unknown): boolean {
  return JSON.stringify(canonical(left)) === JSON.stringify(canonical(right));
}

/** Keys in one order, and instants without their milliseconds, so that equal values read equal. */
function canonical(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(canonical);
  if (typeof value === 'string') return value.replace(/(T\d\d:\d\d:\d\d)\.000Z$/, '$1Z');
  if (typeof value !== 'object' || value === null) return value;
  return Object.fromEntries(
    Object.entries(value)
      .filter(([, one]) => one !== undefined)
      .toSorted(([a], [b]) => (a < b ? -1 : 1))
      .map(([key, one]) => [key, canonical(one)]),
  );
}

const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec'];

/** "Oct 2027 to Mar 2028"; undefined until both dates are there. */
export function nameFromDates(startsOn: string, endsOn: string): string | undefined {
  const [start, end] = [startsOn, endsOn].map((text) => {
    const month = date.safeParse(text).success ? months[Number(text.slice(5, 7)) - 1] : undefined;
    return month && `${month} ${text.slice(0, 4)}`;
  });
  return start && end ? `${start} to ${end}` : undefined;
}
