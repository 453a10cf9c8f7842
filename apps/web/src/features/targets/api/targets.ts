import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import { DistancesResponse } from '@faintward/contracts/distances';
import {
  CosmicTime,
  ImportPreview,
  ImportResult,
  RemovedTargets,
  Target,
  TargetPage,
  type ImportRole,
  type NewTarget,
  type TargetListQuery,
  type TargetPatch,
} from '@faintward/contracts/targets';
import type { BandId, MagnitudeSystem } from '@faintward/contracts/light';
import { LightReport } from '@faintward/contracts/light-report';
import { keepPreviousData, queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { z } from 'zod';
import { api, apiUrl } from '../../../lib/api';

/** The same prefix as everything else about a proposal, so that one change can make all of it fresh. */
const proposalKey = (proposalId: string) => ['proposals', proposalId] as const;

export const targetQueries = {
  all: (proposalId: string) => [...proposalKey(proposalId), 'targets'] as const,
  list: (proposalId: string, query: Partial<TargetListQuery>) =>
    queryOptions({
      queryKey: [...targetQueries.all(proposalId), 'list', query],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/targets`, query, schema: TargetPage, signal }),
      placeholderData: keepPreviousData,
    }),
  one: (proposalId: string, targetId: string) =>
    queryOptions({
      queryKey: [...targetQueries.all(proposalId), 'one', targetId],
      queryFn: ({ signal }) => api({ path: `/proposals/${proposalId}/targets/${targetId}`, schema: Target, signal }),
    }),
  /** What of its light arrives, as it is stored. */
  light: (proposalId: string, targetId: string, bandId: BandId | undefined) =>
    queryOptions({
      queryKey: [...targetQueries.all(proposalId), 'light', targetId, bandId],
      queryFn: ({ signal }) =>
        api({
          path: `/proposals/${proposalId}/targets/${targetId}/light`,
          query: { bandId },
          schema: LightReport,
          signal,
        }),
      // Another band of the same target follows the one before; another target starts anew.
      placeholderData: (old: LightReport | undefined, query) => (query?.queryKey.includes(targetId) ? old : undefined),
    }),
  cosmicTime: (proposalId: string) =>
    queryOptions({
      queryKey: [...targetQueries.all(proposalId), 'cosmic-time'],
      queryFn: ({ signal }) =>
        api({ path: `/proposals/${proposalId}/targets/cosmic-time`, schema: CosmicTime, signal }),
    }),
  /** The text is named by its revision: millions of characters make a poor key. */
  importPreview: (proposalId: string, revision: string, request: ImportInput) =>
    queryOptions({
      queryKey: [...proposalKey(proposalId), 'import-preview', revision, request.options],
      queryFn: ({ signal }) =>
        api({
          method: 'POST',
          path: `/proposals/${proposalId}/targets/import-preview`,
          body: request,
          schema: ImportPreview,
          signal,
        }),
      placeholderData: keepPreviousData,
      staleTime: 60_000,
      gcTime: 0,
    }),
};

/** Distances of one redshift in a model beside the proposal's own. */
export function distancesBeside(cosmology: CosmologyChoice, redshift: number) {
  return queryOptions({
    queryKey: ['distances', cosmology, redshift],
    queryFn: ({ signal }) =>
      api({
        method: 'POST',
        path: '/distances',
        body: { cosmology, redshifts: [redshift] },
        schema: DistancesResponse,
        signal,
      }),
    staleTime: Infinity,
  });
}

export function targetsCsvUrl(proposalId: string): string {
  return apiUrl(`/proposals/${proposalId}/targets/export.csv`);
}

/** A changed target changes the strip, its observations, the hours and the chain at the head of the page. */
function refresh(client: QueryClient, proposalId: string) {
  return client.invalidateQueries({ queryKey: proposalKey(proposalId) });
}

/** Puts a target as the server stores it now into every page that shows it. */
export function placeTarget(client: QueryClient, proposalId: string, target: Target): void {
  client.setQueryData(targetQueries.one(proposalId, target.targetId).queryKey, target);
  client.setQueriesData<z.output<typeof TargetPage>>(
    { queryKey: [...targetQueries.all(proposalId), 'list'] },
    (page) => page && { ...page, rows: page.rows.map((row) => (row.targetId === target.targetId ? target : row)) },
  );
}

export function usePatchTarget(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ targetId, version, patch }: { targetId: string; version: number; patch: TargetPatch }) =>
      api({
        method: 'PATCH',
        path: `/proposals/${proposalId}/targets/${targetId}`,
        body: patch,
        ifMatch: version,
        schema: Target,
      }),
    onSuccess: (target) => {
      placeTarget(client, proposalId, target);
      // Not waited for: the row itself is already as stored, and the next cell must not wait for the strip.
      void refresh(client, proposalId);
    },
  });
}

export function useCreateTarget(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: NewTarget) =>
      api({ method: 'POST', path: `/proposals/${proposalId}/targets`, body: input, schema: Target }),
    onSuccess: () => refresh(client, proposalId),
  });
}

export function useRemoveTargets(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (targetIds: readonly string[]) =>
      api({
        method: 'POST',
        path: `/proposals/${proposalId}/targets/removal`,
        body: { targetIds },
        schema: RemovedTargets,
      }),
    onSuccess: () => refresh(client, proposalId),
  });
}

export interface ImportInput {
  text: string;
  options: {
    roles?: ImportRole[];
    hasHeader?: boolean;
    /** Only what a person chose: without it the header of the table may say it. */
    brightnessBandId?: BandId;
    brightnessSystem?: MagnitudeSystem;
    skipDuplicates: boolean;
  };
}

export function useImportTargets(proposalId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ request, idempotencyKey }: { request: ImportInput; idempotencyKey: string }) =>
      api({
        method: 'POST',
        path: `/proposals/${proposalId}/targets/import`,
        body: request,
        idempotencyKey,
        schema: ImportResult,
      }),
    onSuccess: () => refresh(client, proposalId),
  });
}

/** Longest page the list answers. */
const idPageSize = 500;

/** Identifiers of every target that a filter matches, page by page. */
export async function listTargetIds(proposalId: string, filter: Partial<TargetListQuery>): Promise<string[]> {
  const ids: string[] = [];
  for (let page = 1; ; page += 1) {
    const answer = await api({
      path: `/proposals/${proposalId}/targets`,
      query: { ...filter, page, pageSize: idPageSize },
      schema: TargetPage,
    });
    ids.push(...answer.rows.map((row) => row.targetId));
    if (answer.rows.length < idPageSize || ids.length >= answer.rowCount) return ids;
  }
}
