import type { ScoreAnswer } from '@faintward/contracts';
import { boolean, doublePrecision, index, jsonb, pgTable, text, unique, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId, updatedAt, version } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

export const reviews = pgTable(
  'reviews',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id),
    /** By criterion: a score or "cannot judge". A criterion that is not there has not been answered. */
    answers: jsonb('answers').$type<Record<string, ScoreAnswer>>().notNull(),
    /** Weighted over the scored criteria with the semester's weights; kept beside the answers for ranking. */
    overallScore: doublePrecision('overall_score'),
    isComplete: boolean('is_complete').notNull().default(false),
    commentToPrincipal: text('comment_to_principal').notNull().default(''),
    confidentialComment: text('confidential_comment').notNull().default(''),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    version: version(),
  },
  (table) => [
    unique('reviews_unique').on(table.proposalId, table.personId),
    index('reviews_person').on(table.personId),
  ],
);
