import type { CaseSection, CaseSectionId, CaseSectionInput } from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { staleVersion } from '../../platform/domain-error.js';
import { HistoryService } from '../../platform/history.js';
import { CASE_SECTIONS, countWords, UNWRITTEN_VERSION } from './case-sections.js';
import { ProposalAccess } from './proposal-access.service.js';
import { ProposalsQueries } from './proposals.queries.js';
import { ProposalsReadModel } from './proposals.read-model.js';

/** How long, from its first save on, one person's writing in one section is one change of the history. */
const ONE_CHANGE_MINUTES = 10;

/** The text of a proposal's case. Longer than the limit may be saved, so that nothing written is lost, but not submitted. */
@Injectable()
export class CaseService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: ProposalsQueries,
    private readonly readModel: ProposalsReadModel,
    private readonly history: HistoryService,
  ) {}

  async list(actor: Actor, proposalId: string): Promise<{ rows: CaseSection[] }> {
    await this.access.requireRead(actor, proposalId);
    return { rows: await this.listStored(proposalId) };
  }

  async save(
    actor: Actor,
    proposalId: string,
    sectionId: CaseSectionId,
    version: number,
    { body }: CaseSectionInput,
  ): Promise<CaseSection> {
    return this.database.transaction(async () => {
      await this.access.requireEverythingForChange(actor, proposalId);
      const before = await this.getStored(proposalId, sectionId);
      if (before.version !== version) throw staleVersion(before);
      if (before.body === body) return before;
      const isStored =
        before.updatedAt === null
          ? await this.queries.insertSection(proposalId, sectionId, actor.personId, body, UNWRITTEN_VERSION + 1)
          : await this.queries.updateSection(proposalId, sectionId, actor.personId, body, version);
      if (!isStored) throw staleVersion(await this.getStored(proposalId, sectionId));
      await this.record(actor, proposalId, before, body);
      await this.access.touch(proposalId);
      return this.getStored(proposalId, sectionId);
    });
  }

  /**
   * Drafts are saved every few seconds while somebody writes. What one person does to one section within some minutes is one
   * change: its entry keeps the text that was there before the first of these saves.
   */
  private async record(actor: Actor, proposalId: string, before: CaseSection, body: string): Promise<void> {
    const open = await this.queries.findOpenSectionChange(
      proposalId,
      before.sectionId,
      actor.personId,
      new Date(Date.now() - ONE_CHANGE_MINUTES * 60_000),
    );
    const detailsFrom = (text: string, wordCount: number) => ({
      body: { before: text, after: body },
      wordCount: { before: wordCount, after: countWords(body) },
    });
    if (open !== undefined) {
      await this.queries.extendChange(open.changeId, detailsFrom(open.bodyBefore, countWords(open.bodyBefore)));
      return;
    }
    await this.history.record({
      personId: actor.personId,
      scope: 'proposal',
      scopeId: proposalId,
      subject: 'caseSection',
      subjectId: before.sectionId,
      subjectName: before.title,
      action: 'changed',
      details: detailsFrom(before.body, before.wordCount),
    });
  }

  /** For whoever has decided that its reader may see the proposal. */
  async listStored(proposalId: string): Promise<CaseSection[]> {
    const stored = new Map((await this.readModel.listSections(proposalId)).map((row) => [row.sectionId, row]));
    return CASE_SECTIONS.map((rule) => {
      const row = stored.get(rule.sectionId);
      const body = row?.body ?? '';
      return {
        ...rule,
        body,
        wordCount: countWords(body),
        version: row?.version ?? UNWRITTEN_VERSION,
        updatedAt: row?.updatedAt.toISOString() ?? null,
        updatedByName: row?.updatedByName ?? null,
      };
    });
  }

  private async getStored(proposalId: string, sectionId: CaseSectionId): Promise<CaseSection> {
    const section = (await this.listStored(proposalId)).find((each) => each.sectionId === sectionId);
    if (section === undefined) throw new Error(`There is no rule for the section ${sectionId}.`);
    return section;
  }
}
