import type { ListQuery } from '@faintward/contracts/common';
import { asc, desc, sql, type SQL } from 'drizzle-orm';
import type { AnyPgColumn } from 'drizzle-orm/pg-core';
import { invalidField } from './domain-error.js';

/** `limit` and `offset` of a page. */
export function pageWindow(query: Pick<ListQuery, 'page' | 'pageSize'>): { limit: number; offset: number } {
  return { limit: query.pageSize, offset: (query.page - 1) * query.pageSize };
}

/**
 * Order of a list: by the named column, or the first one, and by the tie-breaker, without which rows of equal value could
 * appear on two pages or on none.
 *
 * @throws {DomainError} `validation-failed` when `sort` names no column of `columns`
 */
export function orderOf(
  query: Pick<ListQuery, 'sort' | 'order'>,
  columns: Readonly<Record<string, AnyPgColumn | SQL>>,
  tieBreaker: AnyPgColumn,
): SQL[] {
  const names = Object.keys(columns);
  const name = query.sort ?? names[0];
  const column = name === undefined || !Object.hasOwn(columns, name) ? undefined : columns[name];
  if (column === undefined) throw invalidField('sort', `Can be sorted by ${names.join(', ')}.`);
  // What has no value comes last in either direction: nobody sorts to see the blanks.
  return [sql`${query.order === 'asc' ? asc(column) : desc(column)} nulls last`, asc(tieBreaker)];
}

/** A page in the shape of `pageOf` in the contracts. */
export function toPage<Row>(rows: Row[], rowCount: number, query: Pick<ListQuery, 'page' | 'pageSize'>) {
  return { rows, rowCount, page: query.page, pageSize: query.pageSize };
}

/** A search text as an `ilike` pattern that finds it anywhere, its own % and _ taken literally. */
export function containing(search: string): string {
  return `%${search.replace(/[\\%_]/g, (character) => `\\${character}`)}%`;
}
