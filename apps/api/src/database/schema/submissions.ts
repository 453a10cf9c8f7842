import type { HoursByMoonClass, SubmittedContent } from '@faintward/contracts';
import { boolean, integer, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, primaryId } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

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
    content: jsonb('content').$type<SubmittedContent>().notNull(),
    fingerprint: text('fingerprint').notNull(),
    requestedHours: jsonb('requested_hours').$type<HoursByMoonClass>().notNull(),
    targetCount: integer('target_count').notNull(),
    /** The newest one that was not withdrawn. */
    isCurrent: boolean('is_current').notNull().default(true),
  },
  (table) => [unique('submissions_number_unique').on(table.proposalId, table.number)],
);
