import { useCallback, useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import { z } from 'zod';

/** Every field falls back instead of failing: a mistyped or old link still shows a table. */
const Params = z.object({
  page: z.coerce.number().int().min(1).catch(1),
  pageSize: z.coerce.number().int().min(1).max(100).catch(50),
  sort: z.string().max(60).optional().catch(undefined),
  order: z.enum(['asc', 'desc']).catch('asc'),
  search: z.string().max(200).catch(''),
});

export interface TableParams {
  page: number;
  pageSize: number;
  sort: string | undefined;
  order: 'asc' | 'desc';
  search: string;
  change: (next: Partial<Pick<TableParams, 'page' | 'pageSize' | 'sort' | 'order' | 'search'>>) => void;
  clear: () => void;
}

/** Page, sort and search of a table, kept in the address so that a pasted link shows the same rows. */
export function useTableParams(defaults: { sort?: string; order?: 'asc' | 'desc' } = {}): TableParams {
  const [searchParams, setSearchParams] = useSearchParams();
  const { sort: defaultSort, order: defaultOrder } = defaults;
  const values = useMemo(
    () =>
      Params.parse({
        page: searchParams.get('page') ?? 1,
        pageSize: searchParams.get('pageSize') ?? 50,
        sort: searchParams.get('sort') ?? defaultSort,
        order: searchParams.get('order') ?? defaultOrder ?? 'asc',
        search: searchParams.get('search') ?? '',
      }),
    [searchParams, defaultSort, defaultOrder],
  );
  const change = useCallback<TableParams['change']>(
    (next) => {
      setSearchParams(
        (old) => {
          const changed = new URLSearchParams(old);
          for (const [name, value] of Object.entries(next)) {
            if (value === undefined || value === '') changed.delete(name);
            else changed.set(name, String(value));
          }
          return changed;
        },
        { replace: true },
      );
    },
    [setSearchParams],
  );
  const clear = useCallback(() => change({ search: '', page: 1 }), [change]);
  return useMemo(() => ({ ...values, sort: values.sort, change, clear }), [values, change, clear]);
}
