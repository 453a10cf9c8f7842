import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { CaseSectionId, ProposalState } from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { and, desc, eq, gte, or, sql } from 'drizzle-orm';
import { changes } from '../../database/schema/history.js';
import { caseSections, proposalMembers, proposals } from '../../database/schema/proposals.js';
import { DatabaseService } from '../../database/transaction.js';

export interface ProposalFields {
  title: string;
  abstract: string;
  keywords: string[];
  panelId: string | null;
  partnerId: string | null;
  cosmology: CosmologyChoice;
}

@Injectable()
export class ProposalsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** A draft with the next number of its semester, and its first member; within a transaction. */
  async insert(semesterId: string, title: string, principalId: string): Promise<string> {
    const db = this.database.current();
    // Those who create at the same moment get their numbers one after the other; the unique constraint would stop the rest.
    await db.execute(sql`select pg_advisory_xact_lock(hashtext('proposal-number'), hashtext(${semesterId}))`);
    const [row] = await db
      .insert(proposals)
      .values({
        semesterId,
        title,
        number: sql`(select coalesce(max(number), 0) + 1 from ${proposals} where semester_id = ${semesterId}::uuid)`,
      })
      .returning({ proposalId: proposals.id });
    if (row === undefined) throw new Error('A proposal was not stored.');
    await db
      .insert(proposalMembers)
      .values({ proposalId: row.proposalId, personId: principalId, access: 'editsEverything', isPrincipal: true });
    return row.proposalId;
  }

  async findFields(proposalId: string): Promise<ProposalFields | undefined> {
    const [row] = await this.database
      .current()
      .select({
        title: proposals.title,
        abstract: proposals.abstract,
        keywords: proposals.keywords,
        panelId: proposals.panelId,
        partnerId: proposals.partnerId,
        cosmology: proposals.cosmology,
      })
      .from(proposals)
      .where(eq(proposals.id, proposalId));
    return row;
  }

  async update(proposalId: string, fields: Partial<ProposalFields>): Promise<void> {
    await this.database
      .current()
      .update(proposals)
      .set({ ...fields, updatedAt: new Date(), version: sql`${proposals.version} + 1` })
      .where(eq(proposals.id, proposalId));
  }

  async setState(proposalId: string, state: ProposalState): Promise<void> {
    await this.database
      .current()
      .update(proposals)
      .set({ state, updatedAt: new Date(), version: sql`${proposals.version} + 1` })
      .where(eq(proposals.id, proposalId));
  }

  async markDeleted(proposalId: string): Promise<void> {
    await this.database
      .current()
      .update(proposals)
      .set({ deletedAt: new Date(), version: sql`${proposals.version} + 1` })
      .where(eq(proposals.id, proposalId));
  }

  /**
   * The newest change of a section, if it is this person's, not older than `since`, and nothing was submitted after it: what
   * was submitted must stand between two entries.
   */
  async findOpenSectionChange(
    proposalId: string,
    sectionId: string,
    personId: string,
    since: Date,
  ): Promise<{ changeId: string; bodyBefore: string } | undefined> {
    const [newest] = await this.database
      .current()
      .select({
        changeId: changes.id,
        personId: changes.personId,
        subject: changes.subject,
        bodyBefore: sql<string | null>`${changes.details} -> 'body' ->> 'before'`,
      })
      .from(changes)
      .where(
        and(
          eq(changes.scope, 'proposal'),
          eq(changes.scopeId, proposalId),
          gte(changes.at, since),
          or(
            and(eq(changes.subject, 'caseSection'), eq(changes.subjectId, sectionId)),
            eq(changes.subject, 'submission'),
          ),
        ),
      )
      .orderBy(desc(changes.at))
      .limit(1);
    return newest?.subject === 'caseSection' && newest.personId === personId && newest.bodyBefore !== null
      ? { changeId: newest.changeId, bodyBefore: newest.bodyBefore }
      : undefined;
  }

  async extendChange(changeId: string, details: (typeof changes.$inferInsert)['details']): Promise<void> {
    await this.database.current().update(changes).set({ details }).where(eq(changes.id, changeId));
  }

  /** @returns false when somebody else has begun the section meanwhile */
  async insertSection(
    proposalId: string,
    sectionId: CaseSectionId,
    updatedBy: string,
    body: string,
    version: number,
  ): Promise<boolean> {
    const inserted = await this.database
      .current()
      .insert(caseSections)
      .values({ proposalId, sectionId, body, updatedBy, version })
      .onConflictDoNothing()
      .returning({ version: caseSections.version });
    return inserted.length > 0;
  }

  /** @returns false when the stored version is another one */
  async updateSection(
    proposalId: string,
    sectionId: CaseSectionId,
    updatedBy: string,
    body: string,
    version: number,
  ): Promise<boolean> {
    const updated = await this.database
      .current()
      .update(caseSections)
      .set({ body, updatedBy, updatedAt: new Date(), version: sql`${caseSections.version} + 1` })
      .where(
        and(
          eq(caseSections.proposalId, proposalId),
          eq(caseSections.sectionId, sectionId),
          eq(caseSections.version, version),
        ),
      )
      .returning({ version: caseSections.version });
    return updated.length > 0;
  }
}
