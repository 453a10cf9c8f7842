export interface CriterionWeight {
  readonly criterionId: string;
  /** Relative, above 0; the weights need not add up to anything. */
  readonly weight: number;
}

/** A reviewer's answer on one criterion. Not having answered is the absence of an answer, which is something else than "cannot judge". */
export type CriterionAnswer = { readonly kind: 'score'; readonly score: number } | { readonly kind: 'cannotJudge' };

/**
 * - `complete`: every criterion is answered and at least one with a score
 * - `incomplete`: some criterion has no answer yet; `score` is what the answers so far would give
 * - `cannot-judge`: every criterion is answered with "cannot judge", so that there is no score
 */
export interface CriteriaScore {
  readonly state: 'complete' | 'incomplete' | 'cannot-judge';
  /** Weighted mean over the criteria that were scored; undefined if none was. */
  readonly score: number | undefined;
  /** Share of the total weight that the score rests on, 0 to 1. */
  readonly judgedWeightShare: number;
  readonly missingCriterionIds: readonly string[];
}

/**
 * A reviewer's overall score of a proposal: Σ wᵢ sᵢ / Σ wᵢ over the criteria that were scored. A criterion that the reviewer cannot judge is left out of both sums, so that
 * it neither raises nor lowers the score. Answers to criteria that the semester does not have are ignored.
 *
 * @throws {RangeError} if there are no criteria, a weight is not a finite number above 0, or a score is not finite
 */
export function criteriaScore(
  criteria: readonly CriterionWeight[],
  answers: Readonly<Record<string, CriterionAnswer | null | undefined>>,
): CriteriaScore {
  if (criteria.length === 0) throw new RangeError('A score needs at least one criterion.');
  let weightedSum = 0;
  let judgedWeight = 0;
  let totalWeight = 0;
  const missingCriterionIds: string[] = [];
  for (const { criterionId, weight } of criteria) {
    if (!(weight > 0 && Number.isFinite(weight)))
      throw new RangeError(`The weight of criterion ${criterionId} is ${weight}; it must be above 0.`);
    totalWeight += weight;
    const answer = Object.hasOwn(answers, criterionId) ? answers[criterionId] : undefined;
    if (answer === undefined || answer === null) {
      missingCriterionIds.push(criterionId);
    } else if (answer.kind === 'score') {
      if (!Number.isFinite(answer.score))
        throw new RangeError(`The score on criterion ${criterionId} is ${answer.score}.`);
      weightedSum += weight * answer.score;
      judgedWeight += weight;
    }
  }
  const score = judgedWeight > 0 ? weightedSum / judgedWeight : undefined;
  const state = missingCriterionIds.length > 0 ? 'incomplete' : score === undefined ? 'cannot-judge' : 'complete';
  return { state, score, judgedWeightShare: judgedWeight / totalWeight, missingCriterionIds };
}
