import type { Acknowledgement } from '@faintward/contracts/common';
import type { ConflictDeclaration, ReadingList, Review, ReviewInput } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import type { z } from 'zod';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { notFound, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { validationFailed } from '../../platform/validation.js';
import { ConflictsService } from '../panels/conflicts.service.js';
import { PanelAccess } from '../panels/panel-access.service.js';
import { PanelProposalsReadModel } from '../panels/panel-proposals.read-model.js';
import { PanelsReadModel } from '../panels/panels.read-model.js';
import { type SemesterDetails, SemestersReadModel } from '../semesters/semesters.read-model.js';
import { reviewStateOf, UNWRITTEN, unknownCriteria, withInput } from './review-content.js';
import { ReviewsQueries } from './reviews.queries.js';

/** A reviewer's own work. What other reviewers wrote is not read anywhere in here. */
@Injectable()
export class ReviewsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: ReviewsQueries,
    private readonly proposals: PanelProposalsReadModel,
    private readonly panels: PanelsReadModel,
    private readonly panelAccess: PanelAccess,
    private readonly semesters: SemestersReadModel,
    private readonly conflicts: ConflictsService,
    private readonly history: HistoryService,
  ) {}

  /** What is still to be read and what was, on panels that are at work. A conflict is counted and not named. */
  async readingList(actor: Actor): Promise<ReadingList> {
    const assignments = await this.queries.listOpenAssignments(actor.personId);
    const proposals = new Map(
      (
        await this.proposals.listVisibleByIds(
          assignments.map(({ proposalId }) => proposalId),
          actor.personId,
        )
      ).map((proposal) => [proposal.proposalId, proposal]),
    );
    const conflicted = new Set(
      await this.proposals.listHiddenIds(
        assignments.map(({ proposalId }) => proposalId),
        actor.personId,
      ),
    );
    const rows = assignments
      .flatMap((assignment) => {
        const proposal = proposals.get(assignment.proposalId);
        if (proposal?.panelId !== assignment.panelId) return [];
        return [
          {
            proposalId: proposal.proposalId,
            label: proposal.label,
            title: proposal.title,
            panelId: assignment.panelId,
            panelName: assignment.panelName,
            semesterName: assignment.semesterName,
            isLead: assignment.isLead,
            state: reviewStateOf(assignment.review ?? UNWRITTEN),
            overallScore: assignment.review?.overallScore ?? null,
            requestedHours: proposal.requestedHours,
            targetCount: proposal.targetCount,
            updatedAt: assignment.review?.updatedAt.toISOString() ?? null,
          },
        ];
      })
      .sort((a, b) => a.panelName.localeCompare(b.panelName) || a.label.localeCompare(b.label));
    const dueAt = assignments
      .flatMap(({ reviewsDueAt }) => (reviewsDueAt === null ? [] : [reviewsDueAt]))
      .sort((a, b) => a.getTime() - b.getTime());
    return { rows, conflictCount: conflicted.size, reviewsDueAt: dueAt[0]?.toISOString() ?? null };
  }

  async get(actor: Actor, proposalId: string): Promise<Review> {
    const { proposal, panel, semester, isLead } = await this.getAssigned(actor, proposalId);
    const content = await this.proposals.findVisibleContent(proposalId, actor.personId);
    if (content === undefined) throw notFound('review');
    const stored = await this.queries.find(proposalId, actor.personId);
    const written = stored ?? UNWRITTEN;
    const isFinal = panel.finalisedAt !== null;
    const isMasked = semester.isAnonymised && !isFinal;
    return {
      proposalId,
      label: proposal.label,
      panelId: panel.panelId,
      panelName: panel.name,
      semesterName: semester.name,
      isAnonymised: semester.isAnonymised,
      isLead,
      // The partner whose time is asked for says where the team works.
      content: isMasked ? { ...content, team: null, partnerName: null } : content,
      criteria: semester.criteria,
      answers: written.answers,
      commentToPrincipal: written.commentToPrincipal,
      confidentialComment: written.confidentialComment,
      state: reviewStateOf(written),
      overallScore: written.overallScore,
      canEdit: !isFinal,
      version: stored?.version ?? 1,
      updatedAt: stored?.updatedAt.toISOString() ?? null,
    };
  }

  /** Saves what was typed, finished or not. */
  async save(actor: Actor, proposalId: string, version: number, input: ReviewInput): Promise<Review> {
    const { panel, semester } = await this.getAssigned(actor, proposalId);
    return this.database.transaction(async () => {
      await this.panelAccess.holdOpen(panel.panelId);
      if (!(await this.queries.holdAssignment(proposalId, actor.personId))) throw notFound('review');
      const faults = unknownCriteria(input, semester.criteria);
      if (faults.length > 0) throw validationFailed(faults);
      const stored = await this.queries.find(proposalId, actor.personId);
      if ((stored?.version ?? 1) !== version) throw staleVersion(await this.get(actor, proposalId));
      const before = stored ?? UNWRITTEN;
      const after = withInput(before, input, semester.criteria);
      const reviewId =
        stored === undefined
          ? await this.queries.insert(proposalId, actor.personId, after)
          : await this.queries.update(proposalId, actor.personId, version, after);
      if (reviewId === undefined) throw staleVersion(await this.get(actor, proposalId));
      const changed = {
        ...differences<object>(before.answers, { ...takenBack(before.answers, after.answers), ...after.answers }),
        ...differences(
          { overallScore: before.overallScore, isComplete: before.isComplete },
          { overallScore: after.overallScore, isComplete: after.isComplete },
        ),
      };
      if (Object.keys(changed).length > 0) {
        await this.history.record({
          personId: actor.personId,
          scope: 'panel',
          scopeId: panel.panelId,
          subject: 'review',
          // Not the proposal's: who reviews what is nobody else's to learn from the trail.
          subjectId: reviewId,
          action: stored === undefined ? 'created' : 'changed',
          details: changed,
        });
      }
      return this.get(actor, proposalId);
    });
  }

  /**
   * Hides the proposal from the person from now on. A chair may say so of every proposal before the panel; everybody else of
   * those assigned to them.
   */
  async declareConflict(
    actor: Actor,
    proposalId: string,
    input: ConflictDeclaration,
  ): Promise<z.infer<typeof Acknowledgement>> {
    const proposal = await this.proposals.findVisible(proposalId, actor.personId);
    if (proposal === undefined) throw notFound('review');
    const isAssigned = (await this.queries.findAssignment(proposal.panelId, proposalId, actor.personId)) !== undefined;
    if (!isAssigned && !(await this.panelAccess.isChair(actor, proposal.panelId))) throw notFound('review');
    await this.conflicts.declare(actor.personId, proposal.panelId, proposalId, input.reason);
    return { ok: true };
  }

  /** The one door to a review: assigned, on the panel, submitted, and no conflict. All else does not exist. */
  private async getAssigned(actor: Actor, proposalId: string) {
    const proposal = await this.proposals.findVisible(proposalId, actor.personId);
    if (proposal === undefined) throw notFound('review');
    const assignment = await this.queries.findAssignment(proposal.panelId, proposalId, actor.personId);
    const panel = await this.panels.findById(proposal.panelId);
    if (assignment === undefined || panel === undefined) throw notFound('review');
    const semester: SemesterDetails = await this.semesters.get(panel.semesterId);
    return { proposal, panel, semester, isLead: assignment.isLead };
  }
}

/** Answers that were there and are no more, as null. */
function takenBack(before: object, after: object): Record<string, null> {
  return Object.fromEntries(
    Object.keys(before)
      .filter((criterionId) => !Object.hasOwn(after, criterionId))
      .map((criterionId) => [criterionId, null]),
  );
}
