import type { PanelRole } from '@faintward/contracts';
import { index, integer, pgTable, primaryKey, text, unique, uuid } from 'drizzle-orm/pg-core';
import { instant, primaryId } from './columns.js';
import { people } from './people.js';
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
  (table) => [
    primaryKey({ columns: [table.panelId, table.personId] }),
    index('panel_members_person').on(table.personId),
  ],
);
