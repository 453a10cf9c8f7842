import { z } from 'zod';
import { Id, Instant } from './common.js';
import { Observation, TimeRequest } from './observations.js';
import { ProposalSection } from './proposals.js';
import { HoursByMoonClass } from './semesters.js';
import { Target } from './targets.js';

/** One finding of the checks before submission, linked to where it is mended. */
export const CheckFinding = z
  .object({
    code: z.string(),
    severity: z.enum(['blocking', 'warning']),
    message: z.string(),
    section: ProposalSection,
    targetId: Id.optional(),
    field: z.string().optional(),
  })
  .meta({ id: 'CheckFinding' });
export type CheckFinding = z.infer<typeof CheckFinding>;

export const CheckReport = z
  .object({
    checkedAt: Instant,
    canSubmit: z.boolean(),
    blockingCount: z.int(),
    warningCount: z.int(),
    findings: z.array(CheckFinding),
  })
  .meta({ id: 'CheckReport' });
export type CheckReport = z.infer<typeof CheckReport>;

/** The frozen content of a submission: every input and every number, with the versions that made them. */
export const SubmittedContent = z
  .object({
    title: z.string(),
    abstract: z.string(),
    keywords: z.array(z.string()),
    partnerName: z.string().nullable(),
    cosmology: z.unknown(),
    case: z.array(z.object({ sectionId: z.string(), title: z.string(), body: z.string() })),
    team: z.array(
      z.object({
        name: z.string(),
        institutionName: z.string().nullable(),
        isPrincipal: z.boolean(),
        hasSigned: z.boolean(),
      }),
    ),
    targets: z.array(Target),
    observations: z.array(Observation),
    timeRequest: TimeRequest,
    engineVersion: z.string(),
  })
  .meta({ id: 'SubmittedContent' });
export type SubmittedContent = z.infer<typeof SubmittedContent>;

export const SubmissionSummary = z
  .object({
    submissionId: Id,
    number: z.int(),
    submittedAt: Instant,
    submittedByName: z.string(),
    /** SHA-256 of the canonical content: what the receipt names. */
    fingerprint: z.string(),
    targetCount: z.int(),
    requestedHours: HoursByMoonClass,
    isCurrent: z.boolean(),
  })
  .meta({ id: 'SubmissionSummary' });
export type SubmissionSummary = z.infer<typeof SubmissionSummary>;
export const SubmissionList = z.object({ rows: z.array(SubmissionSummary) }).meta({ id: 'SubmissionList' });

export const Submission = SubmissionSummary.extend({ content: SubmittedContent }).meta({ id: 'Submission' });
export type Submission = z.infer<typeof Submission>;
