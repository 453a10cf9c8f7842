import type { AwardInput } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import { and, eq, inArray, sql } from 'drizzle-orm';
import { awards } from '../../database/schema/awards.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class AwardsQueries {
  constructor(private readonly database: DatabaseService) {}

  async find(proposalId: string) {
    const [award] = await this.database.current().select().from(awards).where(eq(awards.proposalId, proposalId));
    return award;
  }

  async listByProposals(proposalIds: readonly string[]): Promise<{ proposalId: string; hours: number }[]> {
    if (proposalIds.length === 0) return [];
    return this.database
      .current()
      .select({ proposalId: awards.proposalId, hours: awards.hours })
      .from(awards)
      .where(inArray(awards.proposalId, [...proposalIds]));
  }

  /** @returns its id, or undefined when another request was first */
  async insert(proposalId: string, decidedBy: string, input: AwardInput): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .insert(awards)
      .values({ proposalId, decidedBy, ...input })
      .onConflictDoNothing()
      .returning({ awardId: awards.id });
    return row?.awardId;
  }

  /** @returns its id, or undefined when `version` is no longer the stored one */
  async update(proposalId: string, version: number, decidedBy: string, input: AwardInput): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .update(awards)
      .set({ ...input, decidedBy, updatedAt: new Date(), version: sql`${awards.version} + 1` })
      .where(and(eq(awards.proposalId, proposalId), eq(awards.version, version)))
      .returning({ awardId: awards.id });
    return row?.awardId;
  }

  /** @returns false when `version` is no longer the stored one */
  async delete(proposalId: string, version: number): Promise<boolean> {
    const rows = await this.database
      .current()
      .delete(awards)
      .where(and(eq(awards.proposalId, proposalId), eq(awards.version, version)))
      .returning({ id: awards.id });
    return rows.length === 1;
  }
}
