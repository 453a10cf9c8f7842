import { Injectable } from '@nestjs/common';
import { and, eq, inArray, sql } from 'drizzle-orm';
import { proposals } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';
import { HistoryService } from '../../platform/history.js';

/** The committee's answer, entered into the proposal. It knows no other subject, so that awards can use it. */
@Injectable()
export class ProposalOutcomesService {
  constructor(
    private readonly database: DatabaseService,
    private readonly history: HistoryService,
  ) {}

  /**
   * Takes a proposal that is before its panel to the state that was decided; in any other state it stays as it is. The entry
   * in its history names nobody: the decision is the panel's.
   */
  async setOutcome(proposalId: string, outcome: 'awarded' | 'declined'): Promise<void> {
    await this.database.transaction(async () => {
      const db = this.database.current();
      const [before] = await db
        .select({ state: proposals.state, title: proposals.title })
        .from(proposals)
        .where(and(eq(proposals.id, proposalId), inArray(proposals.state, ['submitted', 'inReview'])))
        .for('update');
      if (before === undefined) return;
      await db
        .update(proposals)
        .set({ state: outcome, updatedAt: new Date(), version: sql`${proposals.version} + 1` })
        .where(eq(proposals.id, proposalId));
      await this.history.record({
        personId: undefined,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: before.title,
        action: 'changed',
        details: { state: { before: before.state, after: outcome } },
      });
    });
  }
}
