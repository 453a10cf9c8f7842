import type { ConflictKind } from '@faintward/contracts';
import { boolean, index, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId } from './columns.js';
import { panels } from './panels.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

/**
 * Who must not see which proposal. Rows are found by rule (team, institution) when a proposal is submitted, or declared;
 * a conflict is never deleted, only withdrawn with a reason.
 */
export const conflicts = pgTable(
  'conflicts',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    kind: text('kind').$type<ConflictKind>().notNull(),
    reason: text('reason').notNull().default(''),
    createdAt: createdAt(),
    withdrawnAt: instant('withdrawn_at'),
  },
  (table) => [
    unique('conflicts_kind_unique').on(table.proposalId, table.personId, table.kind),
    index('conflicts_person').on(table.personId),
  ],
);

export const assignments = pgTable(
  'assignments',
  {
    id: primaryId(),
    panelId: uuid('panel_id')
      .notNull()
      .references(() => panels.id),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    isLead: boolean('is_lead').notNull().default(false),
    createdAt: createdAt(),
  },
  (table) => [
    unique('assignments_unique').on(table.proposalId, table.personId),
    index('assignments_person').on(table.personId),
    index('assignments_panel').on(table.panelId),
  ],
);
