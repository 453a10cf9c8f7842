import type { Notice } from '@faintward/contracts';
import { doublePrecision, index, integer, jsonb, pgTable, text, uuid } from 'drizzle-orm/pg-core';
import { createdAt, primaryId } from './columns.js';
import { people } from './people.js';
import { proposals } from './proposals.js';

/** Spectra that were uploaded to a proposal. A spectrum is never changed, so that what was computed from it stays explained. */
export const spectra = pgTable(
  'spectra',
  {
    id: primaryId(),
    proposalId: uuid('proposal_id')
      .notNull()
      .references(() => proposals.id),
    name: text('name').notNull(),
    /** Where it comes from, in the words of who uploaded it. */
    source: text('source').notNull().default(''),
    /** In vacuum at rest, ascending. */
    wavelengthsNm: doublePrecision('wavelengths_nm').array().notNull(),
    /** Per unit wavelength, on any scale; as long as the wavelengths. */
    fluxPerNm: doublePrecision('flux_per_nm').array().notNull(),
    pointCount: integer('point_count').notNull(),
    restLowNm: doublePrecision('rest_low_nm').notNull(),
    restHighNm: doublePrecision('rest_high_nm').notNull(),
    observedAtRedshift: doublePrecision('observed_at_redshift').notNull(),
    /** SHA-256 of the points: what results name. */
    contentHash: text('content_hash').notNull(),
    /** What was assumed in reading it. */
    notices: jsonb('notices').$type<Notice[]>().notNull(),
    createdBy: uuid('created_by')
      .notNull()
      .references(() => people.id),
    createdAt: createdAt(),
  },
  (table) => [index('spectra_proposal').on(table.proposalId)],
);
