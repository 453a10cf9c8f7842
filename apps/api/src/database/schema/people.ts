import { sql } from 'drizzle-orm';
import { boolean, pgTable, real, text, uniqueIndex, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId, updatedAt, version } from './columns.js';

/** Member institutions of the observatory that own a share of its time. */
export const partners = pgTable('partners', {
  id: primaryId(),
  name: text('name').notNull().unique(),
  shareFraction: real('share_fraction').notNull(),
});

export const institutions = pgTable('institutions', {
  id: primaryId(),
  name: text('name').notNull().unique(),
  country: text('country').notNull(),
  partnerId: uuid('partner_id').references(() => partners.id),
});

export const people = pgTable(
  'people',
  {
    id: primaryId(),
    /** Stored in lower case. */
    email: text('email').notNull(),
    givenName: text('given_name').notNull(),
    familyName: text('family_name').notNull(),
    institutionId: uuid('institution_id').references(() => institutions.id),
    orcid: text('orcid'),
    /** Argon2id; null for someone who never set one. */
    passwordHash: text('password_hash'),
    isStaff: boolean('is_staff').notNull().default(false),
    isAdministrator: boolean('is_administrator').notNull().default(false),
    /** In the demo scenario: what this person does here, shown beside the one-click sign-in. Null for everyone else. */
    demoPart: text('demo_part'),
    lastSignInAt: instant('last_sign_in_at'),
    createdAt: createdAt(),
    updatedAt: updatedAt(),
    version: version(),
  },
  (table) => [uniqueIndex('people_email_unique').on(sql`lower(${table.email})`)],
);
