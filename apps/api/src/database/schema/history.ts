import { index, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { instant, primaryId } from './columns.js';
import { people } from './people.js';

/** Append-only record of every change of a proposal, score, award, role or configuration: who, when, before, after. */
export const changes = pgTable(
  'changes',
  {
    id: primaryId(),
    at: instant('at').notNull().defaultNow(),
    personId: uuid('person_id').references(() => people.id),
    /** The object that access is decided on: a proposal, a panel, a person, a mode. */
    scope: text('scope').notNull(),
    scopeId: uuid('scope_id').notNull(),
    /** What changed within it: `target`, `observation`, `caseSection`, `review`, `award`, `roles`... */
    subject: text('subject').notNull(),
    subjectId: text('subject_id').notNull(),
    subjectName: text('subject_name').notNull().default(''),
    action: text('action').notNull(),
    /** Field by field: `{ redshift: { before: 6.1, after: 6.2 } }`. */
    details: jsonb('details').$type<Record<string, { before: unknown; after: unknown }>>().notNull(),
  },
  (table) => [
    index('changes_scope').on(table.scope, table.scopeId, table.at),
    index('changes_subject').on(table.subject, table.subjectId),
  ],
);
