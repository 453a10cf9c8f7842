import { type NewSpectrum, type StoredSpectrum } from '@faintward/contracts/light-report';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, notFound } from '../../platform/domain-error.js';
import { HistoryService } from '../../platform/history.js';
import { ProposalAccess } from '../proposals/proposal-access.service.js';
import { SpectraQueries } from './spectra.queries.js';
import { SpectraReadModel } from './spectra.read-model.js';
import { readSpectrumText } from './spectrum-text.js';

/** Most spectra of one proposal: each may be a megabyte. */
const MAX_SPECTRUM_COUNT = 50;

/** Spectra that a team brings for its targets. They are added and removed, never changed. */
@Injectable()
export class SpectraService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: SpectraQueries,
    private readonly readModel: SpectraReadModel,
    private readonly history: HistoryService,
  ) {}

  async list(actor: Actor, proposalId: string): Promise<{ rows: StoredSpectrum[] }> {
    await this.access.requireRead(actor, proposalId);
    return { rows: await this.readModel.list(proposalId) };
  }

  /** @throws {DomainError} `validation-failed` at `text` for what is no spectrum */
  async create(actor: Actor, proposalId: string, input: NewSpectrum): Promise<StoredSpectrum> {
    await this.access.requireTargets(actor, proposalId);
    // Before the transaction begins, which keeps others from the database: fifty thousand lines take a second to read.
    const { wavelengthsNm, fluxPerNm, contentHash, notices } = await readSpectrumText(input);
    const { name, source, observedAtRedshift } = input;
    return this.database.transaction(async () => {
      await this.access.requireTargetsForChange(actor, proposalId);
      if ((await this.queries.count(proposalId)) >= MAX_SPECTRUM_COUNT) {
        throw new DomainError('conflict', `A proposal holds at most ${MAX_SPECTRUM_COUNT} spectra. Remove one first.`);
      }
      const pointCount = wavelengthsNm.length;
      const spectrumId = await this.queries.insert({
        proposalId,
        name,
        source,
        wavelengthsNm,
        fluxPerNm,
        pointCount,
        restLowNm: wavelengthsNm[0] ?? 0,
        restHighNm: wavelengthsNm.at(-1) ?? 0,
        observedAtRedshift,
        contentHash,
        notices,
        createdBy: actor.personId,
      });
      await this.record(actor, proposalId, spectrumId, name, 'created', {
        pointCount: { before: null, after: pointCount },
        contentHash: { before: null, after: contentHash },
      });
      const stored = await this.readModel.find(proposalId, spectrumId);
      if (stored === undefined) throw new Error('A spectrum was not stored.');
      return stored;
    });
  }

  /** @throws {DomainError} `conflict` while a target or a submission uses it */
  async remove(actor: Actor, proposalId: string, spectrumId: string): Promise<void> {
    await this.database.transaction(async () => {
      await this.access.requireTargetsForChange(actor, proposalId);
      const spectrum = await this.readModel.find(proposalId, spectrumId);
      if (spectrum === undefined) throw notFound('spectrum');
      const { name, usedByCount, contentHash } = spectrum;
      if (usedByCount > 0) {
        throw new DomainError(
          'conflict',
          `${usedByCount === 1 ? 'One target uses' : `${usedByCount} targets use`} this spectrum. Give ${usedByCount === 1 ? 'it' : 'them'} another one first.`,
        );
      }
      if (await this.queries.isSubmitted(proposalId, spectrumId)) {
        throw new DomainError(
          'conflict',
          'A submission of this proposal uses this spectrum, which has to stay for its numbers to be explained.',
        );
      }
      await this.queries.delete(proposalId, spectrumId);
      await this.record(actor, proposalId, spectrumId, name, 'removed', {
        contentHash: { before: contentHash, after: null },
      });
    });
  }

  private async record(
    actor: Actor,
    proposalId: string,
    spectrumId: string,
    name: string,
    action: 'created' | 'removed',
    details: Record<string, { before: unknown; after: unknown }>,
  ): Promise<void> {
    await this.history.record({
      personId: actor.personId,
      scope: 'proposal',
      scopeId: proposalId,
      subject: 'spectrum',
      subjectId: spectrumId,
      subjectName: name,
      action,
      details,
    });
    await this.access.touch(proposalId);
  }
}
