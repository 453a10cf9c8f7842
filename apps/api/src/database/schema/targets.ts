import type { Extent, Light, RedshiftKind, RedshiftUncertainty, TargetComputed } from '@faintward/contracts';
import { doublePrecision, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId, updatedAt, version } from './columns.js';
import { proposals } from './proposals.js';

export const targets = pgTable(
  'targets',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    /** Order in the list; gaps are allowed. */
    position: integer('position').notNull(),
    name: text('name').notNull(),
    rightAscensionDeg: doublePrecision('right_ascension_deg').notNull(),
    declinationDeg: doublePrecision('declination_deg').notNull(),
    redshift: doublePrecision('redshift').notNull(),
    redshiftUncertainty: jsonb('redshift_uncertainty').$type<RedshiftUncertainty>(),
    redshiftKind: text('redshift_kind').$type<RedshiftKind>().notNull().default('spectroscopic'),
    light: jsonb('light').$type<Light>(),
    extent: jsonb('extent').$type<Extent>().notNull(),
    notes: text('notes').notNull().default(''),
    /** What the engine made of it, with the versions it used; rewritten with every change of an input. */
    computed: jsonb('computed').$type<TargetComputed>().notNull(),
    /** Name of the nearest other target of the list within 2″. Kept apart from `computed`, because other rows decide it. */
    nearestDuplicateName: text('nearest_duplicate_name'),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    version: version(),
  },
  (table) => [index('targets_proposal').on(table.proposalId, table.position)],
);
