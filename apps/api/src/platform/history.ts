import { Injectable } from '@nestjs/common';
import { changes } from '../database/schema/history.js';
import { DatabaseService } from '../database/transaction.js';
import { canonicalJson } from './idempotency.js';

export interface Change {
  /** Undefined when the application itself acted. */
  personId: string | undefined;
  /** The object that access is decided on: `proposal`, `panel`, `person`, … */
  scope: string;
  scopeId: string;
  subject: string;
  subjectId: string;
  subjectName?: string;
  action: string;
  details?: Record<string, { before: unknown; after: unknown }>;
}

/** Appends to the record of changes; call it in the transaction that makes the change. */
@Injectable()
export class HistoryService {
  constructor(private readonly database: DatabaseService) {}

  async record(...entries: readonly Change[]): Promise<void> {
    if (entries.length === 0) return;
    await this.database
      .current()
      .insert(changes)
      .values(entries.map((entry) => ({ ...entry, personId: entry.personId ?? null, details: entry.details ?? {} })));
  }
}

/**
 * The fields of `after` that differ from `before`, in the form that a change stores. The order of keys is no difference: a
 * jsonb column gives them back in its own.
 */
export function differences<Row extends object>(
  before: Row,
  after: Partial<Row>,
): Record<string, { before: unknown; after: unknown }> {
  const result: Record<string, { before: unknown; after: unknown }> = {};
  for (const [name, value] of Object.entries(after)) {
    const old: unknown = before[name as keyof Row];
    if (value !== undefined && canonicalJson(old) !== canonicalJson(value))
      result[name] = { before: old ?? null, after: value };
  }
  return result;
}
