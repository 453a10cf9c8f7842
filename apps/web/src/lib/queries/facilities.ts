import { ModeConfigurationHistory, TelescopeList } from '@faintward/contracts/facilities';
import { queryOptions } from '@tanstack/react-query';
import { api } from '../api';

export const facilityQueries = {
  telescopes: () =>
    queryOptions({
      queryKey: ['telescopes'],
      queryFn: ({ signal }) => api({ path: '/telescopes', schema: TelescopeList, signal, onSignedOut: 'refresh' }),
      staleTime: 5 * 60_000,
    }),
  configurations: (modeId: string) =>
    queryOptions({
      queryKey: ['modes', modeId, 'configurations'],
      queryFn: ({ signal }) =>
        api({ path: `/modes/${modeId}/configurations`, schema: ModeConfigurationHistory, signal }),
    }),
};
