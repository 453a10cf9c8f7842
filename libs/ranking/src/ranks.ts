import { summariseScores, type ScoreSummary } from './statistics.js';

/** How equal values share ranks: `competition` 1, 2, 2, 4; `average` 1, 2.5, 2.5, 4. */
export type TieRule = 'competition' | 'average';

/**
 * Ranks, 1 for the highest value; undefined stays undefined and takes no rank. Values that agree to nine decimals are equal: means of the same scores summed in
 * another order must tie.
 *
 * @returns same length and order as `values`
 */
export function rankDescending(values: readonly (number | undefined)[], tieRule: TieRule): (number | undefined)[] {
  const ranked = values
    .flatMap((value, index) => (value === undefined ? [] : [{ key: tieKey(value), index }]))
    .sort((a, b) => b.key - a.key || a.index - b.index);
  const ranks = values.map((): number | undefined => undefined);
  for (let start = 0; start < ranked.length;) {
    let end = start;
    while (end < ranked.length && ranked[end]?.key === ranked[start]?.key) end += 1;
    const rank = tieRule === 'competition' ? start + 1 : (start + 1 + end) / 2;
    for (const { index } of ranked.slice(start, end)) ranks[index] = rank;
    start = end;
  }
  return ranks;
}

/** The number by which values are compared: equal for values that differ only by rounding. */
export function tieKey(value: number): number {
  return Math.round(value * 1e9);
}

export interface RankedProposal extends ScoreSummary {
  readonly proposalId: string;
  /** Shared by equal means: 1, 2, 2, 4. Undefined without a score. */
  readonly rank: number | undefined;
  readonly isTied: boolean;
}

/**
 * Proposals in the order of their raw mean score, best first.
 *
 * Equal means (to nine decimals) share a rank; within a shared rank, and among proposals without a score, which come last, the order is that of the ids, so that
 * the same scores always give the same list, in whatever order they arrive.
 */
export function rankByMean(
  proposals: readonly { readonly proposalId: string; readonly scores: readonly number[] }[],
): RankedProposal[] {
  const summaries = proposals.map(({ proposalId, scores }) => ({ proposalId, ...summariseScores(scores) }));
  const ranks = rankDescending(
    summaries.map(({ mean }) => mean),
    'competition',
  );
  const sharing = new Map<number, number>();
  for (const rank of ranks) if (rank !== undefined) sharing.set(rank, (sharing.get(rank) ?? 0) + 1);
  return summaries
    .map((summary, index) => {
      const rank = ranks[index];
      return { ...summary, rank, isTied: rank !== undefined && (sharing.get(rank) ?? 0) > 1 };
    })
    .sort(
      (a, b) => (a.rank ?? Number.MAX_VALUE) - (b.rank ?? Number.MAX_VALUE) || compareIds(a.proposalId, b.proposalId),
    );
}

function compareIds(a: string, b: string): number {
  return a < b ? -1 : a > b ? 1 : 0;
}
