import { index, integer, jsonb, pgTable, primaryKey, text, uuid } from 'drizzle-orm/pg-core';
import { createdAt, instant, primaryId, updatedAt } from './columns.js';
import { people } from './people.js';

/**
 * One sign-in on one device. Access tokens name it, so that signing out, a changed password or a stolen token ends
 * everything that came from it at once.
 */
export const sessions = pgTable(
  'sessions',
  {
    id: primaryId(),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    createdAt: createdAt(),
    endedAt: instant('ended_at'),
    endedBecause: text('ended_because', { enum: ['signed-out', 'token-reused', 'password-changed'] }),
  },
  (table) => [index('sessions_person_index').on(table.personId)],
);

/** Single-use tokens that renew a session. Only a SHA-256 of the token is kept. */
export const refreshTokens = pgTable(
  'refresh_tokens',
  {
    tokenHash: text('token_hash').primaryKey(),
    sessionId: uuid('session_id')
      .notNull()
      .references(() => sessions.id, { onDelete: 'cascade' }),
    issuedAt: instant('issued_at').notNull().defaultNow(),
    expiresAt: instant('expires_at').notNull(),
    usedAt: instant('used_at'),
  },
  (table) => [index('refresh_tokens_session_index').on(table.sessionId)],
);

/** Links in reset mails. Only a SHA-256 of the token is kept. */
export const passwordResetTokens = pgTable(
  'password_reset_tokens',
  {
    tokenHash: text('token_hash').primaryKey(),
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    createdAt: createdAt(),
    expiresAt: instant('expires_at').notNull(),
    usedAt: instant('used_at'),
  },
  (table) => [index('password_reset_tokens_person_index').on(table.personId)],
);

/** The answer that a repeated request with the same key gets, instead of doing its work twice. */
export const idempotencyKeys = pgTable(
  'idempotency_keys',
  {
    personId: uuid('person_id')
      .notNull()
      .references(() => people.id, { onDelete: 'cascade' }),
    route: text('route').notNull(),
    key: text('key').notNull(),
    requestHash: text('request_hash').notNull(),
    /** Null only inside the transaction that is doing the work. */
    response: jsonb('response'),
    createdAt: createdAt(),
  },
  (table) => [
    primaryKey({ columns: [table.personId, table.route, table.key] }),
    index('idempotency_keys_created_index').on(table.createdAt),
  ],
);

/** Every message the application wants sent: written with the change it tells of, sent by a job afterwards. */
export const outgoingMail = pgTable(
  'outgoing_mail',
  {
    id: primaryId(),
    toAddress: text('to_address').notNull(),
    subject: text('subject').notNull(),
    textBody: text('text_body').notNull(),
    htmlBody: text('html_body').notNull(),
    state: text('state', { enum: ['waiting', 'sent', 'failed'] })
      .notNull()
      .default('waiting'),
    attemptCount: integer('attempt_count').notNull().default(0),
    lastError: text('last_error'),
    createdAt: createdAt(),
    sentAt: instant('sent_at'),
  },
  (table) => [index('outgoing_mail_created_index').on(table.createdAt)],
);

/** What the local mail fake received when no mail server is configured. */
export const mailboxMessages = pgTable(
  'mailbox_messages',
  {
    id: primaryId(),
    toAddress: text('to_address').notNull(),
    subject: text('subject').notNull(),
    textBody: text('text_body').notNull(),
    htmlBody: text('html_body').notNull(),
    receivedAt: instant('received_at').notNull().defaultNow(),
  },
  (table) => [index('mailbox_messages_received_index').on(table.receivedAt)],
);

/** Facts about this installation that have to survive a restart, one JSON value per name. */
export const installationFacts = pgTable('installation_facts', {
  name: text('name').primaryKey(),
  value: jsonb('value').notNull(),
  updatedAt: updatedAt(),
});
