import { z } from 'zod';
import { Id, Instant, Version, prose } from './common.js';
import { Criterion, HoursByMoonClass, MoonClass } from './semesters.js';
import { SubmittedContent } from './submissions.js';

/** A score: 0 to 10 in half steps, higher is better. */
export const Score = z
  .number({ error: 'A score is a number from 0 to 10.' })
  .min(0, { error: 'Scores run from 0 to 10.' })
  .max(10, { error: 'Scores run from 0 to 10.' })
  .multipleOf(0.5, { error: 'Scores go in half steps.' });

/** An answer on one criterion: a score, or "cannot judge", which differs from not having answered. */
export const ScoreAnswer = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('score'), score: Score }),
  z.object({ kind: z.literal('cannotJudge') }),
]);
export type ScoreAnswer = z.infer<typeof ScoreAnswer>;

export const ReviewState = z.enum(['toRead', 'begun', 'complete', 'conflict']);
export type ReviewState = z.infer<typeof ReviewState>;

/** One entry of a reviewer's reading list. A conflicted proposal keeps its place only as a count, never by name. */
export const ReadingListEntry = z
  .object({
    proposalId: Id,
    label: z.string(),
    title: z.string(),
    panelId: Id,
    panelName: z.string(),
    semesterName: z.string(),
    isLead: z.boolean(),
    state: ReviewState,
    overallScore: z.number().nullable(),
    requestedHours: HoursByMoonClass,
    targetCount: z.int(),
    updatedAt: Instant.nullable(),
  })
  .meta({ id: 'ReadingListEntry' });
export type ReadingListEntry = z.infer<typeof ReadingListEntry>;
export const ReadingList = z
  .object({ rows: z.array(ReadingListEntry), conflictCount: z.int(), reviewsDueAt: Instant.nullable() })
  .meta({ id: 'ReadingList' });
export type ReadingList = z.infer<typeof ReadingList>;

export const Review = z
  .object({
    proposalId: Id,
    label: z.string(),
    panelId: Id,
    panelName: z.string(),
    semesterName: z.string(),
    isAnonymised: z.boolean(),
    isLead: z.boolean(),
    /** Team and institutions are left out in an anonymised semester. */
    content: SubmittedContent.extend({ team: SubmittedContent.shape.team.nullable() }),
    criteria: z.array(Criterion),
    answers: z.record(z.string(), ScoreAnswer),
    commentToPrincipal: z.string(),
    confidentialComment: z.string(),
    state: ReviewState,
    /** Weighted over the criteria that were scored; null before the first. */
    overallScore: z.number().nullable(),
    canEdit: z.boolean(),
    version: Version,
    updatedAt: Instant.nullable(),
  })
  .meta({ id: 'Review' });
export type Review = z.infer<typeof Review>;

/** What saving answers: all but the proposal's content, which does not change under a reviewer's hands and may be large. */
export const SavedReview = Review.omit({ content: true }).meta({ id: 'SavedReview' });
export type SavedReview = z.infer<typeof SavedReview>;

export const ReviewInput = z
  .object({
    answers: z.record(z.string().max(40), ScoreAnswer.nullable()),
    commentToPrincipal: prose(10_000),
    confidentialComment: prose(10_000),
  })
  .partial()
  .meta({ id: 'ReviewInput' });
export type ReviewInput = z.output<typeof ReviewInput>;

export const ConflictKind = z.enum(['team', 'institution', 'declared']);
export type ConflictKind = z.infer<typeof ConflictKind>;
export const ConflictDeclaration = z
  .object({ reason: prose(1000).min(3, { error: 'Say in a few words what connects you.' }) })
  .meta({ id: 'ConflictDeclaration' });
export type ConflictDeclaration = z.output<typeof ConflictDeclaration>;

/* ---- Panels, for the chair ---- */

export const PanelMember = z
  .object({
    personId: Id,
    name: z.string(),
    institutionName: z.string().nullable(),
    role: z.enum(['member', 'chair']),
    assignedCount: z.int(),
    completeCount: z.int(),
    conflictCount: z.int(),
  })
  .meta({ id: 'PanelMember' });

export const PanelProposal = z
  .object({
    proposalId: Id,
    label: z.string(),
    title: z.string(),
    requestedHours: HoursByMoonClass,
    reviewers: z.array(z.object({ personId: Id, name: z.string(), isLead: z.boolean(), state: ReviewState })),
    /** Members who cannot be assigned, for which kind of reason. */
    conflictedPersonIds: z.array(Id),
  })
  .meta({ id: 'PanelProposal' });

export const Panel = z
  .object({
    panelId: Id,
    name: z.string(),
    semesterId: Id,
    semesterName: z.string(),
    isFinal: z.boolean(),
    members: z.array(PanelMember),
    proposals: z.array(PanelProposal),
    /** Proposals of the panel that the chair may not see, for a conflict. */
    hiddenCount: z.int(),
  })
  .meta({ id: 'Panel' });
export type Panel = z.infer<typeof Panel>;

export const Assignment = z
  .object({ proposalId: Id, personId: Id, isLead: z.boolean().default(false) })
  .meta({ id: 'Assignment' });
export type Assignment = z.output<typeof Assignment>;

/** Spread the reviews evenly over members without a conflict. */
export const AutomaticAssignment = z
  .object({ reviewersPerProposal: z.int().min(1).max(20) })
  .meta({ id: 'AutomaticAssignment' });
export type AutomaticAssignment = z.output<typeof AutomaticAssignment>;
export const AutomaticAssignmentResult = z
  .object({
    assignedCount: z.int(),
    shortProposalLabels: z.array(z.string()),
    reviewsPerMember: z.object({ least: z.int(), most: z.int() }),
  })
  .meta({ id: 'AutomaticAssignmentResult' });

/* ---- Ranking and awards ---- */

export const AwardStanding = z.enum(['firm', 'flexible', 'filler']);
export type AwardStanding = z.infer<typeof AwardStanding>;

export const Award = z
  .object({
    hours: z.number(),
    moonClass: MoonClass,
    standing: AwardStanding,
    reason: z.string(),
    version: Version,
  })
  .meta({ id: 'Award' });
export type Award = z.infer<typeof Award>;

export const AwardInput = z
  .object({
    hours: z.number({ error: 'Hours are a number.' }).min(0, { error: 'Hours cannot be negative.' }).max(5000),
    moonClass: MoonClass,
    standing: AwardStanding,
    reason: prose(4000).default(''),
  })
  .meta({ id: 'AwardInput' });
export type AwardInput = z.output<typeof AwardInput>;

export const RankingRow = z
  .object({
    proposalId: Id,
    label: z.string(),
    title: z.string(),
    partnerName: z.string().nullable(),
    /** Shared by equal means; null without a score. */
    rank: z.int().nullable(),
    meanScore: z.number().nullable(),
    /** Sample standard deviation; null below two scores. */
    spread: z.number().nullable(),
    lowestScore: z.number().nullable(),
    highestScore: z.number().nullable(),
    scoreCount: z.int(),
    assignedCount: z.int(),
    requestedHours: HoursByMoonClass,
    requestedTotalHours: z.number(),
    /** Down to and including this row: awarded hours where decided, requested hours where not. */
    cumulatedHours: HoursByMoonClass,
    /** Above the line where the hours of a class that it needs run out. */
    isAboveCut: z.boolean(),
    /** The moon class whose hours run out at this row, if any. */
    exhaustedMoonClass: MoonClass.nullable(),
    award: Award.nullable(),
    scores: z.array(z.object({ reviewerName: z.string(), score: z.number() })),
  })
  .meta({ id: 'RankingRow' });
export type RankingRow = z.infer<typeof RankingRow>;

export const Ranking = z
  .object({
    panelId: Id,
    panelName: z.string(),
    semesterId: Id,
    semesterName: z.string(),
    isFinal: z.boolean(),
    availableHours: HoursByMoonClass,
    awardedHours: HoursByMoonClass,
    requestedHours: HoursByMoonClass,
    /** Rows that stand above the cut; the line is drawn after them. Null when everything fits. */
    cutAfterRow: z.int().nullable(),
    rows: z.array(RankingRow),
    reviewers: z.array(
      z.object({
        name: z.string(),
        meanScore: z.number().nullable(),
        scoreCount: z.int(),
        leniency: z.number().nullable(),
      }),
    ),
    hiddenCount: z.int(),
    method: z.string(),
  })
  .meta({ id: 'Ranking' });
export type Ranking = z.infer<typeof Ranking>;
