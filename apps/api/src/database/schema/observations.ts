import type { Conditions, Estimate, Goal } from '@faintward/contracts';
import { doublePrecision, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId, updatedAt, version } from './columns.js';
import { modes } from './facilities.js';
import { proposals } from './proposals.js';
import { targets } from './targets.js';

export const observations = pgTable(
  'observations',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    targetId: uuid('target_id')
      .notNull()
      .references(() => targets.id, { onDelete: 'cascade' }),
    modeId: uuid('mode_id')
      .notNull()
      .references(() => modes.id),
    /** The configuration that the stored estimate used. */
    configurationVersion: integer('configuration_version').notNull(),
    goal: jsonb('goal').$type<Goal>().notNull(),
    conditions: jsonb('conditions').$type<Conditions>().notNull(),
    repeatCount: integer('repeat_count').notNull().default(1),
    /** Null while the target says nothing about its light. */
    estimate: jsonb('estimate').$type<Estimate>(),
    /** Why there is no estimate. */
    lacking: text('lacking'),
    /** Kept beside the estimate so that requests can be summed by the database. */
    totalSeconds: doublePrecision('total_seconds'),
    openShutterSeconds: doublePrecision('open_shutter_seconds'),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    version: version(),
  },
  (table) => [index('observations_proposal').on(table.proposalId), index('observations_target').on(table.targetId)],
);
