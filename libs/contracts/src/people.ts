import { z } from 'zod';
import { Id, Instant, ListQuery, Version, pageOf } from './common.js';

export const Institution = z
  .object({
    institutionId: Id,
    name: z.string(),
    country: z.string(),
    partnerId: Id.nullable(),
    partnerName: z.string().nullable(),
  })
  .meta({ id: 'Institution' });
export type Institution = z.infer<typeof Institution>;
export const InstitutionList = z.object({ rows: z.array(Institution) }).meta({ id: 'InstitutionList' });

/** What any signed-in person may know of another: enough to invite them. */
export const PersonSummary = z
  .object({ personId: Id, name: z.string(), institutionName: z.string().nullable() })
  .meta({ id: 'PersonSummary' });
export type PersonSummary = z.infer<typeof PersonSummary>;

export const PeopleSearchQuery = z.object({ search: z.string().trim().min(2).max(100) });
export const PeopleSearchResult = z.object({ rows: z.array(PersonSummary) }).meta({ id: 'PeopleSearchResult' });

/** What an administrator sees of a person. */
export const PersonRecord = z
  .object({
    personId: Id,
    email: z.string(),
    name: z.string(),
    institutionName: z.string().nullable(),
    isStaff: z.boolean(),
    isAdministrator: z.boolean(),
    panelNames: z.array(z.string()),
    createdAt: Instant,
    lastSignInAt: Instant.nullable(),
    version: Version,
  })
  .meta({ id: 'PersonRecord' });
export type PersonRecord = z.infer<typeof PersonRecord>;
export const PersonPage = pageOf(PersonRecord).meta({ id: 'PersonPage' });
export const PeopleListQuery = ListQuery;

export const PersonRolesPatch = z
  .object({ isStaff: z.boolean(), isAdministrator: z.boolean() })
  .partial()
  .meta({ id: 'PersonRolesPatch' });
export type PersonRolesPatch = z.output<typeof PersonRolesPatch>;

/** One entry of the audit trail: that something changed, never the science text itself. */
export const AuditEntry = z
  .object({
    changeId: Id,
    at: Instant,
    personName: z.string().nullable(),
    subject: z.string(),
    subjectId: z.string(),
    action: z.string(),
    summary: z.string(),
  })
  .meta({ id: 'AuditEntry' });
export type AuditEntry = z.infer<typeof AuditEntry>;
export const AuditPage = pageOf(AuditEntry).meta({ id: 'AuditPage' });

export const OutgoingMailEntry = z
  .object({
    mailId: Id,
    createdAt: Instant,
    sentAt: Instant.nullable(),
    to: z.string(),
    subject: z.string(),
    state: z.enum(['waiting', 'sent', 'failed']),
    attempts: z.int(),
    lastError: z.string().nullable(),
  })
  .meta({ id: 'OutgoingMailEntry' });
export type OutgoingMailEntry = z.infer<typeof OutgoingMailEntry>;
export const OutgoingMailPage = pageOf(OutgoingMailEntry).meta({ id: 'OutgoingMailPage' });
