import { ProposalCosmologies } from '@faintward/contracts/light-report';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const cosmologyQueries = {
  /** Under the proposal's key: a changed target or observation changes it. */
  ofProposal: (proposalId: string) =>
    queryOptions({
      queryKey: ['proposals', proposalId, 'cosmologies'],
      queryFn: ({ signal }) =>
        api({ path: `/proposals/${proposalId}/cosmologies`, schema: ProposalCosmologies, signal }),
    }),
};
