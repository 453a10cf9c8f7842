import { CosmologyPresetList, type CosmologyChoice } from '@faintward/contracts/cosmology';
import { DistancesResponse } from '@faintward/contracts/distances';
import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api } from '../../../lib/api';

export const distanceQueries = {
  presets: () =>
    queryOptions({
      queryKey: ['cosmologies'],
      queryFn: ({ signal }) =>
        api({ path: '/cosmologies', schema: CosmologyPresetList, signal, onSignedOut: 'refresh' }),
      staleTime: Infinity,
    }),
  rows: (cosmology: CosmologyChoice, redshifts: readonly number[]) =>
    queryOptions({
      queryKey: ['distances', cosmology, redshifts],
      queryFn: ({ signal }) =>
        api({
          method: 'POST',
          path: '/distances',
          body: { cosmology, redshifts },
          schema: DistancesResponse,
          signal,
          onSignedOut: 'refresh',
        }),
      enabled: redshifts.length > 0,
      staleTime: Infinity,
      placeholderData: keepPreviousData,
    }),
};
