import type { FieldError } from '@faintward/contracts/errors';
import type { SemesterInput } from '@faintward/contracts/semesters';
import { civilDateAt } from './semester-stage.js';

/** What is wrong with a semester as a whole, field by field: relations that no single field can be blamed for alone. */
export function faultsOf(semester: SemesterInput, siteTimeZone: string): FieldError[] {
  const faults: FieldError[] = [];
  const opensAt = new Date(semester.callOpensAt);
  const deadlineAt = new Date(semester.deadlineAt);
  if (opensAt >= deadlineAt) {
    faults.push({ path: 'deadlineAt', message: 'The deadline must come after the call opens.' });
  }
  if (semester.reviewsDueAt != null && new Date(semester.reviewsDueAt) <= deadlineAt) {
    faults.push({ path: 'reviewsDueAt', message: 'Reviews can be due only after the deadline for proposals.' });
  }
  if (civilDateAt(deadlineAt, siteTimeZone) > semester.startsOn) {
    faults.push({ path: 'startsOn', message: 'The semester cannot start before its deadline.' });
  }
  if (semester.endsOn < semester.startsOn) {
    faults.push({ path: 'endsOn', message: 'The semester cannot end before it starts.' });
  }
  faults.push(
    ...repeated(semester.criteria, (criterion) => criterion.criterionId).map((index) => ({
      path: `criteria.${index}.criterionId`,
      message: 'Another criterion has this name already.',
    })),
    ...repeated(semester.telescopes, (telescope) => telescope.telescopeId).map((index) => ({
      path: `telescopes.${index}.telescopeId`,
      message: 'This telescope is in the list already.',
    })),
  );
  return faults;
}

function repeated<Row>(rows: readonly Row[], keyOf: (row: Row) => string): number[] {
  const seen = new Set<string>();
  return rows.flatMap((row, index) => {
    const key = keyOf(row);
    if (seen.has(key)) return [index];
    seen.add(key);
    return [];
  });
}

/**
 * Prefixes for the labels of a semester's proposals, the first free one to be taken: year and month in which it begins,
 * "2710", and with a letter behind it where two semesters begin in one month.
 */
export function labelPrefixes(startsOn: string): string[] {
  const yearAndMonth = startsOn.slice(2, 4) + startsOn.slice(5, 7);
  return [yearAndMonth, ...[...'BCDEFGHIJKLMNOPQRSTUVWXYZ'].map((letter) => yearAndMonth + letter)];
}
