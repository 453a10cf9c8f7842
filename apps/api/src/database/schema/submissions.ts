import type { HoursByMoonClass, Observation, SubmittedContent, Target } from '@faintward/contracts';
import { boolean, index, integer, jsonb, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

/** Rows of a submission that are stored in parts: thousands in one document would keep the embedded database busy for seconds. */
export type PartKind = 'targets' | 'observations';

/** What was submitted without its long lists; those that were made before lists were stored in parts hold them too. */
export type StoredContent = Omit<SubmittedContent, PartKind> & Partial<Pick<SubmittedContent, PartKind>>;

/** What was submitted, frozen: the committee reads this, never the working copy. */
export const submissions = pgTable(
  'submissions',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    number: integer('number').notNull(),
    submittedAt: instant('submitted_at').notNull().defaultNow(),
    submittedBy: uuid('submitted_by')
      .notNull()
      .references(() => people.id),
    content: jsonb('content').$type<StoredContent>().notNull(),
    fingerprint: text('fingerprint').notNull(),
    requestedHours: jsonb('requested_hours').$type<HoursByMoonClass>().notNull(),
    targetCount: integer('target_count').notNull(),
    /** The newest one that was not withdrawn. */
    isCurrent: boolean('is_current').notNull().default(true),
  },
  (table) => [unique('submissions_number_unique').on(table.proposalId, table.number)],
);

/**
 * The targets and observations of a submission, some hundred a row. They are written before the submission that makes them
 * count, in transactions of their own, so that they do not reference it; those of a submission that came to nothing are
 * removed by the next one of the proposal.
 */
export const submissionParts = pgTable(
  'submission_parts',
  {
    submissionId: uuid('submission_id').notNull(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    kind: text('kind').$type<PartKind>().notNull(),
    ordinal: integer('ordinal').notNull(),
    content: jsonb('content').$type<Target[] | Observation[]>().notNull(),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.submissionId, table.kind, table.ordinal] }),
    index('submission_parts_proposal').on(table.proposalId),
  ],
);
