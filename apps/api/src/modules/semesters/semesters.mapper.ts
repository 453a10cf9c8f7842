import type { Semester } from '@faintward/contracts/semesters';
import type { SemesterDetails } from './semesters.read-model.js';

export function toSemester(semester: SemesterDetails): Semester {
  return {
    semesterId: semester.semesterId,
    name: semester.name,
    startsOn: semester.startsOn,
    endsOn: semester.endsOn,
    callOpensAt: semester.callOpensAt.toISOString(),
    deadlineAt: semester.deadlineAt.toISOString(),
    reviewsDueAt: semester.reviewsDueAt?.toISOString() ?? null,
    decidedAt: semester.decidedAt?.toISOString() ?? null,
    stage: semester.stage,
    isAnonymised: semester.isAnonymised,
    callText: semester.callText,
    siteTimeZone: semester.siteTimeZone,
    criteria: semester.criteria,
    telescopes: semester.telescopes,
    version: semester.version,
  };
}
