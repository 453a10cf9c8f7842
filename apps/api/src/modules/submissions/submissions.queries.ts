import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import type { SubmittedContent } from '@faintward/contracts/submissions';
import { Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { submissions } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class SubmissionsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The newest submission, in place of the one that was; the caller keeps the proposal's row meanwhile. */
  async insertCurrent(row: {
    proposalId: string;
    submittedBy: string;
    submittedAt: Date;
    content: SubmittedContent;
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
}
