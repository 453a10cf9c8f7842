import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { observations } from '../../database/schema/observations.js';
import { type PartKind, type StoredContent, submissionParts, submissions } from '../../database/schema/submissions.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class SubmissionsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The newest submission, in place of the one that was; the caller keeps the proposal's row meanwhile. */
  async insertCurrent(row: {
    id: string;
    proposalId: string;
    submittedBy: string;
    submittedAt: Date;
    content: StoredContent;
    fingerprint: string;
    requestedHours: HoursByMoonClass;
    targetCount: number;
  }): Promise<{ submissionId: string; number: number }> {
    await this.retireCurrent(row.proposalId);
    const [inserted] = await this.database
      .current()
      .insert(submissions)
      .values({
        ...row,
        number: sql`(select coalesce(max(number), 0) + 1 from ${submissions} where proposal_id = ${row.proposalId}::uuid)`,
      })
      .returning({ submissionId: submissions.id, number: submissions.number });
    if (inserted === undefined) throw new Error('A submission was not stored.');
    return inserted;
  }

  async retireCurrent(proposalId: string): Promise<void> {
    await this.database
      .current()
      .update(submissions)
      .set({ isCurrent: false })
      .where(and(eq(submissions.proposalId, proposalId), eq(submissions.isCurrent, true)));
  }

  /** One part of a submission; `json` is the array of its rows. */
  async insertPart(part: {
    submissionId: string;
    proposalId: string;
    kind: PartKind;
    ordinal: number;
    json: string;
  }): Promise<void> {
    const { submissionId, proposalId, kind, ordinal, json } = part;
    await this.database
      .current()
      .insert(submissionParts)
      .values({ submissionId, proposalId, kind, ordinal, content: sql`${json}::jsonb` });
  }

  /** Parts of a submission that was not made. */
  async deleteParts(submissionId: string): Promise<void> {
    await this.database.current().delete(submissionParts).where(eq(submissionParts.submissionId, submissionId));
  }

  /** Parts that a process left behind when it ended before their submission was made. */
  async deleteAbandonedParts(proposalId: string): Promise<void> {
    await this.database.current().execute(sql`
      delete from ${submissionParts} where proposal_id = ${proposalId}::uuid and created_at < now() - interval '1 hour'
        and not exists (select 1 from ${submissions} where ${submissions}.id = ${submissionParts}.submission_id)`);
  }

  /** Differs whenever a target or an observation of the proposal differs from before. */
  async markOfRows(proposalId: string): Promise<string> {
    const rows = (select: ReturnType<typeof sql>) =>
      sql`(select coalesce(md5(string_agg(mark, ',' order by id)), '') from (${select}) as marked)`;
    const [row] = await this.database
      .current()
      .select({
        mark: sql<string>`${rows(
          sql`select id, row(id, version, nearest_duplicate_name)::text as mark from ${targets} where proposal_id = ${proposalId}::uuid`,
        )} || ' ' || ${rows(
          sql`select id, row(id, version)::text as mark from ${observations} where proposal_id = ${proposalId}::uuid`,
        )}`,
      })
      .from(sql`(select 1) as one`);
    if (row === undefined) throw new Error('The database gave no mark.');
    return row.mark;
  }
}
