import type { FieldError } from '@faintward/contracts/errors';
import type { ReviewInput, ReviewState, ScoreAnswer } from '@faintward/contracts/reviews';
import type { Criterion } from '@faintward/contracts/semesters';
import { criteriaScore } from '@faintward/ranking';
import type { ReviewContent } from './reviews.queries.js';

export const UNWRITTEN: ReviewContent = {
  answers: {},
  overallScore: null,
  isComplete: false,
  commentToPrincipal: '',
  confidentialComment: '',
};

/** Answers to criteria that the semester does not have. */
export function unknownCriteria(input: ReviewInput, criteria: readonly Criterion[]): FieldError[] {
  const known = new Set(criteria.map(({ criterionId }) => criterionId));
  return Object.keys(input.answers ?? {})
    .filter((criterionId) => !known.has(criterionId))
    .map((criterionId) => ({
      path: `answers.${criterionId}`,
      message: `This semester has no criterion of that name; it has ${[...known].join(', ')}.`,
    }));
}

/**
 * A review with what a reviewer just typed: answers that are not mentioned stay, an answer of null is taken back. Complete is
 * a review that says something on every criterion and scores at least one.
 */
export function withInput(before: ReviewContent, input: ReviewInput, criteria: readonly Criterion[]): ReviewContent {
  const answers: Record<string, ScoreAnswer> = { ...before.answers };
  for (const [criterionId, answer] of Object.entries(input.answers ?? {})) {
    if (answer === null) delete answers[criterionId];
    else answers[criterionId] = answer;
  }
  const { state, score } = criteriaScore(criteria, answers);
  return {
    answers,
    overallScore: score ?? null,
    isComplete: state === 'complete',
    commentToPrincipal: input.commentToPrincipal ?? before.commentToPrincipal,
    confidentialComment: input.confidentialComment ?? before.confidentialComment,
  };
}

export function reviewStateOf(content: ReviewContent): Exclude<ReviewState, 'conflict'> {
  if (content.isComplete) return 'complete';
  const hasBegun =
    Object.keys(content.answers).length > 0 || content.commentToPrincipal !== '' || content.confidentialComment !== '';
  return hasBegun ? 'begun' : 'toRead';
}
