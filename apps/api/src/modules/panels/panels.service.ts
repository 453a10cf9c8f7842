import type {
  Assignment,
  AutomaticAssignment,
  AutomaticAssignmentResult,
  Panel,
  ReviewState,
} from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import type { z } from 'zod';
import type { Actor } from '../../platform/actor.js';
import { DatabaseService } from '../../database/transaction.js';
import { onConstraint } from '../../platform/database-errors.js';
import { DomainError, invalidField, notFound } from '../../platform/domain-error.js';
import { HistoryService } from '../../platform/history.js';
import { IdempotencyService } from '../../platform/idempotency.js';
import { type PanelReview, ReviewsReadModel } from '../reviews/reviews.read-model.js';
import { isPastDeadline } from '../semesters/semesters.read-model.js';
import { ConflictsQueries } from './conflicts.queries.js';
import { ConflictsService } from './conflicts.service.js';
import { assignEvenly } from './even-assignment.js';
import { PanelAccess } from './panel-access.service.js';
import { PanelProposalsReadModel } from './panel-proposals.read-model.js';
import { type AssignmentRow, type PanelRow, PanelsQueries } from './panels.queries.js';

type AssignmentResult = z.infer<typeof AutomaticAssignmentResult>;

/**
 * The chair's view of a panel. Proposals with which the chair has a conflict appear nowhere in it but in `hiddenCount`:
 * members' counts, too, are counts over the proposals the chair may see.
 */
@Injectable()
export class PanelsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: PanelAccess,
    private readonly queries: PanelsQueries,
    private readonly proposals: PanelProposalsReadModel,
    private readonly conflicts: ConflictsService,
    private readonly conflictPairs: ConflictsQueries,
    private readonly reviews: ReviewsReadModel,
    private readonly history: HistoryService,
    private readonly idempotency: IdempotencyService,
  ) {}

  async get(actor: Actor, panelId: string): Promise<Panel> {
    const panel = await this.access.getAsChair(actor, panelId);
    const proposals = await this.proposals.listVisible(panelId, actor.personId);
    const isVisible = idsOf(proposals);
    const members = await this.queries.listMembers(panelId);
    const names = new Map(members.map((member) => [member.personId, member.name]));
    const conflicts = (await this.conflictPairs.listOfPanel(panelId)).filter((pair) => isVisible.has(pair.proposalId));
    const conflictKeys = new Set(conflicts.map(keyOf));
    const reviews = new Map(
      (await this.reviews.listOfPanel(panelId, actor.personId)).map((review) => [keyOf(review), review]),
    );
    const assignments = (await this.queries.listAssignments(panelId))
      .filter((assignment) => isVisible.has(assignment.proposalId))
      .map((assignment) => ({
        ...assignment,
        state: stateOf(conflictKeys.has(keyOf(assignment)), reviews.get(keyOf(assignment))),
      }));
    return {
      panelId: panel.panelId,
      name: panel.name,
      semesterId: panel.semesterId,
      semesterName: panel.semesterName,
      isFinal: panel.finalisedAt !== null,
      members: members.map((member) => {
        const own = assignments.filter(
          (assignment) => assignment.personId === member.personId && assignment.state !== 'conflict',
        );
        return {
          ...member,
          assignedCount: own.length,
          completeCount: own.filter((assignment) => assignment.state === 'complete').length,
          conflictCount: conflicts.filter((pair) => pair.personId === member.personId).length,
        };
      }),
      proposals: proposals.map((proposal) => ({
        proposalId: proposal.proposalId,
        label: proposal.label,
        title: proposal.title,
        requestedHours: proposal.requestedHours,
        reviewers: assignments
          .filter((assignment) => assignment.proposalId === proposal.proposalId)
          .map(({ personId, isLead, state }) => ({
            personId,
            name: names.get(personId) ?? 'no longer a member',
            isLead,
            state,
          })),
        conflictedPersonIds: conflicts
          .filter((pair) => pair.proposalId === proposal.proposalId)
          .map((pair) => pair.personId),
      })),
      hiddenCount: await this.proposals.countHidden(panelId, actor.personId),
    };
  }

  async assign(actor: Actor, panelId: string, key: string | undefined, input: Assignment): Promise<Panel> {
    requireDeadlinePassed(await this.access.getAsChair(actor, panelId));
    await this.conflicts.detectForPanel(panelId);
    const proposal = await this.getVisible(actor, panelId, input.proposalId);
    const route = `panels/${panelId}/assignments`;
    // Only that it was done is remembered: the stored copy of a view would go on showing what a conflict hides by now.
    await this.idempotency.idempotent({ personId: actor.personId, key, route, body: input }, async () => {
      await this.access.holdOpen(panelId);
      const member = (await this.queries.listMembers(panelId)).find(({ personId }) => personId === input.personId);
      if (member === undefined) throw invalidField('personId', 'This person does not sit on the panel.');
      const pairs = await this.conflictPairs.listOfPanel(panelId);
      if (pairs.some((pair) => keyOf(pair) === keyOf(input))) {
        throw new DomainError('conflict', `${member.name} has a conflict of interest with ${proposal.label}.`, {
          fieldErrors: [{ path: 'personId', message: 'Has a conflict of interest with this proposal.' }],
        });
      }
      const added = await onConstraint(
        {
          assignments_unique: () =>
            new DomainError('already-exists', `${member.name} is assigned to ${proposal.label} already.`),
        },
        () => this.queries.insertAssignments([{ panelId, ...input }]),
      );
      if (input.isLead) await this.queries.clearOtherLeads(input.proposalId, input.personId);
      await this.recordAssigned(actor, panelId, added);
      return { isDone: true };
    });
    return this.get(actor, panelId);
  }

  /** Begun reviews are kept: their reviewer stays assigned, unless a conflict has come up. */
  async unassign(actor: Actor, panelId: string, proposalId: string, personId: string): Promise<Panel> {
    await this.access.getAsChair(actor, panelId);
    await this.getVisible(actor, panelId, proposalId);
    await this.database.transaction(async () => {
      await this.access.holdOpen(panelId);
      const assignmentId = await this.queries.findAssignmentLocked(panelId, proposalId, personId);
      if (assignmentId === undefined) throw notFound('assignment');
      // A review by somebody with a conflict is not listed, and so does not hold the assignment.
      const review = (await this.reviews.listOfPanel(panelId, actor.personId)).find(
        (row) => row.proposalId === proposalId && row.personId === personId,
      );
      if (review?.hasBegun) {
        throw new DomainError(
          'wrong-state',
          `${review.reviewerName} has begun this review. Work that was begun is kept; assign somebody in addition instead.`,
        );
      }
      await this.queries.deleteAssignment(assignmentId);
      await this.history.record({
        personId: actor.personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'assignment',
        subjectId: assignmentId,
        action: 'removed',
      });
    });
    return this.get(actor, panelId);
  }

  /**
   * Fills every proposal of the panel up to the wanted number of reviewers, those that the chair may not see included, since
   * nobody has to look for that; the answer counts only what the chair may see. Chairs get none: who reads the scores of
   * others should not give one without meaning to.
   */
  async assignAutomatically(
    actor: Actor,
    panelId: string,
    key: string | undefined,
    input: AutomaticAssignment,
  ): Promise<AssignmentResult> {
    requireDeadlinePassed(await this.access.getAsChair(actor, panelId));
    const route = `panels/${panelId}/automatic-assignment`;
    const result = await this.idempotency.idempotent(
      { personId: actor.personId, key, route, body: input },
      async () => {
        await this.access.holdOpen(panelId);
        await this.conflicts.detectForPanel(panelId);
        const proposals = await this.proposals.listAll(panelId);
        const reviewerIds = (await this.queries.listMembers(panelId))
          .filter((member) => member.role === 'member')
          .map((member) => member.personId);
        if (reviewerIds.length === 0) {
          throw new DomainError('wrong-state', 'This panel has no members beside its chair to review for it.');
        }
        const conflictKeys = new Set((await this.conflictPairs.listOfPanel(panelId)).map(keyOf));
        const before = (await this.queries.listAssignments(panelId)).filter((row) => !conflictKeys.has(keyOf(row)));
        const solution = assignEvenly({
          proposalIds: proposals.map(({ proposalId }) => proposalId),
          reviewerIds,
          reviewersPerProposal: input.reviewersPerProposal,
          isConflicted: (proposalId, personId) => conflictKeys.has(keyOf({ proposalId, personId })),
          standing: before.map(({ proposalId, personId }) => ({ proposalId, reviewerId: personId })),
        });
        const added = await this.queries.insertAssignments(
          solution.pairs.map(({ proposalId, reviewerId }) => ({
            panelId,
            proposalId,
            personId: reviewerId,
            isLead: false,
          })),
        );
        await this.queries.setLead(
          leadsFor(
            proposals.map(({ proposalId }) => proposalId),
            [...before, ...added],
          ),
        );
        await this.recordAssigned(actor, panelId, added);
        return { addedIds: added.map(({ assignmentId }) => assignmentId), shortIds: solution.shortProposalIds };
      },
    );
    const proposals = await this.proposals.listVisible(panelId, actor.personId);
    const isVisible = idsOf(proposals);
    const conflictKeys = new Set((await this.conflictPairs.listOfPanel(panelId)).map(keyOf));
    const visible = (await this.queries.listAssignments(panelId)).filter(
      (row) => isVisible.has(row.proposalId) && !conflictKeys.has(keyOf(row)),
    );
    const loads = (await this.queries.listMembers(panelId))
      .filter((member) => member.role === 'member')
      .map((member) => visible.filter((row) => row.personId === member.personId).length);
    return {
      assignedCount: visible.filter((row) => result.addedIds.includes(row.assignmentId)).length,
      shortProposalLabels: proposals
        .filter(({ proposalId }) => result.shortIds.includes(proposalId))
        .map(({ label }) => label),
      reviewsPerMember: { least: Math.min(...loads), most: Math.max(...loads) },
    };
  }

  private async getVisible(actor: Actor, panelId: string, proposalId: string) {
    const proposal = await this.proposals.findVisible(proposalId, actor.personId);
    if (proposal?.panelId !== panelId) throw notFound('proposal');
    return proposal;
  }

  private async recordAssigned(actor: Actor, panelId: string, added: readonly AssignmentRow[]): Promise<void> {
    await this.history.record(
      ...added.map((row) => ({
        personId: actor.personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'assignment',
        subjectId: row.assignmentId,
        action: 'created',
        details: {
          proposalId: { before: null, after: row.proposalId },
          personId: { before: null, after: row.personId },
        },
      })),
    );
  }
}

/** @throws {DomainError} `wrong-state` while proposals can still be changed and submitted again */
function requireDeadlinePassed({ semesterName, deadlineAt }: PanelRow): void {
  if (isPastDeadline(deadlineAt, new Date())) return;
  throw new DomainError(
    'wrong-state',
    `Until the deadline of ${semesterName}, ${deadlineAt.toISOString()}, its proposals can still change. They can be assigned and read after it.`,
  );
}

function keyOf(pair: { proposalId: string; personId: string }): string {
  return `${pair.proposalId} ${pair.personId}`;
}

function idsOf(rows: readonly { proposalId: string }[]): Set<string> {
  return new Set(rows.map(({ proposalId }) => proposalId));
}

export function stateOf(hasConflict: boolean, review: PanelReview | undefined): ReviewState {
  if (hasConflict) return 'conflict';
  if (review === undefined || !review.hasBegun) return 'toRead';
  return review.isComplete ? 'complete' : 'begun';
}

/** For each proposal without a lead reviewer, the assignment of the reviewer who leads fewest so far. */
function leadsFor(proposalIds: readonly string[], assignments: readonly AssignmentRow[]): string[] {
  const leadCount = new Map<string, number>();
  const countOf = (row: AssignmentRow): number => leadCount.get(row.personId) ?? 0;
  for (const row of assignments) if (row.isLead) leadCount.set(row.personId, countOf(row) + 1);
  return proposalIds.flatMap((proposalId) => {
    const own = assignments.filter((row) => row.proposalId === proposalId);
    if (own.some((row) => row.isLead)) return [];
    const [first, ...others] = own;
    if (first === undefined) return [];
    const lead = others.reduce((best, row) => (countOf(row) < countOf(best) ? row : best), first);
    leadCount.set(lead.personId, countOf(lead) + 1);
    return [lead.assignmentId];
  });
}
