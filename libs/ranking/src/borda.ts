import { requireValidSheet, scoresByReviewer, type ScoreSheet } from './score-sheet.js';
import { meanOf } from './statistics.js';

export interface BordaCount {
  /** Per proposal: sum over the reviewers of the number of proposals ranked below it, half a point for each tie. */
  readonly points: readonly number[];
  /** Per proposal: mean over its reviewers of the points as a share of those possible, 0 to 1; reviewers of a single proposal are left out. Undefined if none is left. */
  readonly normalisedMeans: readonly (number | undefined)[];
}

/**
 * Borda's count, for which only the order in which each reviewer put the proposals matters. Where reviewers read different numbers of proposals, compare the normalised
 * means and not the points.
 *
 * @see Borda 1781, Mémoire sur les élections au scrutin
 */
export function bordaCount(sheet: ScoreSheet): BordaCount {
  requireValidSheet(sheet);
  const points = Array.from({ length: sheet.proposalCount }, () => 0);
  const shares = Array.from({ length: sheet.proposalCount }, (): number[] => []);
  for (const own of scoresByReviewer(sheet)) {
    const sorted = [...own].sort((a, b) => a.score - b.score);
    for (let start = 0; start < sorted.length;) {
      let end = start;
      while (end < sorted.length && sorted[end]?.score === sorted[start]?.score) end += 1;
      const earned = start + (end - start - 1) / 2;
      for (const { proposal } of sorted.slice(start, end)) {
        points[proposal] = (points[proposal] ?? 0) + earned;
        if (sorted.length > 1) shares[proposal]?.push(earned / (sorted.length - 1));
      }
      start = end;
    }
  }
  return { points, normalisedMeans: shares.map(meanOf) };
}
