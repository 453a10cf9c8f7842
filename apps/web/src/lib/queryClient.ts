import { QueryClient } from '@tanstack/react-query';
import { ApiError } from './api';

/** Defaults of every query: never ask twice about a refusal, twice more about a failure that may pass. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        gcTime: 10 * 60_000,
        // Not 'online': a browser that believes itself offline must show a failure and a way to try again, not wait for ever.
        networkMode: 'always',
        retry: (failures, error) => failures < 2 && mayPass(error),
        retryDelay: (failures) => Math.min(4000, 500 * 2 ** failures),
        refetchOnWindowFocus: true,
      },
      mutations: { networkMode: 'always', retry: false },
    },
  });
}

function mayPass(error: unknown): boolean {
  return error instanceof ApiError && (error.code === 'unreachable' || [502, 503, 504].includes(error.status));
}
