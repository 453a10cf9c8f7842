import { Estimate, type EstimateRequest } from '@faintward/contracts/estimates';
import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const estimateQueries = {
  /** One estimate; a query and not a mutation, because the same question always has the same answer. */
  one: (request: EstimateRequest | undefined) =>
    queryOptions({
      queryKey: ['estimates', request],
      queryFn: ({ signal }) =>
        api({ method: 'POST', path: '/estimates', body: request, schema: Estimate, signal, onSignedOut: 'refresh' }),
      enabled: request !== undefined,
      staleTime: Infinity,
      placeholderData: keepPreviousData,
    }),
};
