import type { Observation } from '@faintward/contracts/observations';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import type { SubmissionSummary, SubmittedContent } from '@faintward/contracts/submissions';
import type { Target } from '@faintward/contracts/targets';
import { Injectable } from '@nestjs/common';
import { and, asc, desc, eq, isNull, sql } from 'drizzle-orm';
import { people } from '../../database/schema/people.js';
import { proposals } from '../../database/schema/proposals.js';
import { semesters } from '../../database/schema/semesters.js';
import { type PartKind, submissionParts, submissions } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';
import { inBatches } from '../../engine/slices.js';
import { proposalLabel } from '../semesters/semesters.read-model.js';
import { upgradeSubmittedContent } from './upgrade-submitted-content.js';

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
      .select({
        submissionId: submissions.id,
        proposalId: submissions.proposalId,
        number: submissions.number,
        submittedAt: submissions.submittedAt,
        fingerprint: submissions.fingerprint,
        requestedHours: submissions.requestedHours,
        targetCount: submissions.targetCount,
      })
      .from(submissions)
      .where(and(eq(submissions.proposalId, proposalId), eq(submissions.isCurrent, true)));
    if (row === undefined) return undefined;
    const content = await this.contentOf(row.submissionId);
    return content === undefined ? undefined : { ...row, content };
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
    const content = await this.contentOf(submissionId);
    return content === undefined ? undefined : { ...summary, content };
  }

  async findSummary(proposalId: string, submissionId: string): Promise<SubmissionSummary | undefined> {
    const [summary] = await this.selectSummaries(proposalId, submissionId);
    return summary;
  }

  /** What a submission froze, whole, whether it was stored in parts or in one document. */
  async contentOf(submissionId: string): Promise<SubmittedContent | undefined> {
    const [row] = await this.database
      .current()
      .select({ content: submissions.content })
      .from(submissions)
      .where(eq(submissions.id, submissionId));
    if (row === undefined) return undefined;
    const { targets, observations, ...head } = row.content;
    return upgradeSubmittedContent({
      ...head,
      targets: targets ?? (await this.rowsOf<Target>(submissionId, 'targets')),
      observations: observations ?? (await this.rowsOf<Observation>(submissionId, 'observations')),
    });
  }

  private async rowsOf<Row extends Target | Observation>(submissionId: string, kind: PartKind): Promise<Row[]> {
    const isOfKind = and(eq(submissionParts.submissionId, submissionId), eq(submissionParts.kind, kind));
    const parts = await this.database
      .current()
      .select({ ordinal: submissionParts.ordinal })
      .from(submissionParts)
      .where(isOfKind)
      .orderBy(asc(submissionParts.ordinal));
    const rows: Row[] = [];
    await inBatches(parts, 1, async ([part]) => {
      if (part === undefined) return;
      const [stored] = await this.database
        .current()
        .select({ content: submissionParts.content })
        .from(submissionParts)
        .where(and(isOfKind, eq(submissionParts.ordinal, part.ordinal)));
      rows.push(...((stored?.content ?? []) as Row[]));
    });
    return rows;
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
