import type { Criterion, HoursByMoonClass, MoonClass, ReviewInput, ScoreAnswer } from '@faintward/contracts';
import type { CommentsData } from './demo-data.js';
import { randomStream, type RandomStream } from './random.js';

/** How freely reviewers give points, and how much one reviewer's scores scatter about what the proposal deserves. */
const LENIENCY_SIGMA = 0.7;
const PROPOSAL_SIGMA = 0.7;
const CRITERION_SIGMA = 0.5;
const CANNOT_JUDGE_SHARE = 0.03;
const STRONG_FROM = 7.5;
const WEAK_BELOW = 5;

/** A reviewer's offset, the same for everything that this reviewer reads. */
export function leniencyOf(personId: string): number {
  return LENIENCY_SIGMA * randomStream(`leniency of ${personId}`).normal();
}

/**
 * What one reviewer types about one proposal: the proposal's quality, the reviewer's leniency and two layers of noise, in
 * half steps, and a comment that goes with the score.
 *
 * @param howFar `begun` leaves the last criterion and the comment open
 */
export function opinionOf(
  quality: number,
  proposalId: string,
  personId: string,
  criteria: readonly Criterion[],
  comments: CommentsData,
  howFar: 'begun' | 'complete',
): ReviewInput {
  const random = randomStream(`review of ${proposalId} by ${personId}`);
  const impression = quality + leniencyOf(personId) + PROPOSAL_SIGMA * random.normal();
  const answered = howFar === 'complete' ? criteria : criteria.slice(0, -1);
  const answers = Object.fromEntries(
    answered.map(({ criterionId }, index): [string, ScoreAnswer] =>
      index > 0 && random.next() < CANNOT_JUDGE_SHARE
        ? [criterionId, { kind: 'cannotJudge' }]
        : [criterionId, { kind: 'score', score: halfStep(impression + CRITERION_SIGMA * random.normal()) }],
    ),
  );
  return {
    answers,
    commentToPrincipal: howFar === 'complete' ? commentFor(impression, comments, random) : '',
    confidentialComment: howFar === 'complete' ? random.pick(comments.confidential) : '',
  };
}

function commentFor(impression: number, comments: CommentsData, random: RandomStream): string {
  const pool =
    impression >= STRONG_FROM ? comments.strong : impression < WEAK_BELOW ? comments.weak : comments.middling;
  return `${random.pick(pool)} ${random.pick(comments.request)}`.trim();
}

function halfStep(score: number): number {
  return Math.min(10, Math.max(0, Math.round(score * 2) / 2));
}

export interface Contender {
  proposalId: string;
  meanScore: number;
  requestedHours: HoursByMoonClass;
  /** Whether it said that it can use thin cloud. */
  acceptsThinCloud: boolean;
}

export interface Decision {
  proposalId: string;
  hours: number;
  moonClass: MoonClass;
  standing: 'firm' | 'flexible' | 'filler' | undefined;
}

/** Share of a request below which an award is no use. */
const LEAST_USEFUL_SHARE = 0.5;
/** Fillers come on top of the hours that exist: they take what nobody else can use. */
const FILLER_SHARE_OF_AVAILABLE = 0.15;
const FILLER_SCORE_FROM = 5;

/**
 * Hands out the hours of each moon class from the best score down: the whole request while it fits, then what is left where
 * that is still useful, then fillers among those that can work through thin cloud. Everybody else is declined.
 */
export function decide(contenders: readonly Contender[], available: HoursByMoonClass): Decision[] {
  const left = { ...available };
  const fillerLeft = {
    dark: available.dark * FILLER_SHARE_OF_AVAILABLE,
    grey: available.grey * FILLER_SHARE_OF_AVAILABLE,
    bright: available.bright * FILLER_SHARE_OF_AVAILABLE,
  };
  return [...contenders]
    .sort((a, b) => b.meanScore - a.meanScore || (a.proposalId < b.proposalId ? -1 : 1))
    .map(({ proposalId, meanScore, requestedHours, acceptsThinCloud }): Decision => {
      const moonClass = mainMoonClass(requestedHours);
      // Awards are made in half hours, upwards: an observation that is cut by minutes is lost.
      const wanted = Math.ceil(2 * (requestedHours.dark + requestedHours.grey + requestedHours.bright)) / 2;
      if (wanted > 0 && wanted <= left[moonClass]) {
        left[moonClass] -= wanted;
        return { proposalId, hours: wanted, moonClass, standing: 'firm' };
      }
      const rest = Math.floor(2 * left[moonClass]) / 2;
      if (rest >= LEAST_USEFUL_SHARE * wanted) {
        left[moonClass] -= rest;
        return { proposalId, hours: rest, moonClass, standing: 'flexible' };
      }
      const spare = Math.floor(2 * Math.min(wanted, fillerLeft[moonClass])) / 2;
      if (acceptsThinCloud && meanScore >= FILLER_SCORE_FROM && spare >= 1) {
        fillerLeft[moonClass] -= spare;
        return { proposalId, hours: spare, moonClass, standing: 'filler' };
      }
      return { proposalId, hours: 0, moonClass, standing: undefined };
    });
}

function mainMoonClass(hours: HoursByMoonClass): MoonClass {
  if (hours.dark >= hours.grey && hours.dark >= hours.bright) return 'dark';
  return hours.grey >= hours.bright ? 'grey' : 'bright';
}
