/** What a list of scores looks like. Every field but the count is undefined where it does not exist. */
export interface ScoreSummary {
  readonly count: number;
  readonly mean: number | undefined;
  /** Middle score, or the mean of the two middle ones. */
  readonly median: number | undefined;
  /** Sample standard deviation (divided by n − 1); from two scores on. */
  readonly spread: number | undefined;
  readonly lowest: number | undefined;
  readonly highest: number | undefined;
}

export function summariseScores(scores: readonly number[]): ScoreSummary {
  const sorted = [...scores].sort((a, b) => a - b);
  return {
    count: sorted.length,
    mean: meanOf(sorted),
    median: medianOfSorted(sorted),
    spread: sampleStandardDeviation(sorted),
    lowest: sorted[0],
    highest: sorted.at(-1),
  };
}

/** Arithmetic mean, or undefined of nothing. */
export function meanOf(values: readonly number[]): number | undefined {
  if (values.length === 0) return undefined;
  return values.reduce((sum, value) => sum + value, 0) / values.length;
}

/** Standard deviation of a sample about its own mean, with n − 1 in the denominator; undefined below two values. */
export function sampleStandardDeviation(values: readonly number[]): number | undefined {
  const mean = meanOf(values);
  if (mean === undefined || values.length < 2) return undefined;
  // Equal values have exactly no spread; their mean may be rounded, which would leave a trace of one.
  if (values.every((value) => value === values[0])) return 0;
  return Math.sqrt(values.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (values.length - 1));
}

function medianOfSorted(sorted: readonly number[]): number | undefined {
  const middle = sorted.length >> 1;
  const upper = sorted[middle];
  const lower = sorted[middle - 1];
  if (upper === undefined) return undefined;
  return sorted.length % 2 === 1 || lower === undefined ? upper : (lower + upper) / 2;
}
