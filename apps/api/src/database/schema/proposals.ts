import type { CaseSectionId, CosmologyChoice, ProposalState, TeamAccess } from '@faintward/contracts';
import { sql } from 'drizzle-orm';
import {
  boolean,
  index,
  integer,
  jsonb,
  pgTable,
  primaryKey,
  text,
  unique,
  uniqueIndex,
  uuid,
} from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId, updatedAt, version } from './columns.js';
import { panels } from './panels.js';
import { partners, people } from './people.js';
import { semesters } from './semesters.js';

export const proposals = pgTable(
  'proposals',
  {
    id: primaryId(),
    semesterId: uuid('semester_id')
      .notNull()
      .references(() => semesters.id),
    /** Running number in its semester; the label is made of the semester's prefix and this. */
    number: integer('number').notNull(),
    title: text('title').notNull(),
    abstract: text('abstract').notNull().default(''),
    keywords: text('keywords')
      .array()
      .notNull()
      .default(sql`'{}'::text[]`),
    state: text('state').$type<ProposalState>().notNull().default('draft'),
    panelId: uuid('panel_id').references(() => panels.id),
    partnerId: uuid('partner_id').references(() => partners.id),
    cosmology: jsonb('cosmology')
      .$type<CosmologyChoice>()
      .notNull()
      // Written out: the migration generator would leave the JSON quotes off a plain string.
      .default(sql`'"planck18"'::jsonb`),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    /** Set while a deleted draft waits out its days of grace. */
    deletedAt: instant('deleted_at'),
    version: version(),
  },
  (table) => [
    unique('proposals_number_unique').on(table.semesterId, table.number),
    index('proposals_panel').on(table.panelId),
  ],
);

export const proposalMembers = pgTable(
  'proposal_members',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    access: text('access').$type<TeamAccess>().notNull(),
    isPrincipal: boolean('is_principal').notNull().default(false),
    signedAt: instant('signed_at'),
    position: integer('position').notNull().default(0),
    createdAt: createdAt(),
    version: version(),
  },
  (table) => [
    unique('proposal_members_unique').on(table.proposalId, table.personId),
    uniqueIndex('proposal_members_one_principal')
      .on(table.proposalId)
      .where(sql`${table.isPrincipal}`),
    index('proposal_members_person').on(table.personId),
  ],
);

/** The text of the case, a row for each section that was begun. */
export const caseSections = pgTable(
  'case_sections',
  {
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    sectionId: text('section_id').$type<CaseSectionId>().notNull(),
    body: text('body').notNull().default(''),
    updatedAt: updatedAt(),
    updatedBy: uuid('updated_by').references(() => people.id),
    version: version(),
  },
  (table) => [primaryKey({ columns: [table.proposalId, table.sectionId] })],
);
