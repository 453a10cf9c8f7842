import type { SizeRelation } from '@faintward/contracts/light';
import {
  LightReading,
  LightReport,
  LightSuggestions,
  RedshiftDistributionReading,
  StoredSpectrum,
  StoredSpectrumList,
  type LightReadingRequest,
  type NewSpectrum,
} from '@faintward/contracts/light-report';
import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { api } from '../../lib/api';

export const lightQueries = {
  /** What is typical at a redshift. */
  suggestions: (redshift: number, relation?: SizeRelation) =>
    queryOptions({
      queryKey: ['light', 'suggestions', redshift, relation],
      queryFn: ({ signal }) =>
        api({
          path: '/light/suggestions',
          query: { redshift, relation },
          schema: LightSuggestions,
          signal,
          onSignedOut: 'refresh',
        }),
      staleTime: Infinity,
    }),
  /** The lines commonly used, and where they arrive from a redshift. */
  lines: (redshift: number) =>
    queryOptions({
      queryKey: ['light', 'lines', redshift],
      queryFn: async ({ signal }) => {
        const report = await api({
          method: 'POST',
          path: '/light',
          body: { redshift, sampleCount: 100 },
          schema: LightReport,
          signal,
          onSignedOut: 'refresh',
        });
        return report.lines;
      },
      staleTime: Infinity,
      // The choice stays while only where its lines arrive is asked anew.
      placeholderData: keepPreviousData,
    }),
  /** Under the proposal's key, because a changed target changes which spectra are used. */
  spectra: (proposalId: string) =>
    queryOptions({
      queryKey: ['proposals', proposalId, 'spectra'],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/spectra`, schema: StoredSpectrumList, signal }),
    }),
};

/** What a text with a unit says. */
export function readLight(request: LightReadingRequest, signal: AbortSignal) {
  return api({
    method: 'POST',
    path: '/light/reading',
    body: request,
    schema: LightReading,
    signal,
    onSignedOut: 'refresh',
  });
}

/** A table of redshifts and probability densities. */
export function useReadDistribution() {
  return useMutation({
    mutationFn: (text: string) =>
      api({
        method: 'POST',
        path: '/light/redshift-distribution',
        body: { text },
        schema: RedshiftDistributionReading,
        onSignedOut: 'refresh',
      }),
  });
}

export function useSpectrumMutations(proposalId: string) {
  const client = useQueryClient();
  const refresh = () => client.invalidateQueries({ queryKey: lightQueries.spectra(proposalId).queryKey });
  return {
    add: useMutation({
      mutationFn: (input: NewSpectrum) =>
        api({ method: 'POST', path: `/proposals/${proposalId}/spectra`, body: input, schema: StoredSpectrum }),
      onSuccess: refresh,
    }),
    remove: useMutation({
      mutationFn: (spectrumId: string) =>
        api({ method: 'DELETE', path: `/proposals/${proposalId}/spectra/${spectrumId}`, schema: z.unknown() }),
      onSuccess: refresh,
    }),
  };
}
