import type { Criterion } from '@faintward/contracts';
import { assignEvenly } from '../modules/panels/even-assignment.js';
import { UNWRITTEN, withInput } from '../modules/reviews/review-content.js';
import type { ReviewContent } from '../modules/reviews/reviews.queries.js';
import { daysFrom } from './calendar.js';
import type { CommentsData } from './demo-data.js';
import { demoId } from './identifiers.js';
import { opinionOf } from './opinions.js';
import { randomStream } from './random.js';
import type { PanelRow, ProposalRow, SemesterRow } from './scenario.js';

const REVIEWERS_PER_PROPOSAL = 4;

export interface AssignmentRow {
  id: string;
  panelId: string;
  proposalId: string;
  personId: string;
  isLead: boolean;
  createdAt: Date;
}

/** Who reads what: evenly among the panel's members but its chair, never across a conflict. */
export function assignReviewers(
  panel: PanelRow,
  semester: SemesterRow,
  proposals: readonly ProposalRow[],
  memberIds: readonly string[],
  isConflicted: (proposalId: string, personId: string) => boolean,
): AssignmentRow[] {
  const { pairs } = assignEvenly({
    proposalIds: proposals.map(({ id }) => id),
    reviewerIds: memberIds.filter((personId) => personId !== panel.chairId),
    reviewersPerProposal: REVIEWERS_PER_PROPOSAL,
    isConflicted,
    standing: [],
  });
  const leads = new Map<string, string>();
  const leadCounts = new Map<string, number>();
  for (const { id } of proposals) {
    // The lead goes to whoever leads least so far.
    const [lead] = pairs
      .filter(({ proposalId }) => proposalId === id)
      .sort((a, b) => (leadCounts.get(a.reviewerId) ?? 0) - (leadCounts.get(b.reviewerId) ?? 0));
    if (lead === undefined) continue;
    leads.set(id, lead.reviewerId);
    leadCounts.set(lead.reviewerId, (leadCounts.get(lead.reviewerId) ?? 0) + 1);
  }
  return pairs.map(({ proposalId, reviewerId }) => ({
    id: demoId('assignment', proposalId, reviewerId),
    panelId: panel.id,
    proposalId,
    personId: reviewerId,
    isLead: leads.get(proposalId) === reviewerId,
    createdAt: daysFrom(semester.deadlineAt, 4),
  }));
}

export interface ReviewRow extends ReviewContent {
  id: string;
  proposalId: string;
  personId: string;
  createdAt: Date;
  updatedAt: Date;
  version: number;
}

/** How far a reviewer has come with a reading list, 0 to 1. */
export type Progress = (personId: string) => number;

/** What the reviewers have written by `now`; a reviewer reads in an order of their own and has one
 * review half done. */
export function writeReviews(
  assignments: readonly AssignmentRow[],
  proposals: readonly ProposalRow[],
  criteria: readonly Criterion[],
  comments: CommentsData,
  progressOf: Progress,
  latest: Date,
): ReviewRow[] {
  const qualities = new Map(proposals.map(({ id, quality }) => [id, quality]));
  const reviewerIds = [...new Set(assignments.map(({ personId }) => personId))];
  return reviewerIds.flatMap((personId) => {
    const own = randomStream(`reading order of ${personId}`).shuffled(
      assignments.filter((assignment) => assignment.personId === personId),
    );
    const completeCount = Math.round(progressOf(personId) * own.length);
    return own.slice(0, completeCount + 1).flatMap((assignment, index): ReviewRow[] => {
      const { proposalId, createdAt } = assignment;
      const random = randomStream(`hours of ${personId} on ${proposalId}`);
      const hasBegun = index < completeCount || (progressOf(personId) > 0.3 && random.next() < 0.8);
      if (!hasBegun) return [];
      const howFar = index < completeCount ? 'complete' : 'begun';
      const quality = qualities.get(proposalId) ?? 0;
      const input = opinionOf(quality, proposalId, personId, criteria, comments, howFar);
      const days = (latest.getTime() - createdAt.getTime()) / 86_400_000;
      const updatedAt = daysFrom(createdAt, days * (0.1 + (0.85 * (index + random.next())) / (own.length + 1)));
      return [
        {
          id: demoId('review', proposalId, personId),
          proposalId,
          personId,
          ...withInput(UNWRITTEN, input, criteria),
          createdAt: daysFrom(updatedAt, -0.02),
          updatedAt,
          version: 2,
        },
      ];
    });
  });
}
