import type { ProposalState } from '@faintward/contracts/proposals';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import type { SubmittedContent } from '@faintward/contracts/submissions';
import { Injectable } from '@nestjs/common';
import { and, asc, count, eq, inArray, isNull, lt, sql, type SQL } from 'drizzle-orm';
import { assignments } from '../../database/schema/assignments.js';
import { panelMembers } from '../../database/schema/panels.js';
import { proposals } from '../../database/schema/proposals.js';
import { semesters } from '../../database/schema/semesters.js';
import { submissions } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';
import { DEADLINE_GRACE_SECONDS, proposalLabel } from '../semesters/semesters.read-model.js';
import { SubmissionsReadModel } from '../submissions/submissions.read-model.js';
import { isConflicted, isFreeOfConflict } from './conflict-conditions.read-model.js';

/** A proposal as its panel knows it: what was submitted, never the working copy. */
export interface PanelProposalRow {
  proposalId: string;
  panelId: string;
  label: string;
  title: string;
  /** The team's share; in an anonymised semester it says something about the team. */
  partnerName: string | null;
  state: ProposalState;
  requestedHours: HoursByMoonClass;
  targetCount: number;
}

const BEFORE_THE_PANEL: ProposalState[] = ['submitted', 'inReview', 'awarded', 'declined'];

/**
 * Condition on `proposals` and `semesters`: the proposal lies before its panel. Until the deadline it may still be changed and
 * submitted again, so that nobody may begin to judge it; nor within the seconds in which late requests are still taken.
 */
function isBeforeThePanel(): SQL | undefined {
  return and(
    inArray(proposals.state, BEFORE_THE_PANEL),
    isNull(proposals.deletedAt),
    lt(semesters.deadlineAt, new Date(Date.now() - DEADLINE_GRACE_SECONDS * 1000)),
  );
}

/**
 * What a committee sees of proposals: from the deadline on, what was submitted last. It reads the submissions itself, because a conflict has to be left out by the
 * query that would otherwise have read its row.
 */
@Injectable()
export class PanelProposalsReadModel {
  constructor(
    private readonly database: DatabaseService,
    private readonly submissions: SubmissionsReadModel,
  ) {}

  /** The panel's submitted proposals without those that `viewerId` has a conflict with, in the order of their labels. */
  async listVisible(panelId: string, viewerId: string): Promise<PanelProposalRow[]> {
    return this.select(and(eq(proposals.panelId, panelId), isFreeOfConflict(sql`${viewerId}::uuid`)));
  }

  /** One of them; undefined when it is not before that person's panel or the person has a conflict. */
  async findVisible(proposalId: string, viewerId: string): Promise<PanelProposalRow | undefined> {
    const [row] = await this.select(
      and(eq(proposals.id, proposalId), isOnPanelOf(viewerId), isFreeOfConflict(sql`${viewerId}::uuid`)),
    );
    return row;
  }

  /** What was submitted, whole, under the same conditions as {@link findVisible}. */
  async findVisibleContent(proposalId: string, viewerId: string): Promise<SubmittedContent | undefined> {
    const [row] = await this.database
      .current()
      .select({ submissionId: submissions.id })
      .from(submissions)
      .innerJoin(proposals, eq(proposals.id, submissions.proposalId))
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .where(
        and(
          eq(proposals.id, proposalId),
          eq(submissions.isCurrent, true),
          isBeforeThePanel(),
          isOnPanelOf(viewerId),
          isFreeOfConflict(sql`${viewerId}::uuid`),
        ),
      );
    return row === undefined ? undefined : this.submissions.contentOf(row.submissionId);
  }

  /** Those among `proposalIds` that `viewerId` has no conflict with. */
  async listVisibleByIds(proposalIds: readonly string[], viewerId: string): Promise<PanelProposalRow[]> {
    if (proposalIds.length === 0) return [];
    return this.select(and(inArray(proposals.id, [...proposalIds]), isFreeOfConflict(sql`${viewerId}::uuid`)));
  }

  /** Those among `proposalIds` that `viewerId` has a conflict with: to be counted, never to be shown. */
  async listHiddenIds(proposalIds: readonly string[], viewerId: string): Promise<string[]> {
    if (proposalIds.length === 0) return [];
    const rows = await this.select(and(inArray(proposals.id, [...proposalIds]), isConflicted(sql`${viewerId}::uuid`)));
    return rows.map(({ proposalId }) => proposalId);
  }

  async countHidden(panelId: string, viewerId: string): Promise<number> {
    return (await this.select(and(eq(proposals.panelId, panelId), isConflicted(sql`${viewerId}::uuid`)))).length;
  }

  /** All of the panel's submitted proposals, for rules that run without anybody looking; never to be shown. */
  async listAll(panelId: string): Promise<PanelProposalRow[]> {
    return this.select(eq(proposals.panelId, panelId));
  }

  /** How many reviewers without a conflict each of the proposals has that `viewerId` may see; those without any are left out. */
  async listReviewerCounts(panelId: string, viewerId: string): Promise<Map<string, number>> {
    const rows = await this.database
      .current()
      .select({ proposalId: assignments.proposalId, reviewerCount: count() })
      .from(assignments)
      .innerJoin(proposals, eq(proposals.id, assignments.proposalId))
      .where(
        and(
          eq(assignments.panelId, panelId),
          isFreeOfConflict(sql`${viewerId}::uuid`),
          isFreeOfConflict(sql`${assignments.personId}`),
        ),
      )
      .groupBy(assignments.proposalId);
    return new Map(rows.map((row) => [row.proposalId, row.reviewerCount]));
  }

  private async select(condition: SQL | undefined): Promise<PanelProposalRow[]> {
    const rows = await this.database
      .current()
      .select({
        proposalId: proposals.id,
        panelId: proposals.panelId,
        labelPrefix: semesters.labelPrefix,
        number: proposals.number,
        title: sql<string>`${submissions.content} ->> 'title'`,
        partnerName: sql<string | null>`${submissions.content} ->> 'partnerName'`,
        state: proposals.state,
        requestedHours: submissions.requestedHours,
        targetCount: submissions.targetCount,
      })
      .from(proposals)
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .innerJoin(submissions, and(eq(submissions.proposalId, proposals.id), eq(submissions.isCurrent, true)))
      .where(and(condition, isBeforeThePanel()))
      .orderBy(asc(semesters.labelPrefix), asc(proposals.number));
    return rows.flatMap(({ labelPrefix, number, panelId, ...row }) =>
      panelId === null ? [] : [{ ...row, panelId, label: proposalLabel(labelPrefix, number) }],
    );
  }
}

/** Condition on `proposals`: this person sits on the panel the proposal is put to. */
function isOnPanelOf(personId: string): SQL {
  return sql`exists (select 1 from ${panelMembers} where ${panelMembers.panelId} = ${proposals.panelId}
    and ${panelMembers.personId} = ${personId}::uuid)`;
}
