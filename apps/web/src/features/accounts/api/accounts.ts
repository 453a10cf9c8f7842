import {
  DemoPeople,
  Me,
  type PasswordChange,
  type PasswordReset,
  type PasswordResetRequest,
  type ProfilePatch,
  type SignInRequest,
  type SignUpRequest,
} from '@faintward/contracts/accounts';
import { Acknowledgement } from '@faintward/contracts/common';
import { InstitutionList } from '@faintward/contracts/people';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api, ApiError } from '../../../lib/api';
import { sessionQueries } from '../../../lib/queries/session';
import { setHadPerson } from '../../../lib/session';

export const accountQueries = {
  /** Null outside demo mode. */
  demoPeople: () =>
    queryOptions({
      queryKey: ['accounts', 'demo-people'],
      queryFn: async ({ signal }): Promise<DemoPeople | null> => {
        try {
          return await api({ path: '/demo-people', schema: DemoPeople, signal, onSignedOut: 'throw' });
        } catch (error) {
          if (error instanceof ApiError && error.status === 404) return null;
          throw error;
        }
      },
      staleTime: Infinity,
    }),
  institutions: () =>
    queryOptions({
      queryKey: ['accounts', 'institutions'],
      queryFn: ({ signal }) => api({ path: '/institutions', schema: InstitutionList, signal, onSignedOut: 'refresh' }),
      staleTime: 10 * 60_000,
    }),
};

/** Whoever signs in sees nothing of whoever was here before. */
function useEntered() {
  const queryClient = useQueryClient();
  return (me: Me) => {
    queryClient.removeQueries({
      predicate: (query) => query.queryKey[0] !== 'calls' && query.queryKey[0] !== 'session',
    });
    setHadPerson(true);
    queryClient.setQueryData(sessionQueries.me().queryKey, me);
  };
}

export function useSignIn() {
  const entered = useEntered();
  return useMutation({
    mutationFn: (body: SignInRequest) =>
      api({ method: 'POST', path: '/session', body, schema: Me, onSignedOut: 'throw' }),
    onSuccess: entered,
  });
}

export function useSignUp() {
  const entered = useEntered();
  return useMutation({
    mutationFn: (body: SignUpRequest) =>
      api({ method: 'POST', path: '/accounts', body, schema: Me, onSignedOut: 'throw' }),
    onSuccess: entered,
  });
}

export function useAskForPasswordReset() {
  return useMutation({
    mutationFn: (body: PasswordResetRequest) =>
      api({ method: 'POST', path: '/password-resets', body, schema: Acknowledgement, onSignedOut: 'throw' }),
  });
}

export function useResetPassword(token: string) {
  return useMutation({
    mutationFn: (body: PasswordReset) =>
      api({
        method: 'PUT',
        path: `/password-resets/${encodeURIComponent(token)}`,
        body,
        schema: Acknowledgement,
        onSignedOut: 'throw',
      }),
  });
}

export function useSaveProfile() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ProfilePatch) => api({ method: 'PATCH', path: '/profile', body, schema: Me }),
    onSuccess: (me) => queryClient.setQueryData(sessionQueries.me().queryKey, me),
  });
}

export function useChangePassword() {
  return useMutation({
    mutationFn: (body: PasswordChange) => api({ method: 'PUT', path: '/profile/password', body, schema: Me }),
  });
}
