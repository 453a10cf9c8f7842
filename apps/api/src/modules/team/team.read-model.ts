import type { TeamMember } from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { asc, desc, eq, sql } from 'drizzle-orm';
import { institutions, people } from '../../database/schema/people.js';
import { proposalMembers } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';

/** Teams as screens and submissions show them. Whoever asks has decided that their reader may see the proposal. */
@Injectable()
export class TeamReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** The principal investigator first, then in the order in which people joined. */
  async list(proposalId: string, viewerId: string): Promise<TeamMember[]> {
    const rows = await this.database
      .current()
      .select({
        memberId: proposalMembers.id,
        personId: proposalMembers.personId,
        name: sql<string>`${people.givenName} || ' ' || ${people.familyName}`,
        institutionName: institutions.name,
        access: proposalMembers.access,
        isPrincipal: proposalMembers.isPrincipal,
        signedAt: proposalMembers.signedAt,
        version: proposalMembers.version,
      })
      .from(proposalMembers)
      .innerJoin(people, eq(people.id, proposalMembers.personId))
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(eq(proposalMembers.proposalId, proposalId))
      .orderBy(
        desc(proposalMembers.isPrincipal),
        asc(proposalMembers.position),
        asc(proposalMembers.createdAt),
        asc(proposalMembers.id),
      );
    return rows.map((row) => ({
      ...row,
      signedAt: row.signedAt?.toISOString() ?? null,
      isMe: row.personId === viewerId,
    }));
  }
}
