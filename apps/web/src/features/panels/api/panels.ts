import {
  AutomaticAssignmentResult,
  Panel,
  Ranking,
  type Assignment,
  type AutomaticAssignment,
  type AwardInput,
} from '@faintward/contracts/reviews';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api, newIdempotencyKey } from '../../../lib/api';

export const panelQueries = {
  all: () => ['panels'] as const,
  one: (panelId: string) => [...panelQueries.all(), panelId] as const,
  detail: (panelId: string) =>
    queryOptions({
      queryKey: [...panelQueries.one(panelId), 'detail'],
      queryFn: ({ signal }) => api({ path: `/panels/${panelId}`, schema: Panel, signal }),
    }),
  ranking: (panelId: string) =>
    queryOptions({
      queryKey: [...panelQueries.one(panelId), 'ranking'],
      queryFn: ({ signal }) => api({ path: `/panels/${panelId}/ranking`, schema: Ranking, signal }),
    }),
};

export function useAssignments(panelId: string) {
  const client = useQueryClient();
  const onSuccess = (panel: Panel) => {
    client.setQueryData(panelQueries.detail(panelId).queryKey, panel);
    return client.invalidateQueries({ queryKey: panelQueries.ranking(panelId).queryKey });
  };
  return {
    assign: useMutation({
      mutationFn: (input: Assignment) =>
        api({
          method: 'POST',
          path: `/panels/${panelId}/assignments`,
          body: input,
          idempotencyKey: newIdempotencyKey(),
          schema: Panel,
        }),
      onSuccess,
    }),
    unassign: useMutation({
      mutationFn: ({ proposalId, personId }: { proposalId: string; personId: string }) =>
        api({ method: 'DELETE', path: `/panels/${panelId}/assignments/${proposalId}/${personId}`, schema: Panel }),
      onSuccess,
    }),
    automatic: useMutation({
      mutationFn: (input: AutomaticAssignment) =>
        api({
          method: 'POST',
          path: `/panels/${panelId}/automatic-assignment`,
          body: input,
          idempotencyKey: newIdempotencyKey(),
          schema: AutomaticAssignmentResult,
        }),
      onSuccess: () => client.invalidateQueries({ queryKey: panelQueries.one(panelId) }),
    }),
  };
}

/** Each answers the ranking as it stands with the change, so that the cut line moves at once. */
export function useAwards(panelId: string) {
  const client = useQueryClient();
  const onSuccess = (ranking: Ranking) => client.setQueryData(panelQueries.ranking(panelId).queryKey, ranking);
  const onError = () => client.invalidateQueries({ queryKey: panelQueries.ranking(panelId).queryKey });
  return {
    put: useMutation({
      mutationFn: ({
        proposalId,
        version,
        input,
        idempotencyKey,
      }: {
        proposalId: string;
        version: number | undefined;
        input: AwardInput;
        idempotencyKey: string;
      }) =>
        api({
          method: 'PUT',
          path: `/panels/${panelId}/awards/${proposalId}`,
          body: input,
          ifMatch: version,
          idempotencyKey,
          schema: Ranking,
        }),
      onSuccess,
      onError,
    }),
    remove: useMutation({
      mutationFn: ({ proposalId, version }: { proposalId: string; version: number }) =>
        api({ method: 'DELETE', path: `/panels/${panelId}/awards/${proposalId}`, ifMatch: version, schema: Ranking }),
      onSuccess,
      onError,
    }),
    finalise: useMutation({
      mutationFn: () => api({ method: 'POST', path: `/panels/${panelId}/finalisation`, schema: Ranking }),
      onSuccess: (ranking) => {
        onSuccess(ranking);
        return client.invalidateQueries({ queryKey: panelQueries.detail(panelId).queryKey });
      },
    }),
  };
}
