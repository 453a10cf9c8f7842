import { Estimate, type EstimateRequest } from '@faintward/contracts/estimates';
import {
  ApplySetupResult,
  Observation,
  ObservationPage,
  RemovedObservations,
  type ApplySetup,
  type ObservationListQuery,
  type ObservationPatch,
} from '@faintward/contracts/observations';
import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { api } from '../../../lib/api';

/** The same prefix as everything else about a proposal, so that one change can make all of it fresh. */
const proposalKey = (proposalId: string) => ['proposals', proposalId] as const;

export const observationQueries = {
  all: (proposalId: string) => [...proposalKey(proposalId), 'observations'] as const,
  list: (proposalId: string, query: Partial<ObservationListQuery>) =>
    queryOptions({
      queryKey: [...observationQueries.all(proposalId), 'list', query],
      queryFn: ({ signal }) =>
        api({ path: `/proposals/${proposalId}/observations`, query, schema: ObservationPage, signal }),
      placeholderData: keepPreviousData,
    }),
  /** What a plan would give; a query, because the same question always has the same answer. A newer one aborts it. */
  estimate: (request: EstimateRequest | undefined) =>
    queryOptions({
      queryKey: ['estimates', request],
      queryFn: ({ signal }) => api({ method: 'POST', path: '/estimates', body: request, schema: Estimate, signal }),
      enabled: request !== undefined,
      staleTime: Infinity,
      placeholderData: keepPreviousData,
    }),
};

/** Every change of observations changes hours, and so the whole proposal. */
export function useObservationMutations(proposalId: string) {
  const client = useQueryClient();
  const base = `/proposals/${proposalId}/observations`;
  const refresh = () => client.invalidateQueries({ queryKey: proposalKey(proposalId) });
  return {
    apply: useMutation({
      mutationFn: (input: ApplySetup) =>
        api({ method: 'POST', path: `${base}/apply`, body: input, schema: ApplySetupResult }),
      onSuccess: refresh,
    }),
    patch: useMutation({
      mutationFn: ({
        observationId,
        version,
        patch,
      }: {
        observationId: string;
        version: number;
        patch: ObservationPatch;
      }) =>
        api({
          method: 'PATCH',
          path: `${base}/${observationId}`,
          body: patch,
          ifMatch: version,
          schema: Observation,
        }),
      onSuccess: (observation) => {
        client.setQueriesData<z.output<typeof ObservationPage>>(
          { queryKey: [...observationQueries.all(proposalId), 'list'] },
          (page) =>
            page && {
              ...page,
              rows: page.rows.map((row) => (row.observationId === observation.observationId ? observation : row)),
            },
        );
        return refresh();
      },
    }),
    remove: useMutation({
      mutationFn: (observationIds: readonly string[]) =>
        api({ method: 'POST', path: `${base}/removal`, body: { observationIds }, schema: RemovedObservations }),
      onSuccess: refresh,
    }),
  };
}
