import type { ConflictKind, PanelRole } from '@faintward/contracts';
import { boolean, index, integer, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';
import { semesters } from './semesters.js';

export const panels = pgTable(
  'panels',
  {
    id: primaryId(),
    semesterId: uuid('semester_id')
      .notNull()
      .references(() => semesters.id),
    name: text('name').notNull(),
    /** Set when the chair finalises: scores and awards are closed from then on. */
    finalisedAt: instant('finalised_at'),
    finalisedBy: uuid('finalised_by').references(() => people.id),
    position: integer('position').notNull().default(0),
  },
  (table) => [unique('panels_name_unique').on(table.semesterId, table.name)],
);

export const panelMembers = pgTable(
  'panel_members',
  {
    panelId: uuid('panel_id')
      .notNull()
      .references(() => panels.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    role: text('role').$type<PanelRole>().notNull(),
  },
  (table) => [primaryKey({ columns: [table.panelId, table.personId] }), index('panel_members_person').on(table.personId)],
);

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
