import type { Ranking } from '@faintward/contracts/reviews';
import { writeDelimitedText } from '@faintward/tables';
import { Injectable } from '@nestjs/common';
import type { Actor } from '../../platform/actor.js';
import { AwardsReadModel } from '../awards/awards.read-model.js';
import { PanelAccess } from '../panels/panel-access.service.js';
import { PanelProposalsReadModel } from '../panels/panel-proposals.read-model.js';
import { ReviewsReadModel } from '../reviews/reviews.read-model.js';
import { SemestersReadModel } from '../semesters/semesters.read-model.js';
import { awardedHoursOf, describeReviewers, METHOD, rankRows, sumOf } from './ranking-rows.js';

/**
 * The chair's ranking. Everything in it is computed from what the chair may see alone: were a hidden proposal's rank, hours or
 * scores part of any sum, subtracting would show them.
 */
@Injectable()
export class RankingService {
  constructor(
    private readonly access: PanelAccess,
    private readonly proposals: PanelProposalsReadModel,
    private readonly reviews: ReviewsReadModel,
    private readonly awards: AwardsReadModel,
    private readonly semesters: SemestersReadModel,
  ) {}

  async get(actor: Actor, panelId: string): Promise<Ranking> {
    const panel = await this.access.getAsChair(actor, panelId);
    const semester = await this.semesters.get(panel.semesterId);
    const isFinal = panel.finalisedAt !== null;
    const proposals = await this.proposals.listVisible(panelId, actor.personId);
    const reviewerCounts = await this.proposals.listReviewerCounts(panelId, actor.personId);
    const awards = await this.awards.mapOfPanel(panelId, actor.personId);
    const isVisible = new Set(proposals.map(({ proposalId }) => proposalId));
    const scores = (await this.reviews.listOfPanel(panelId, actor.personId)).flatMap((review) =>
      review.isComplete && review.overallScore !== null && isVisible.has(review.proposalId)
        ? [{ ...review, score: review.overallScore }]
        : [],
    );
    const availableHours = sumOf(semester.telescopes.map((telescope) => telescope.availableHours));
    const { rows, cutAfterRow } = rankRows(
      proposals.map((proposal) => ({
        proposalId: proposal.proposalId,
        label: proposal.label,
        title: proposal.title,
        // The share that is asked for tells where the team works.
        partnerName: semester.isAnonymised && !isFinal ? null : proposal.partnerName,
        requestedHours: proposal.requestedHours,
        assignedCount: reviewerCounts.get(proposal.proposalId) ?? 0,
        award: awards.get(proposal.proposalId) ?? null,
      })),
      scores,
      availableHours,
    );
    return {
      panelId,
      panelName: panel.name,
      semesterId: semester.semesterId,
      semesterName: semester.name,
      isFinal,
      availableHours,
      awardedHours: sumOf(rows.flatMap(({ award }) => (award === null ? [] : [awardedHoursOf(award)]))),
      requestedHours: sumOf(rows.map(({ requestedHours }) => requestedHours)),
      cutAfterRow,
      rows,
      reviewers: describeReviewers(scores).map(({ personId: _personId, ...reviewer }) => reviewer),
      hiddenCount: await this.proposals.countHidden(panelId, actor.personId),
      method: METHOD,
    };
  }

  /** The ranking as a table for spreadsheets: one line a proposal, in rank order, texts made harmless as formulas. */
  async exportCsv(actor: Actor, panelId: string): Promise<{ fileName: string; text: string }> {
    const ranking = await this.get(actor, panelId);
    const text = writeDelimitedText(
      [
        'rank',
        'label',
        'title',
        'partner',
        'meanScore',
        'spread',
        'lowestScore',
        'highestScore',
        'scoreCount',
        'assignedCount',
        'requestedDarkHours',
        'requestedGreyHours',
        'requestedBrightHours',
        'cumulatedDarkHours',
        'cumulatedGreyHours',
        'cumulatedBrightHours',
        'isAboveCut',
        'awardedHours',
        'awardedMoonClass',
        'standing',
        'reason',
        'scores',
      ],
      ranking.rows.map((row) => [
        row.rank,
        row.label,
        row.title,
        row.partnerName,
        row.meanScore,
        row.spread,
        row.lowestScore,
        row.highestScore,
        row.scoreCount,
        row.assignedCount,
        row.requestedHours.dark,
        row.requestedHours.grey,
        row.requestedHours.bright,
        row.cumulatedHours.dark,
        row.cumulatedHours.grey,
        row.cumulatedHours.bright,
        row.isAboveCut,
        row.award?.hours,
        row.award?.moonClass,
        row.award?.standing,
        row.award?.reason,
        row.scores.map(({ reviewerName, score }) => `${reviewerName} ${score}`).join('; '),
      ]),
      { byteOrderMark: true },
    );
    return { fileName: `${fileNameOf(`${ranking.semesterName} ${ranking.panelName} ranking`)}.csv`, text };
  }
}

/** Plain letters, digits and hyphens, which every file system and header takes. */
function fileNameOf(title: string): string {
  return title
    .normalize('NFKD')
    .replace(/[^A-Za-z0-9]+/g, '-')
    .replace(/^-|-$/g, '');
}
