import { Injectable } from '@nestjs/common';
import { eq } from 'drizzle-orm';
import { proposals } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';
import { HistoryService } from '../../platform/history.js';
import { ConflictsQueries } from './conflicts.queries.js';

/** Finds and keeps who must not see which proposal. */
@Injectable()
export class ConflictsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: ConflictsQueries,
    private readonly history: HistoryService,
  ) {}

  /**
   * Finds the conflicts between a proposal's team and the members of its panel, and stores the new ones. Call it whenever a
   * proposal is submitted; a second call finds nothing new.
   */
  async detectForProposal(proposalId: string): Promise<{ addedCount: number }> {
    return this.database.transaction(async () => {
      const panelId = await this.queries.panelOfProposal(proposalId);
      if (panelId === null) return { addedCount: 0 };
      const added = await this.queries.insertFound(eq(proposals.id, proposalId));
      await this.recordFound(panelId, added);
      return { addedCount: added.length };
    });
  }

  /** The same for all proposals of a panel: people change institutions, and panels their members. */
  async detectForPanel(panelId: string): Promise<{ addedCount: number }> {
    return this.database.transaction(async () => {
      const added = await this.queries.insertFound(eq(proposals.panelId, panelId));
      await this.recordFound(panelId, added);
      return { addedCount: added.length };
    });
  }

  /** A person says that they are not free to judge. The caller has made sure that they may see the proposal. */
  async declare(personId: string, panelId: string, proposalId: string, reason: string): Promise<void> {
    await this.database.transaction(async () => {
      const conflictId = await this.queries.declare(proposalId, personId, reason);
      await this.history.record({
        personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'conflict',
        subjectId: conflictId,
        action: 'declared',
        details: { reason: { before: null, after: reason } },
      });
    });
  }

  private async recordFound(panelId: string, found: readonly { conflictId: string; kind: string }[]): Promise<void> {
    await this.history.record(
      ...found.map(({ conflictId, kind }) => ({
        personId: undefined,
        scope: 'panel',
        scopeId: panelId,
        subject: 'conflict',
        subjectId: conflictId,
        action: 'found',
        details: { kind: { before: null, after: kind } },
      })),
    );
  }
}
