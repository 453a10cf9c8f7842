import { Acknowledgement } from '@faintward/contracts/common';
import {
  ReadingList,
  Review,
  SavedReview,
  type ConflictDeclaration,
  type ReviewInput,
} from '@faintward/contracts/reviews';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const reviewQueries = {
  all: () => ['reviews'] as const,
  readingList: () =>
    queryOptions({
      queryKey: [...reviewQueries.all(), 'reading-list'],
      queryFn: ({ signal }) => api({ path: '/reading-list', schema: ReadingList, signal }),
    }),
  detail: (proposalId: string) =>
    queryOptions({
      queryKey: [...reviewQueries.all(), 'detail', proposalId],
      queryFn: ({ signal }) => api({ path: `/reviews/${proposalId}`, schema: Review, signal }),
      // The form holds what is being typed; coming back to the window must not fetch under the reviewer's hands.
      refetchOnWindowFocus: false,
    }),
};

export function useSaveReview(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ version, input }: { version: number; input: ReviewInput }) =>
      api({ method: 'PUT', path: `/reviews/${proposalId}`, body: input, ifMatch: version, schema: SavedReview }),
    onSuccess: (saved) => {
      client.setQueryData(reviewQueries.detail(proposalId).queryKey, (old) => (old ? { ...old, ...saved } : old));
      return client.invalidateQueries({ queryKey: reviewQueries.readingList().queryKey });
    },
  });
}

export function useDeclareConflict(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: ConflictDeclaration) =>
      api({ method: 'POST', path: `/reviews/${proposalId}/conflict`, body: input, schema: Acknowledgement }),
    onSuccess: () => {
      client.removeQueries({ queryKey: reviewQueries.detail(proposalId).queryKey });
      return client.invalidateQueries({ queryKey: reviewQueries.all() });
    },
  });
}
