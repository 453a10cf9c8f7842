import { integer, timestamp, uuid } from 'drizzle-orm/pg-core';

/** Columns that most tables share; a fresh builder for each use. */
export const primaryId = () => uuid('id').primaryKey().defaultRandom();
export const createdAt = () => timestamp('created_at', { withTimezone: true }).notNull().defaultNow();
export const updatedAt = () => timestamp('updated_at', { withTimezone: true }).notNull().defaultNow();
export const instant = (name: string) => timestamp(name, { withTimezone: true });
/** Grows by one with each change; travels as ETag and If-Match. */
export const version = () => integer('version').notNull().default(1);
