import { Me, SESSION_HINT_COOKIE } from '@faintward/contracts/accounts';
import { OpenCalls } from '@faintward/contracts/semesters';
import { queryOptions } from '@tanstack/react-query';
import { api, ApiError } from '../api';
import { setHadPerson } from '../session';

/** Who is signed in, and the open calls: what the frame around every page needs. */
export const sessionQueries = {
  /** Null when nobody is. */
  me: () =>
    queryOptions({
      queryKey: ['session', 'me'],
      queryFn: async ({ signal }): Promise<Me | null> => {
        if (!document.cookie.includes(`${SESSION_HINT_COOKIE}=`)) return null;
        try {
          const me = await api({ path: '/session', schema: Me, signal, onSignedOut: 'refresh' });
          setHadPerson(true);
          return me;
        } catch (error) {
          if (error instanceof ApiError && error.status === 401) return null;
          throw error;
        }
      },
      staleTime: 5 * 60_000,
    }),
  calls: () =>
    queryOptions({
      queryKey: ['calls'],
      queryFn: ({ signal }) => api({ path: '/calls', schema: OpenCalls, signal, onSignedOut: 'refresh' }),
      staleTime: 60_000,
    }),
};
