import { ReferenceDataList } from '@faintward/contracts/light-report';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const sourceQueries = {
  referenceData: () =>
    queryOptions({
      queryKey: ['reference-data'],
      queryFn: ({ signal }) =>
        api({ path: '/reference-data', schema: ReferenceDataList, signal, onSignedOut: 'refresh' }),
      staleTime: Infinity,
    }),
};
