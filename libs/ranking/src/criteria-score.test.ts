import { describe, expect, it } from 'vitest';
import { criteriaScore, type CriterionAnswer } from './index.js';

const criteria = [
  { criterionId: 'merit', weight: 3 },
  { criterionId: 'need', weight: 2 },
  { criterionId: 'plan', weight: 1 },
];
const score = (value: number): CriterionAnswer => ({ kind: 'score', score: value });
const cannotJudge: CriterionAnswer = { kind: 'cannotJudge' };

describe('score over criteria', () => {
  it('is the weighted mean', () => {
    // (3 × 8 + 2 × 6.5 + 1 × 5) / 6 = 7
    expect(criteriaScore(criteria, { merit: score(8), need: score(6.5), plan: score(5) })).toEqual({
      state: 'complete',
      score: 7,
      judgedWeightShare: 1,
      missingCriterionIds: [],
    });
  });

  it('leaves out what the reviewer cannot judge, without lowering the score', () => {
    // (3 × 8 + 1 × 4) / 4 = 7
    expect(criteriaScore(criteria, { merit: score(8), need: cannotJudge, plan: score(4) })).toEqual({
      state: 'complete',
      score: 7,
      judgedWeightShare: 4 / 6,
      missingCriterionIds: [],
    });
  });

  it('tells "cannot judge" from "not answered"', () => {
    expect(criteriaScore(criteria, { merit: score(8), need: null })).toMatchObject({
      state: 'incomplete',
      score: 8,
      missingCriterionIds: ['need', 'plan'],
    });
    expect(criteriaScore(criteria, { merit: cannotJudge, need: cannotJudge, plan: cannotJudge })).toMatchObject({
      state: 'cannot-judge',
      score: undefined,
      judgedWeightShare: 0,
    });
    expect(criteriaScore(criteria, {})).toMatchObject({ state: 'incomplete', score: undefined });
  });

  it('counts a score of 0 as a score', () => {
    expect(criteriaScore(criteria, { merit: score(0), need: score(0), plan: score(0) })).toMatchObject({
      state: 'complete',
      score: 0,
    });
  });

  it('does not take inherited properties for answers', () => {
    expect(criteriaScore([{ criterionId: 'toString', weight: 1 }], {}).missingCriterionIds).toEqual(['toString']);
  });

  it('refuses no criteria, useless weights and scores that are not numbers', () => {
    expect(() => criteriaScore([], {})).toThrow(RangeError);
    expect(() => criteriaScore([{ criterionId: 'a', weight: 0 }], {})).toThrow(/weight/);
    expect(() => criteriaScore([{ criterionId: 'a', weight: 1 }], { a: score(Number.NaN) })).toThrow(/score/);
  });
});
