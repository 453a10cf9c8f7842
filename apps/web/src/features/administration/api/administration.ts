import {
  AuditPage,
  OutgoingMailPage,
  PersonPage,
  PersonRecord,
  type PersonRolesPatch,
} from '@faintward/contracts/people';
import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export interface PageQuery {
  page: number;
  pageSize: number;
  sort: string | undefined;
  order: 'asc' | 'desc';
  search: string;
}

/** Only what the server reads; everything here is also in the key. */
const pick = ({ page, pageSize, sort, order, search }: PageQuery) => ({ page, pageSize, sort, order, search });

export const administrationQueries = {
  all: () => ['administration'] as const,
  people: (query: PageQuery) =>
    queryOptions({
      queryKey: [...administrationQueries.all(), 'people', pick(query)],
      queryFn: ({ signal }) => api({ path: '/administration/people', query: pick(query), schema: PersonPage, signal }),
      placeholderData: keepPreviousData,
    }),
  mail: (query: PageQuery) =>
    queryOptions({
      queryKey: [...administrationQueries.all(), 'mail', pick(query)],
      queryFn: ({ signal }) =>
        api({ path: '/administration/mail', query: pick(query), schema: OutgoingMailPage, signal }),
      placeholderData: keepPreviousData,
    }),
  changes: (query: PageQuery) =>
    queryOptions({
      queryKey: [...administrationQueries.all(), 'changes', pick(query)],
      queryFn: ({ signal }) => api({ path: '/administration/changes', query: pick(query), schema: AuditPage, signal }),
      placeholderData: keepPreviousData,
    }),
};

export function useChangeRoles() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ person, roles }: { person: PersonRecord; roles: PersonRolesPatch }) =>
      api({
        method: 'PATCH',
        path: `/administration/people/${person.personId}`,
        body: roles,
        ifMatch: person.version,
        schema: PersonRecord,
      }),
    onSettled: () => queryClient.invalidateQueries({ queryKey: administrationQueries.all() }),
  });
}
