import type { StoredSpectrum } from '@faintward/contracts/light-report';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { spectra } from '../../database/schema/spectra.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';
import { inBatches } from '../../engine/slices.js';

/** Points in one statement: some tens of milliseconds of the embedded database. */
export const POINTS_AT_ONCE = 2500;

/** An uploaded spectrum as light is computed with it: in vacuum at rest, ascending. */
export interface SpectrumPoints {
  wavelengthsNm: number[];
  /** f_λ on any scale. */
  fluxPerNm: number[];
  /** What results name. */
  contentHash: string;
  name: string;
  source: string;
}

/** Uploaded spectra, for those who have decided that their reader may see the proposal. */
@Injectable()
export class SpectraReadModel {
  constructor(private readonly database: DatabaseService) {}

  async list(proposalId: string): Promise<StoredSpectrum[]> {
    const rows = await this.database
      .current()
      .select({
        spectrumId: spectra.id,
        name: spectra.name,
        source: spectra.source,
        pointCount: spectra.pointCount,
        restLowNm: spectra.restLowNm,
        restHighNm: spectra.restHighNm,
        observedAtRedshift: spectra.observedAtRedshift,
        // Tables are named by hand: of a single table's fields drizzle leaves the table away, and `id` would be the inner one.
        usedByCount: sql<number>`(select count(*)::int from ${targets} where ${targets}.proposal_id = ${spectra}.proposal_id
          and ${targets}.light -> 'spectrum' ->> 'spectrumId' = ${spectra}.id::text)`,
        contentHash: spectra.contentHash,
        createdAt: spectra.createdAt,
        notices: spectra.notices,
      })
      .from(spectra)
      .where(eq(spectra.proposalId, proposalId))
      .orderBy(asc(spectra.createdAt), asc(spectra.id));
    return rows.map((row) => ({ ...row, createdAt: row.createdAt.toISOString() }));
  }

  async find(proposalId: string, spectrumId: string): Promise<StoredSpectrum | undefined> {
    // A proposal has a handful.
    return (await this.list(proposalId)).find((spectrum) => spectrum.spectrumId === spectrumId);
  }

  /** Those of these spectra that the proposal has; not those of other proposals. */
  async listOwn(proposalId: string, spectrumIds: readonly string[]): Promise<string[]> {
    if (spectrumIds.length === 0) return [];
    const rows = await this.database
      .current()
      .select({ spectrumId: spectra.id })
      .from(spectra)
      .where(and(eq(spectra.proposalId, proposalId), inArray(spectra.id, [...new Set(spectrumIds)])));
    return rows.map(({ spectrumId }) => spectrumId);
  }

  /** The points of a spectrum that the proposal has, read piece by piece with turns for others in between. */
  async findPoints(proposalId: string, spectrumId: string): Promise<SpectrumPoints | undefined> {
    const isWanted = and(eq(spectra.proposalId, proposalId), eq(spectra.id, spectrumId));
    const [row] = await this.database
      .current()
      .select({
        pointCount: spectra.pointCount,
        contentHash: spectra.contentHash,
        name: spectra.name,
        source: spectra.source,
      })
      .from(spectra)
      .where(isWanted);
    if (row === undefined) return undefined;
    const { pointCount, ...named } = row;
    const wavelengthsNm: number[] = [];
    const fluxPerNm: number[] = [];
    const starts = Array.from({ length: Math.ceil(pointCount / POINTS_AT_ONCE) }, (_, piece) => piece * POINTS_AT_ONCE);
    await inBatches(starts, 1, async ([start = 0]) => {
      // Postgres counts from 1, and both ends belong to a slice.
      const slice = sql.raw(`[${start + 1}:${start + POINTS_AT_ONCE}]`);
      const [piece] = await this.database
        .current()
        .select({
          wavelengthsNm: sql<number[]>`${spectra.wavelengthsNm}${slice}`,
          fluxPerNm: sql<number[]>`${spectra.fluxPerNm}${slice}`,
        })
        .from(spectra)
        .where(isWanted);
      wavelengthsNm.push(...(piece?.wavelengthsNm ?? []));
      fluxPerNm.push(...(piece?.fluxPerNm ?? []));
    });
    return { ...named, wavelengthsNm, fluxPerNm };
  }
}
