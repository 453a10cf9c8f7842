import type { Award, RankingRow } from '@faintward/contracts/reviews';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import { cutLine, fitAdditiveModel, rankByMean } from '@faintward/ranking';

export interface RankedScore {
  proposalId: string;
  personId: string;
  reviewerName: string;
  score: number;
}

export interface ProposalToRank {
  proposalId: string;
  label: string;
  title: string;
  partnerName: string | null;
  requestedHours: HoursByMoonClass;
  assignedCount: number;
  award: Award | null;
}

/** Told beside every ranking, so that nobody has to guess what its numbers are. */
export const METHOD =
  'Ranked by the raw mean of complete reviews; equal means share a rank. A reviewer’s overall score is the weighted mean of ' +
  'the criteria that were scored. Spread is the sample standard deviation. Leniency is a reviewer’s offset in an additive ' +
  'least-squares model of proposal and reviewer, for information only: ranks do not use it. Hours available are those of ' +
  'all the semester’s telescopes together, not a share of this panel’s. Cumulated hours count awarded hours where decided and ' +
  'requested hours elsewhere; hours of hidden proposals are not counted.';

export const NO_HOURS: HoursByMoonClass = { dark: 0, grey: 0, bright: 0 };

export function awardedHoursOf(award: Award): HoursByMoonClass {
  return { ...NO_HOURS, [award.moonClass]: award.hours };
}

export function totalOf(hours: HoursByMoonClass): number {
  return hours.dark + hours.grey + hours.bright;
}

export function sumOf(rows: readonly HoursByMoonClass[]): HoursByMoonClass {
  return rows.reduce(
    (sum, row) => ({ dark: sum.dark + row.dark, grey: sum.grey + row.grey, bright: sum.bright + row.bright }),
    NO_HOURS,
  );
}

/** Rows in rank order, those without a score last, with the hours cumulated and the cut line drawn. */
export function rankRows(
  proposals: readonly ProposalToRank[],
  scores: readonly RankedScore[],
  availableHours: HoursByMoonClass,
): { rows: RankingRow[]; cutAfterRow: number | null } {
  const byLabel = new Map(proposals.map((proposal) => [proposal.label, proposal]));
  const scoresOf = (proposalId: string) => scores.filter((score) => score.proposalId === proposalId);
  // By label, so that equal means stand in an order that a person expects.
  const ranked = rankByMean(
    proposals.map(({ proposalId, label }) => ({
      proposalId: label,
      scores: scoresOf(proposalId).map(({ score }) => score),
    })),
  ).flatMap(({ proposalId: label, ...summary }) => {
    const proposal = byLabel.get(label);
    return proposal === undefined ? [] : [{ ...summary, proposal }];
  });
  const line = cutLine(
    ranked.map(({ proposal: { requestedHours, award } }) =>
      award === null ? { requestedHours } : { requestedHours, awardedHours: awardedHoursOf(award) },
    ),
    availableHours,
  );
  return {
    cutAfterRow: line.cutIndex ?? null,
    rows: ranked.map(({ proposal, rank, mean, spread, lowest, highest, count }, index) => ({
      ...proposal,
      rank: rank ?? null,
      meanScore: mean ?? null,
      spread: spread ?? null,
      lowestScore: lowest ?? null,
      highestScore: highest ?? null,
      scoreCount: count,
      requestedTotalHours: totalOf(proposal.requestedHours),
      cumulatedHours: line.rows[index]?.cumulatedHours ?? NO_HOURS,
      isAboveCut: line.rows[index]?.isAboveCut ?? true,
      exhaustedMoonClass: line.rows[index]?.exhaustedMoonClasses[0] ?? null,
      scores: scoresOf(proposal.proposalId).map(({ reviewerName, score }) => ({ reviewerName, score })),
    })),
  };
}

/**
 * Each reviewer's mean, and leniency where it can be told: a reviewer who shares no proposal, directly or through others, with
 * any other reviewer can be compared with nobody.
 */
export function describeReviewers(scores: readonly RankedScore[]): {
  personId: string;
  name: string;
  meanScore: number | null;
  scoreCount: number;
  leniency: number | null;
}[] {
  const proposalIds = [...new Set(scores.map(({ proposalId }) => proposalId))];
  const reviewers = [...new Map(scores.map((score) => [score.personId, score.reviewerName]))];
  const personIds = reviewers.map(([personId]) => personId);
  const model = fitAdditiveModel({
    proposalCount: proposalIds.length,
    reviewerCount: personIds.length,
    scores: scores.map(({ proposalId, personId, score }) => ({
      proposal: proposalIds.indexOf(proposalId),
      reviewer: personIds.indexOf(personId),
      score,
    })),
  });
  return reviewers.map(([personId, name], index) => {
    const own = scores.filter((score) => score.personId === personId).map(({ score }) => score);
    const component = model.components[model.reviewerComponents[index] ?? -1];
    return {
      personId,
      name,
      meanScore: own.length === 0 ? null : own.reduce((sum, score) => sum + score, 0) / own.length,
      scoreCount: own.length,
      leniency: (component?.reviewers.length ?? 0) < 2 ? null : (model.reviewerOffsets[index] ?? null),
    };
  });
}
