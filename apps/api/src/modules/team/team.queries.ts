import type { TeamAccess } from '@faintward/contracts/permissions';
import { Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { people } from '../../database/schema/people.js';
import { proposalMembers } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class TeamQueries {
  constructor(private readonly database: DatabaseService) {}

  async findPersonName(personId: string): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .select({ name: sql<string>`${people.givenName} || ' ' || ${people.familyName}` })
      .from(people)
      .where(eq(people.id, personId));
    return row?.name;
  }

  /** The member, kept from other writers until the transaction ends. */
  async findLocked(proposalId: string, memberId: string) {
    const [row] = await this.database
      .current()
      .select()
      .from(proposalMembers)
      .where(and(eq(proposalMembers.id, memberId), eq(proposalMembers.proposalId, proposalId)))
      .for('update');
    return row;
  }

  /** After everybody who is on the team already. */
  async insert(proposalId: string, personId: string, access: TeamAccess): Promise<string> {
    const [row] = await this.database
      .current()
      .insert(proposalMembers)
      .values({
        proposalId,
        personId,
        access,
        position: sql`(select coalesce(max(position), 0) + 1 from ${proposalMembers} where proposal_id = ${proposalId}::uuid)`,
      })
      .returning({ memberId: proposalMembers.id });
    if (row === undefined) throw new Error('A member was not stored.');
    return row.memberId;
  }

  async setAccess(memberId: string, access: TeamAccess): Promise<void> {
    await this.database
      .current()
      .update(proposalMembers)
      .set({ access, version: sql`${proposalMembers.version} + 1` })
      .where(eq(proposalMembers.id, memberId));
  }

  async setSigned(memberId: string, signedAt: Date): Promise<void> {
    await this.database
      .current()
      .update(proposalMembers)
      .set({ signedAt, version: sql`${proposalMembers.version} + 1` })
      .where(eq(proposalMembers.id, memberId));
  }

  async delete(memberId: string): Promise<void> {
    await this.database.current().delete(proposalMembers).where(eq(proposalMembers.id, memberId));
  }
}
