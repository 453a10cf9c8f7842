import { requireValidSheet, scoresByProposal, scoresByReviewer, type ScoreSheet } from './score-sheet.js';
import { meanOf, sampleStandardDeviation } from './statistics.js';

export interface ReviewerLeniency {
  readonly scoreCount: number;
  readonly mean: number | undefined;
  /** Sample standard deviation of the reviewer's scores; undefined below two. */
  readonly spread: number | undefined;
  /** Reviewer's mean minus the mean of all scores of the panel; positive means lenient. Undefined without a score. */
  readonly offset: number | undefined;
}

/**
 * How each reviewer's mean compares with the panel's. Information only: a reviewer who happened to read the better proposals looks lenient here. The additive model
 * ({@link fitAdditiveModel}) takes account of who read what.
 */
export function reviewerLeniency(sheet: ScoreSheet): ReviewerLeniency[] {
  requireValidSheet(sheet);
  const panelMean = meanOf(sheet.scores.map(({ score }) => score));
  return scoresByReviewer(sheet).map((own) => {
    const scores = own.map(({ score }) => score);
    const mean = meanOf(scores);
    return {
      scoreCount: scores.length,
      mean,
      spread: sampleStandardDeviation(scores),
      offset: mean === undefined || panelMean === undefined ? undefined : mean - panelMean,
    };
  });
}

export interface OverlapCorrection {
  /** Per reviewer: mean difference to the others on the proposals they share; undefined if the reviewer shares none. */
  readonly offsets: readonly (number | undefined)[];
  /** Per proposal: mean of the scores with the reviewers' offsets taken off; undefined without a score. */
  readonly correctedMeans: readonly (number | undefined)[];
}

/**
 * Leniency from the overlap alone: a reviewer's offset is the mean, over the proposals that somebody else scored too, of the own score minus the mean of the others'
 * scores. One pass, so it only begins to correct; a rule of this project, to be compared with the models.
 */
export function overlapCorrection(sheet: ScoreSheet): OverlapCorrection {
  requireValidSheet(sheet);
  const byProposal = scoresByProposal(sheet);
  const offsets = scoresByReviewer(sheet).map((own) => {
    const differences = own.flatMap(({ proposal, reviewer, score }) => {
      const others = meanOf(
        (byProposal[proposal] ?? []).filter((other) => other.reviewer !== reviewer).map((other) => other.score),
      );
      return others === undefined ? [] : [score - others];
    });
    return meanOf(differences);
  });
  const correctedMeans = byProposal.map((scores) =>
    meanOf(scores.map(({ reviewer, score }) => score - (offsets[reviewer] ?? 0))),
  );
  return { offsets, correctedMeans };
}

/** What to do with a reviewer whose scores have no spread, or who gave only one: count the scores as average (0), or leave them out. */
export type SpreadlessRule = 'as-average' | 'left-out';

export interface Standardised {
  /** Same order as the sheet's scores: (score − reviewer's mean) / reviewer's sample standard deviation; 0 for a reviewer without spread. */
  readonly zScores: readonly number[];
  /** Per proposal: mean of its z-scores by the rule; undefined if nothing is left. */
  readonly means: readonly (number | undefined)[];
}

/**
 * Scores standardised by each reviewer's own mean and spread. Sensible only where everybody read enough proposals (about eight) of similar quality.
 */
export function standardiseScores(sheet: ScoreSheet, spreadlessRule: SpreadlessRule): Standardised {
  const reviewers = reviewerLeniency(sheet);
  const isUsable = (reviewer: number): boolean => (reviewers[reviewer]?.spread ?? 0) > 0;
  const zScores = sheet.scores.map(({ reviewer, score }) => {
    const { mean = score, spread = 1 } = reviewers[reviewer] ?? {};
    return isUsable(reviewer) ? (score - mean) / spread : 0;
  });
  const kept = Array.from({ length: sheet.proposalCount }, (): number[] => []);
  sheet.scores.forEach(({ proposal, reviewer }, index) => {
    if (spreadlessRule === 'as-average' || isUsable(reviewer)) kept[proposal]?.push(zScores[index] ?? 0);
  });
  return { zScores, means: kept.map(meanOf) };
}
