import type { Notice } from '@faintward/contracts/common';
import { Injectable } from '@nestjs/common';
import { and, count, eq, sql } from 'drizzle-orm';
import { spectra } from '../../database/schema/spectra.js';
import { submissionParts } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';
import { inBatches } from '../../engine/slices.js';
import { POINTS_AT_ONCE } from './spectra.read-model.js';

export interface NewSpectrumRow {
  proposalId: string;
  name: string;
  source: string;
  wavelengthsNm: number[];
  fluxPerNm: number[];
  pointCount: number;
  restLowNm: number;
  restHighNm: number;
  observedAtRedshift: number;
  contentHash: string;
  notices: Notice[];
  createdBy: string;
}

@Injectable()
export class SpectraQueries {
  constructor(private readonly database: DatabaseService) {}

  async insert(row: NewSpectrumRow): Promise<string> {
    const { wavelengthsNm, fluxPerNm } = row;
    const [inserted] = await this.database
      .current()
      .insert(spectra)
      .values({ ...row, wavelengthsNm: [], fluxPerNm: [] })
      .returning({ id: spectra.id });
    if (inserted === undefined) throw new Error('A spectrum was not stored.');
    const { id } = inserted;
    // Piece by piece: the embedded database takes fifty thousand points in half a second, in which nobody else is served.
    const points = wavelengthsNm.map((nm, index) => [nm, fluxPerNm[index] ?? 0] as const);
    await inBatches(points, POINTS_AT_ONCE, (piece) =>
      this.database
        .current()
        .update(spectra)
        .set({
          wavelengthsNm: sql`${spectra.wavelengthsNm} || ${arrayText(piece.map(([nm]) => nm))}::text::double precision[]`,
          fluxPerNm: sql`${spectra.fluxPerNm} || ${arrayText(piece.map(([, flux]) => flux))}::text::double precision[]`,
        })
        .where(eq(spectra.id, id)),
    );
    return id;
  }

  async delete(proposalId: string, spectrumId: string): Promise<void> {
    await this.database
      .current()
      .delete(spectra)
      .where(and(eq(spectra.proposalId, proposalId), eq(spectra.id, spectrumId)));
  }

  async count(proposalId: string): Promise<number> {
    const [row] = await this.database
      .current()
      .select({ spectrumCount: count() })
      .from(spectra)
      .where(eq(spectra.proposalId, proposalId));
    return row?.spectrumCount ?? 0;
  }

  /** Whether a submission froze a target whose light uses the spectrum. */
  async isSubmitted(proposalId: string, spectrumId: string): Promise<boolean> {
    const path = `$[*].light.spectrum.spectrumId ? (@ == "${spectrumId}")`;
    const rows = await this.database
      .current()
      .select({ submissionId: submissionParts.submissionId })
      .from(submissionParts)
      .where(
        and(
          eq(submissionParts.proposalId, proposalId),
          eq(submissionParts.kind, 'targets'),
          sql`${submissionParts.content} @? ${path}::jsonpath`,
        ),
      )
      .limit(1);
    return rows.length > 0;
  }
}

function arrayText(numbers: readonly number[]): string {
  return `{${numbers.join(',')}}`;
}
