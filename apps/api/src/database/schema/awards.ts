import type { AwardStanding, MoonClass } from '@faintward/contracts';
import { doublePrecision, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId, updatedAt, version } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

/** The decision on a proposal; 0 hours is a decision too. */
export const awards = pgTable(
  'awards',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    hours: doublePrecision('hours').notNull(),
    moonClass: text('moon_class').$type<MoonClass>().notNull(),
    standing: text('standing').$type<AwardStanding>().notNull(),
    reason: text('reason').notNull().default(''),
    decidedBy: uuid('decided_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    version: version(),
  },
  (table) => [unique('awards_proposal_unique').on(table.proposalId)],
);
