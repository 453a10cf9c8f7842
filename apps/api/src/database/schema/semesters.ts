import type { Criterion } from '@faintward/contracts';
import { boolean, date, doublePrecision, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId, updatedAt, version } from './columns.js';
import { sites, telescopes } from './facilities.js';

export const semesters = pgTable('semesters', {
  id: primaryId(),
  siteId: uuid('site_id')
    .notNull()
    .references(() => sites.id),
  /** Named by its months: "Oct 2027 to Mar 2028". */
  name: text('name').notNull().unique(),
  /** First part of the labels of its proposals: "2710". */
  labelPrefix: text('label_prefix').notNull().unique(),
  startsOn: date('starts_on').notNull(),
  endsOn: date('ends_on').notNull(),
  callOpensAt: instant('call_opens_at').notNull(),
  deadlineAt: instant('deadline_at').notNull(),
  reviewsDueAt: instant('reviews_due_at'),
  decidedAt: instant('decided_at'),
  isAnonymised: boolean('is_anonymised').notNull().default(true),
  callText: text('call_text').notNull().default(''),
  criteria: jsonb('criteria').$type<Criterion[]>().notNull(),
  createdAt: createdAt(),
  updatedAt: updatedAt(),
  version: version(),
});

/** Hours that a semester shares out on a telescope, by moon class. */
export const semesterHours = pgTable(
  'semester_hours',
  {
    semesterId: uuid('semester_id')
      .notNull()
      .references(() => semesters.id),
    telescopeId: uuid('telescope_id')
      .notNull()
      .references(() => telescopes.id),
    darkHours: doublePrecision('dark_hours').notNull(),
    greyHours: doublePrecision('grey_hours').notNull(),
    brightHours: doublePrecision('bright_hours').notNull(),
  },
  (table) => [primaryKey({ columns: [table.semesterId, table.telescopeId] })],
);
