import { LightReport, type LightReportRequest } from '@faintward/contracts/light-report';
import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const lightReportQueries = {
  one: (request: LightReportRequest | undefined) =>
    queryOptions({
      queryKey: ['light', 'report', request],
      queryFn: ({ signal }) =>
        api({ method: 'POST', path: '/light', body: request, schema: LightReport, signal, onSignedOut: 'refresh' }),
      enabled: request !== undefined,
      staleTime: Infinity,
      placeholderData: keepPreviousData,
    }),
};
