import { z } from 'zod';
import { CivilDate, Id, Instant, Version, line, prose } from './common.js';

export const MoonClass = z.enum(['dark', 'grey', 'bright']);
export type MoonClass = z.infer<typeof MoonClass>;

/** Hours of each moon class; a class that is not listed has none. */
export const HoursByMoonClass = z
  .object({ dark: z.number(), grey: z.number(), bright: z.number() })
  .meta({ id: 'HoursByMoonClass' });
export type HoursByMoonClass = z.infer<typeof HoursByMoonClass>;

export const Criterion = z
  .object({
    criterionId: z.string().regex(/^[a-z][a-zA-Z0-9]{1,30}$/),
    title: z.string(),
    /** Relative weight in a reviewer's overall score. */
    weight: z.number().gt(0).max(100),
    /** What the ends and the middle of the scale mean, printed beside the form. */
    anchors: z.object({ low: z.string(), middle: z.string(), high: z.string() }),
  })
  .meta({ id: 'Criterion' });
export type Criterion = z.infer<typeof Criterion>;

/** Where a semester stands, from its dates and decisions. */
export const SemesterStage = z.enum(['announced', 'open', 'reviewing', 'decided', 'observing', 'closed']);
export type SemesterStage = z.infer<typeof SemesterStage>;

export const TelescopeHours = z
  .object({ telescopeId: Id, telescopeName: z.string(), availableHours: HoursByMoonClass })
  .meta({ id: 'TelescopeHours' });

export const Semester = z
  .object({
    semesterId: Id,
    name: z.string(),
    startsOn: CivilDate,
    endsOn: CivilDate,
    callOpensAt: Instant,
    deadlineAt: Instant,
    /** When reviewers should have scored; a date to keep to, after which nothing closes by itself. */
    reviewsDueAt: Instant.nullable(),
    /** Scores and names are released, awards are told. */
    decidedAt: Instant.nullable(),
    stage: SemesterStage,
    isAnonymised: z.boolean(),
    callText: z.string(),
    siteTimeZone: z.string(),
    criteria: z.array(Criterion),
    telescopes: z.array(TelescopeHours),
    version: Version,
  })
  .meta({ id: 'Semester' });
export type Semester = z.infer<typeof Semester>;
export const SemesterList = z.object({ rows: z.array(Semester) }).meta({ id: 'SemesterList' });

export const SemesterInput = z
  .object({
    name: line(80),
    startsOn: CivilDate,
    endsOn: CivilDate,
    callOpensAt: Instant,
    deadlineAt: Instant,
    // No default: in a patch, a default would take back a date that the patch does not mention.
    reviewsDueAt: Instant.nullable().optional(),
    isAnonymised: z.boolean(),
    callText: prose(20_000),
    criteria: z.array(Criterion).min(1).max(12),
    telescopes: z.array(
      z.object({
        telescopeId: Id,
        availableHours: z.object({
          dark: z.number().min(0).max(5000),
          grey: z.number().min(0).max(5000),
          bright: z.number().min(0).max(5000),
        }),
      }),
    ),
  })
  .meta({ id: 'SemesterInput' });
export type SemesterInput = z.output<typeof SemesterInput>;
export const SemesterPatch = SemesterInput.partial().meta({ id: 'SemesterPatch' });
export type SemesterPatch = z.output<typeof SemesterPatch>;

/** The front page's answer: calls that are open or announced, soonest deadline first, and who shares out the time. */
export const OpenCalls = z
  .object({
    observatoryName: z.string(),
    siteTimeZone: z.string(),
    now: Instant,
    calls: z.array(Semester),
  })
  .meta({ id: 'OpenCalls' });
export type OpenCalls = z.infer<typeof OpenCalls>;
