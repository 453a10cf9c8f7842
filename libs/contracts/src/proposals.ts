import { z } from 'zod';
import { Id, Instant, ListQuery, Version, line, pageOf, prose } from './common.js';
import { CosmologyChoice } from './cosmology.js';
import { TeamAccess } from './permissions.js';
import { HoursByMoonClass } from './semesters.js';

export const ProposalState = z.enum(['draft', 'submitted', 'inReview', 'awarded', 'declined', 'withdrawn']);
export type ProposalState = z.infer<typeof ProposalState>;

/** The sections of a proposal, in the order of the chain. */
export const ProposalSection = z.enum(['targets', 'exposures', 'time', 'case', 'team', 'submit']);
export type ProposalSection = z.infer<typeof ProposalSection>;

/** What a section holds or still lacks, for the chain at the head of the page. */
export const SectionStatus = z.object({
  section: ProposalSection,
  isComplete: z.boolean(),
  /** "5 targets", "1 of 4 unsigned". */
  summary: z.string(),
  isLacking: z.boolean(),
});
export type SectionStatus = z.infer<typeof SectionStatus>;

/** What the signed-in person may do with this proposal now; the server decides again on every request. */
export const ProposalAbilities = z.object({
  canEditTargets: z.boolean(),
  canEditEverything: z.boolean(),
  canManageTeam: z.boolean(),
  canSubmit: z.boolean(),
  canWithdraw: z.boolean(),
});
export type ProposalAbilities = z.infer<typeof ProposalAbilities>;

export const ProposalSummary = z
  .object({
    proposalId: Id,
    /** Short label given by the observatory, such as "2710-014". */
    label: z.string(),
    title: z.string(),
    state: ProposalState,
    semesterId: Id,
    semesterName: z.string(),
    deadlineAt: Instant,
    principalName: z.string(),
    myAccess: TeamAccess,
    isPrincipal: z.boolean(),
    targetCount: z.int(),
    requestedHours: HoursByMoonClass,
    lacking: z.array(z.string()),
    latestChange: z.object({ at: Instant, personName: z.string().nullable(), summary: z.string() }).nullable(),
    updatedAt: Instant,
  })
  .meta({ id: 'ProposalSummary' });
export type ProposalSummary = z.infer<typeof ProposalSummary>;
export const ProposalPage = pageOf(ProposalSummary).meta({ id: 'ProposalPage' });
export const ProposalListQuery = ListQuery.extend({ semesterId: Id.optional(), state: ProposalState.optional() });
export type ProposalListQuery = z.output<typeof ProposalListQuery>;

export const Proposal = z
  .object({
    proposalId: Id,
    label: z.string(),
    title: z.string(),
    abstract: z.string(),
    keywords: z.array(z.string()),
    state: ProposalState,
    semesterId: Id,
    semesterName: z.string(),
    deadlineAt: Instant,
    siteTimeZone: z.string(),
    panelId: Id.nullable(),
    panelName: z.string().nullable(),
    partnerId: Id.nullable(),
    partnerName: z.string().nullable(),
    cosmology: CosmologyChoice,
    principalName: z.string(),
    sections: z.array(SectionStatus),
    requestedHours: HoursByMoonClass,
    award: z.object({ hours: z.number(), moonClass: z.string(), standing: z.string(), reason: z.string() }).nullable(),
    abilities: ProposalAbilities,
    version: Version,
    updatedAt: Instant,
  })
  .meta({ id: 'Proposal' });
export type Proposal = z.infer<typeof Proposal>;

export const NewProposal = z.object({ semesterId: Id, title: line(200) }).meta({ id: 'NewProposal' });
export type NewProposal = z.output<typeof NewProposal>;

export const ProposalPatch = z
  .object({
    title: line(200),
    abstract: prose(5000),
    keywords: z.array(line(60)).max(12),
    panelId: Id.nullable(),
    partnerId: Id.nullable(),
    cosmology: CosmologyChoice,
  })
  .partial()
  .meta({ id: 'ProposalPatch' });
export type ProposalPatch = z.output<typeof ProposalPatch>;

/** What a proposal may be put under: the semester's panels and the partners whose time it may use. */
export const ProposalChoices = z
  .object({
    panels: z.array(z.object({ panelId: Id, name: z.string() })),
    partners: z.array(z.object({ partnerId: Id, name: z.string() })),
  })
  .meta({ id: 'ProposalChoices' });
export type ProposalChoices = z.infer<typeof ProposalChoices>;

/* ---- Case: the text ---- */

export const CaseSectionId = z.enum(['science', 'technical', 'background']);
export type CaseSectionId = z.infer<typeof CaseSectionId>;

export const CaseSection = z
  .object({
    sectionId: CaseSectionId,
    title: z.string(),
    guidance: z.string(),
    isRequired: z.boolean(),
    wordLimit: z.int(),
    wordCount: z.int(),
    body: z.string(),
    version: Version,
    updatedAt: Instant.nullable(),
    updatedByName: z.string().nullable(),
  })
  .meta({ id: 'CaseSection' });
export type CaseSection = z.infer<typeof CaseSection>;
export const CaseSectionList = z.object({ rows: z.array(CaseSection) }).meta({ id: 'CaseSectionList' });
export const CaseSectionInput = z.object({ body: prose(60_000) }).meta({ id: 'CaseSectionInput' });
export type CaseSectionInput = z.output<typeof CaseSectionInput>;

/* ---- Team ---- */

export const TeamMember = z
  .object({
    memberId: Id,
    personId: Id.nullable(),
    name: z.string(),
    institutionName: z.string().nullable(),
    access: TeamAccess,
    isPrincipal: z.boolean(),
    signedAt: Instant.nullable(),
    isMe: z.boolean(),
    version: Version,
  })
  .meta({ id: 'TeamMember' });
export type TeamMember = z.infer<typeof TeamMember>;
export const TeamMemberList = z.object({ rows: z.array(TeamMember) }).meta({ id: 'TeamMemberList' });

export const NewTeamMember = z.object({ personId: Id, access: TeamAccess }).meta({ id: 'NewTeamMember' });
export type NewTeamMember = z.output<typeof NewTeamMember>;
export const TeamMemberPatch = z.object({ access: TeamAccess }).meta({ id: 'TeamMemberPatch' });
export type TeamMemberPatch = z.output<typeof TeamMemberPatch>;

/* ---- History ---- */

/** `subjectId` narrows it to what became of one thing, such as one target. */
export const ProposalHistoryQuery = ListQuery.extend({ subjectId: Id.optional() });
export type ProposalHistoryQuery = z.output<typeof ProposalHistoryQuery>;

export const ProposalChange = z
  .object({
    changeId: Id,
    at: Instant,
    personName: z.string().nullable(),
    subject: z.string(),
    subjectName: z.string(),
    action: z.enum(['created', 'changed', 'removed', 'imported', 'submitted', 'withdrawn', 'signed']),
    changes: z.array(z.object({ field: z.string(), before: z.unknown(), after: z.unknown() })),
  })
  .meta({ id: 'ProposalChange' });
export type ProposalChange = z.infer<typeof ProposalChange>;
export const ProposalChangePage = pageOf(ProposalChange).meta({ id: 'ProposalChangePage' });
