import type { StoredSpectrum } from '@faintward/contracts/light-report';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, inArray, sql } from 'drizzle-orm';
import { spectra } from '../../database/schema/spectra.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';

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

  /** The points of those spectra that the proposal has; others are left out, also those of other proposals. */
  async findPoints(proposalId: string, spectrumIds: readonly string[]): Promise<Map<string, SpectrumPoints>> {
    if (spectrumIds.length === 0) return new Map();
    const rows = await this.database
      .current()
      .select({
        spectrumId: spectra.id,
        wavelengthsNm: spectra.wavelengthsNm,
        fluxPerNm: spectra.fluxPerNm,
        contentHash: spectra.contentHash,
        name: spectra.name,
        source: spectra.source,
      })
      .from(spectra)
      .where(and(eq(spectra.proposalId, proposalId), inArray(spectra.id, [...new Set(spectrumIds)])));
    return new Map(rows.map(({ spectrumId, ...points }) => [spectrumId, points]));
  }

  async exists(proposalId: string, spectrumId: string): Promise<boolean> {
    const rows = await this.database
      .current()
      .select({ spectrumId: spectra.id })
      .from(spectra)
      .where(and(eq(spectra.proposalId, proposalId), eq(spectra.id, spectrumId)));
    return rows.length > 0;
  }
}
