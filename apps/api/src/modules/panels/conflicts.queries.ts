import type { ConflictKind } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import { and, eq, isNotNull, isNull, sql, type SQL } from 'drizzle-orm';
import { alias } from 'drizzle-orm/pg-core';
import { conflicts } from '../../database/schema/assignments.js';
import { panelMembers } from '../../database/schema/panels.js';
import { people } from '../../database/schema/people.js';
import { proposalMembers, proposals } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';
import { isConflicted } from './conflict-conditions.read-model.js';

const teamPeople = alias(people, 'team_people');

@Injectable()
export class ConflictsQueries {
  constructor(private readonly database: DatabaseService) {}

  /**
   * Stores the conflicts that the rules find between members of a panel and its proposals: being on the team, or belonging
   * to the institution of anybody on it. A conflict that is stored already, withdrawn or not, stays as it is.
   *
   * @param condition which proposals
   * @returns the new ones
   */
  async insertFound(condition: SQL): Promise<{ conflictId: string; kind: ConflictKind }[]> {
    const db = this.database.current();
    const onTeam = await db
      .selectDistinct({ proposalId: proposals.id, personId: panelMembers.personId })
      .from(proposals)
      .innerJoin(panelMembers, eq(panelMembers.panelId, proposals.panelId))
      .innerJoin(
        proposalMembers,
        and(eq(proposalMembers.proposalId, proposals.id), eq(proposalMembers.personId, panelMembers.personId)),
      )
      .where(condition);
    const sameInstitution = await db
      .selectDistinct({ proposalId: proposals.id, personId: panelMembers.personId })
      .from(proposals)
      .innerJoin(panelMembers, eq(panelMembers.panelId, proposals.panelId))
      .innerJoin(people, eq(people.id, panelMembers.personId))
      .innerJoin(proposalMembers, eq(proposalMembers.proposalId, proposals.id))
      .innerJoin(
        teamPeople,
        and(
          eq(teamPeople.id, proposalMembers.personId),
          eq(teamPeople.institutionId, people.institutionId),
          sql`${teamPeople.id} <> ${people.id}`,
        ),
      )
      .where(and(condition, isNotNull(people.institutionId)));
    const found = [
      ...onTeam.map((row) => ({ ...row, kind: 'team' as const, reason: 'On the team of the proposal.' })),
      ...sameInstitution.map((row) => ({
        ...row,
        kind: 'institution' as const,
        reason: 'Same institution as somebody on the team.',
      })),
    ];
    if (found.length === 0) return [];
    return db
      .insert(conflicts)
      .values(found)
      .onConflictDoNothing()
      .returning({ conflictId: conflicts.id, kind: conflicts.kind });
  }

  async declare(proposalId: string, personId: string, reason: string): Promise<string> {
    const [row] = await this.database
      .current()
      .insert(conflicts)
      .values({ proposalId, personId, kind: 'declared', reason })
      .onConflictDoUpdate({
        target: [conflicts.proposalId, conflicts.personId, conflicts.kind],
        set: { reason, withdrawnAt: null },
      })
      .returning({ conflictId: conflicts.id });
    if (row === undefined) throw new Error('A conflict was not stored.');
    return row.conflictId;
  }

  async panelOfProposal(proposalId: string): Promise<string | null> {
    const [row] = await this.database
      .current()
      .select({ panelId: proposals.panelId })
      .from(proposals)
      .where(eq(proposals.id, proposalId));
    return row?.panelId ?? null;
  }

  /** Pairs of person and proposal of a panel that must be kept apart. */
  async listOfPanel(panelId: string): Promise<{ proposalId: string; personId: string }[]> {
    return this.database
      .current()
      .select({ proposalId: proposals.id, personId: panelMembers.personId })
      .from(proposals)
      .innerJoin(panelMembers, eq(panelMembers.panelId, proposals.panelId))
      .where(
        and(eq(proposals.panelId, panelId), isNull(proposals.deletedAt), isConflicted(sql`${panelMembers.personId}`)),
      );
  }
}
