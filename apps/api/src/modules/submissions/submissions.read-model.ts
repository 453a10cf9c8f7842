import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import type { SubmissionSummary, SubmittedContent } from '@faintward/contracts/submissions';
import { Injectable } from '@nestjs/common';
import { and, asc, desc, eq, isNull, sql } from 'drizzle-orm';
import { people } from '../../database/schema/people.js';
import { proposals } from '../../database/schema/proposals.js';
import { semesters } from '../../database/schema/semesters.js';
import { submissions } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';
import { proposalLabel } from '../semesters/semesters.read-model.js';

export interface CurrentSubmission {
  submissionId: string;
  proposalId: string;
  number: number;
  submittedAt: Date;
  fingerprint: string;
  content: SubmittedContent;
  requestedHours: HoursByMoonClass;
  targetCount: number;
}

/** A submitted proposal without its content. */
export interface CurrentSubmissionSummary {
  submissionId: string;
  proposalId: string;
  label: string;
  title: string;
  submittedAt: Date;
  requestedHours: HoursByMoonClass;
  targetCount: number;
}

/**
 * Submitted content, for those who have decided that their reader may see it: this model decides nothing about access, and
 * knows nothing of conflicts.
 */
@Injectable()
export class SubmissionsReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** What the committee reads of a proposal; undefined while it is not submitted. */
  async currentContent(proposalId: string): Promise<CurrentSubmission | undefined> {
    const [row] = await this.database
      .current()
      .select()
      .from(submissions)
      .where(and(eq(submissions.proposalId, proposalId), eq(submissions.isCurrent, true)));
    return row === undefined ? undefined : { ...row, submissionId: row.id };
  }

  /** The submitted proposals of a panel, in the order of their labels. */
  async currentByPanel(panelId: string): Promise<CurrentSubmissionSummary[]> {
    const rows = await this.database
      .current()
      .select({
        submissionId: submissions.id,
        proposalId: submissions.proposalId,
        labelPrefix: semesters.labelPrefix,
        number: proposals.number,
        title: sql<string>`${submissions.content} ->> 'title'`,
        submittedAt: submissions.submittedAt,
        requestedHours: submissions.requestedHours,
        targetCount: submissions.targetCount,
      })
      .from(submissions)
      .innerJoin(proposals, eq(proposals.id, submissions.proposalId))
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .where(and(eq(proposals.panelId, panelId), eq(submissions.isCurrent, true), isNull(proposals.deletedAt)))
      .orderBy(asc(semesters.labelPrefix), asc(proposals.number));
    return rows.map(({ labelPrefix, number, ...row }) => ({ ...row, label: proposalLabel(labelPrefix, number) }));
  }

  /** Every submission of a proposal, the newest first, withdrawn and replaced ones included. */
  async listOfProposal(proposalId: string): Promise<SubmissionSummary[]> {
    return this.selectSummaries(proposalId);
  }

  /** One submission with the content that it froze. */
  async find(
    proposalId: string,
    submissionId: string,
  ): Promise<(SubmissionSummary & { content: SubmittedContent }) | undefined> {
    const [summary] = await this.selectSummaries(proposalId, submissionId);
    if (summary === undefined) return undefined;
    const [row] = await this.database
      .current()
      .select({ content: submissions.content })
      .from(submissions)
      .where(eq(submissions.id, submissionId));
    return row === undefined ? undefined : { ...summary, content: row.content };
  }

  private async selectSummaries(proposalId: string, submissionId?: string): Promise<SubmissionSummary[]> {
    const rows = await this.database
      .current()
      .select({
        submissionId: submissions.id,
        number: submissions.number,
        submittedAt: submissions.submittedAt,
        submittedByName: sql<string>`${people.givenName} || ' ' || ${people.familyName}`,
        fingerprint: submissions.fingerprint,
        targetCount: submissions.targetCount,
        requestedHours: submissions.requestedHours,
        isCurrent: submissions.isCurrent,
      })
      .from(submissions)
      .innerJoin(people, eq(people.id, submissions.submittedBy))
      .where(
        and(
          eq(submissions.proposalId, proposalId),
          submissionId === undefined ? undefined : eq(submissions.id, submissionId),
        ),
      )
      .orderBy(desc(submissions.number));
    return rows.map((row) => ({ ...row, submittedAt: row.submittedAt.toISOString() }));
  }
}
