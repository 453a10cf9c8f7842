import { rankDescending, tieKey } from './ranks.js';
import { requireValidSheet, scoresByReviewer, type ScoreSheet } from './score-sheet.js';

/**
 * Kendall's rank correlation with correction for ties (tau-b), −1 to 1; undefined if there are fewer than two pairs or one list is all equal.
 *
 * Compares every pair: meant for lists of up to a few thousand.
 *
 * @param x and `y` of the same length
 * @throws {RangeError} if the lengths differ or a value is not finite
 * @see Kendall 1938, Biometrika 30, 81
 */
export function kendallTauB(x: readonly number[], y: readonly number[]): number | undefined {
  requirePairs(x, y);
  let concordant = 0;
  let discordant = 0;
  let tiedX = 0;
  let tiedY = 0;
  for (let i = 0; i < x.length; i += 1) {
    for (let j = i + 1; j < x.length; j += 1) {
      const signX = Math.sign((x[i] ?? 0) - (x[j] ?? 0));
      const signY = Math.sign((y[i] ?? 0) - (y[j] ?? 0));
      if (signX === 0) tiedX += 1;
      if (signY === 0) tiedY += 1;
      if (signX * signY > 0) concordant += 1;
      else if (signX * signY < 0) discordant += 1;
    }
  }
  const pairs = (x.length * (x.length - 1)) / 2;
  const product = (pairs - tiedX) * (pairs - tiedY);
  return product > 0 ? (concordant - discordant) / Math.sqrt(product) : undefined;
}

/**
 * Spearman's rank correlation, −1 to 1: the correlation of the ranks, ties sharing their mean rank. Undefined if one list is all equal.
 *
 * @throws {RangeError} if the lengths differ or a value is not finite
 * @see Spearman 1904, American Journal of Psychology 15, 72
 */
export function spearmanRho(x: readonly number[], y: readonly number[]): number | undefined {
  requirePairs(x, y);
  const ranksX = rankDescending(x, 'average');
  const ranksY = rankDescending(y, 'average');
  const middle = (x.length + 1) / 2;
  let both = 0;
  let squareX = 0;
  let squareY = 0;
  for (let index = 0; index < x.length; index += 1) {
    const deviationX = (ranksX[index] ?? middle) - middle;
    const deviationY = (ranksY[index] ?? middle) - middle;
    both += deviationX * deviationY;
    squareX += deviationX ** 2;
    squareY += deviationY ** 2;
  }
  return squareX > 0 && squareY > 0 ? both / Math.sqrt(squareX * squareY) : undefined;
}

/**
 * Kendall's coefficient of concordance W with correction for ties: 0 for no agreement among the reviewers, 1 for the same order by all. Defined only if every reviewer scored
 * every proposal, there are at least two of each, and not everything is tied; otherwise undefined.
 *
 * @see Kendall & Babington Smith 1939, Annals of Mathematical Statistics 10, 275
 */
export function kendallW(sheet: ScoreSheet): number | undefined {
  requireValidSheet(sheet);
  const { proposalCount: n, reviewerCount: m, scores } = sheet;
  if (n < 2 || m < 2 || scores.length !== n * m) return undefined;
  const rankSums = new Float64Array(n);
  let ties = 0;
  for (const own of scoresByReviewer(sheet)) {
    const ranks = rankDescending(
      own.map(({ score }) => score),
      'average',
    );
    const groups = new Map<number, number>();
    own.forEach(({ proposal, score }, index) => {
      rankSums[proposal] = (rankSums[proposal] ?? 0) + (ranks[index] ?? 0);
      groups.set(tieKey(score), (groups.get(tieKey(score)) ?? 0) + 1);
    });
    for (const count of groups.values()) ties += count ** 3 - count;
  }
  const meanSum = (m * (n + 1)) / 2;
  const spread = rankSums.reduce((sum, value) => sum + (value - meanSum) ** 2, 0);
  const most = m * m * (n ** 3 - n) - m * ties;
  return most > 0 ? (12 * spread) / most : undefined;
}

function requirePairs(x: readonly number[], y: readonly number[]): void {
  if (x.length !== y.length) throw new RangeError(`The lists have ${x.length} and ${y.length} values.`);
  if (![...x, ...y].every(Number.isFinite)) throw new RangeError('A rank correlation needs finite values.');
}
