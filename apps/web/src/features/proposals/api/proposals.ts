import type { ListQuery } from '@faintward/contracts/common';
import { TimeRequest } from '@faintward/contracts/observations';
import {
  CaseSection,
  CaseSectionList,
  Proposal,
  ProposalChangePage,
  ProposalChoices,
  ProposalPage,
  TeamMemberList,
  type CaseSectionId,
  type NewProposal,
  type NewTeamMember,
  type ProposalHistoryQuery,
  type ProposalPatch,
} from '@faintward/contracts/proposals';
import type { TeamAccess } from '@faintward/contracts/permissions';
import { PeopleSearchResult } from '@faintward/contracts/people';
import { CheckReport, SubmissionList, SubmissionSummary } from '@faintward/contracts/submissions';
import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { api } from '../../../lib/api';

/** Everything about one proposal hangs below `one(id)`, so that a change can make all of it fresh again. */
export const proposalQueries = {
  all: () => ['proposals'] as const,
  one: (proposalId: string) => [...proposalQueries.all(), proposalId] as const,
  list: (query: Partial<ListQuery>) =>
    queryOptions({
      queryKey: [...proposalQueries.all(), 'list', query],
      queryFn: ({ signal }) => api({ path: '/proposals', query, schema: ProposalPage, signal }),
      placeholderData: keepPreviousData,
    }),
  detail: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'detail'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}`, schema: Proposal, signal }),
    }),
  choices: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'choices'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/choices`, schema: ProposalChoices, signal }),
      staleTime: 5 * 60_000,
    }),
  caseSections: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'case'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/case`, schema: CaseSectionList, signal }),
    }),
  members: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'members'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/members`, schema: TeamMemberList, signal }),
    }),
  checks: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'checks'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/checks`, schema: CheckReport, signal }),
      // The report must be about what is stored now, not about what was when the page was last seen.
      staleTime: 0,
    }),
  submissions: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'submissions'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/submissions`, schema: SubmissionList, signal }),
    }),
  timeRequest: (proposalId: string) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'time-request'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/time-request`, schema: TimeRequest, signal }),
    }),
  history: (proposalId: string, query: Partial<ListQuery>) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'history', query],
      queryFn: ({ signal }) =>
        api({ path: `/proposals/${proposalId}/history`, query, schema: ProposalChangePage, signal }),
      placeholderData: keepPreviousData,
    }),
  /** The last changes of one thing of it, such as one target. */
  historyOf: (proposalId: string, query: Partial<ProposalHistoryQuery> & { subjectId: string }) =>
    queryOptions({
      queryKey: [...proposalQueries.one(proposalId), 'history', query],
      queryFn: ({ signal }) =>
        api({ path: `/proposals/${proposalId}/history`, query, schema: ProposalChangePage, signal }),
    }),
};

export const peopleQueries = {
  search: (search: string) =>
    queryOptions({
      queryKey: ['people', 'search', search],
      queryFn: ({ signal }) => api({ path: '/people', query: { search }, schema: PeopleSearchResult, signal }),
      enabled: search.trim().length >= 2,
      placeholderData: keepPreviousData,
    }),
};

export function useCreateProposal() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: NewProposal) => api({ method: 'POST', path: '/proposals', body: input, schema: Proposal }),
    onSuccess: () => client.invalidateQueries({ queryKey: proposalQueries.all() }),
  });
}

export function usePatchProposal(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ version, patch }: { version: number; patch: ProposalPatch }) =>
      api({ method: 'PATCH', path: `/proposals/${proposalId}`, body: patch, ifMatch: version, schema: Proposal }),
    onSuccess: (proposal) => {
      client.setQueryData(proposalQueries.detail(proposalId).queryKey, proposal);
      return client.invalidateQueries({ queryKey: proposalQueries.all() });
    },
    // Somebody was faster: the next try must start from what is stored now.
    onError: () => client.invalidateQueries({ queryKey: proposalQueries.detail(proposalId).queryKey }),
  });
}

export function useSaveCaseSection(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ sectionId, version, body }: { sectionId: CaseSectionId; version: number; body: string }) =>
      api({
        method: 'PUT',
        path: `/proposals/${proposalId}/case/${sectionId}`,
        body: { body },
        ifMatch: version,
        schema: CaseSection,
      }),
    onSuccess: (saved) => {
      client.setQueryData(proposalQueries.caseSections(proposalId).queryKey, (old) =>
        old ? { rows: old.rows.map((row) => (row.sectionId === saved.sectionId ? saved : row)) } : old,
      );
      return client.invalidateQueries({ queryKey: proposalQueries.detail(proposalId).queryKey });
    },
  });
}

/** Each answers the whole team as it is now. */
export function useTeamMutations(proposalId: string) {
  const client = useQueryClient();
  const onSuccess = (members: z.infer<typeof TeamMemberList>) => {
    client.setQueryData(proposalQueries.members(proposalId).queryKey, members);
    return client.invalidateQueries({ queryKey: proposalQueries.detail(proposalId).queryKey });
  };
  const base = `/proposals/${proposalId}/members`;
  return {
    add: useMutation({
      mutationFn: (input: NewTeamMember) => api({ method: 'POST', path: base, body: input, schema: TeamMemberList }),
      onSuccess,
    }),
    setAccess: useMutation({
      mutationFn: ({ memberId, version, access }: { memberId: string; version: number; access: TeamAccess }) =>
        api({
          method: 'PATCH',
          path: `${base}/${memberId}`,
          body: { access },
          ifMatch: version,
          schema: TeamMemberList,
        }),
      onSuccess,
    }),
    remove: useMutation({
      mutationFn: ({ memberId, version }: { memberId: string; version: number }) =>
        api({ method: 'DELETE', path: `${base}/${memberId}`, ifMatch: version, schema: TeamMemberList }),
      onSuccess,
    }),
    sign: useMutation({
      mutationFn: () => api({ method: 'POST', path: `${base}/me/signature`, schema: TeamMemberList }),
      onSuccess,
    }),
  };
}

export function useSubmitProposal(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (idempotencyKey: string) =>
      api({ method: 'POST', path: `/proposals/${proposalId}/submissions`, idempotencyKey, schema: SubmissionSummary }),
    onSuccess: () => client.invalidateQueries({ queryKey: proposalQueries.all() }),
  });
}

export function useWithdrawProposal(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api({ method: 'POST', path: `/proposals/${proposalId}/withdrawal`, schema: Proposal }),
    onSuccess: () => client.invalidateQueries({ queryKey: proposalQueries.all() }),
  });
}
