import type { Award } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import { and, eq, inArray, isNotNull, sql } from 'drizzle-orm';
import { awards } from '../../database/schema/awards.js';
import { panels } from '../../database/schema/panels.js';
import { proposals } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';
import { isFreeOfConflict } from '../panels/conflict-conditions.read-model.js';

/** What ranking and proposals read of awards. It knows no other subject's services. */
@Injectable()
export class AwardsReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** Awards of a panel's proposals by proposal, without those with which `viewerId` has a conflict. */
  async mapOfPanel(panelId: string, viewerId: string): Promise<Map<string, Award>> {
    const rows = await this.database
      .current()
      .select({ award: awards })
      .from(awards)
      .innerJoin(proposals, eq(proposals.id, awards.proposalId))
      .where(and(eq(proposals.panelId, panelId), isFreeOfConflict(sql`${viewerId}::uuid`)));
    return new Map(rows.map(({ award }) => [award.proposalId, toAward(award)]));
  }

  /** Awards that have been told, by proposal: those of panels whose ranking is final. For teams; before that there is none. */
  async mapTold(proposalIds: readonly string[]): Promise<Map<string, Award>> {
    if (proposalIds.length === 0) return new Map();
    const rows = await this.database
      .current()
      .select({ award: awards })
      .from(awards)
      .innerJoin(proposals, eq(proposals.id, awards.proposalId))
      .innerJoin(panels, eq(panels.id, proposals.panelId))
      .where(and(inArray(awards.proposalId, [...proposalIds]), isNotNull(panels.finalisedAt)));
    return new Map(rows.map(({ award }) => [award.proposalId, toAward(award)]));
  }
}

function toAward(award: typeof awards.$inferSelect): Award {
  return {
    hours: award.hours,
    moonClass: award.moonClass,
    standing: award.standing,
    reason: award.reason,
    version: award.version,
  };
}
