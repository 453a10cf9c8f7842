import type { Goal } from '@faintward/contracts/estimates';
import { parseNumber } from '../form/parseNumber';

/** What an exposure is for and under which sky, as typed and chosen: flat, so that a change of kind loses nothing. */
export interface GoalDraft {
  goal: Goal['kind'];
  /** Signal-to-noise ratio, or the significance of a line in σ. */
  snr: string;
  per: string;
  /** Seconds of one exposure. */
  single: string;
  count: string;
  seeing: string;
  airmass: string;
  moon: string;
  transparency: string;
}

/** Which typed field a path of a request came from. */
export const goalFieldOfPath: Readonly<Record<string, keyof GoalDraft>> = {
  goal: 'goal',
  'goal.kind': 'goal',
  'goal.value': 'snr',
  'goal.sigma': 'snr',
  'goal.per': 'per',
  'goal.exposureSeconds': 'single',
  'goal.exposureCount': 'count',
  'conditions.seeingArcsec': 'seeing',
  'conditions.airmass': 'airmass',
  'conditions.moonClass': 'moon',
  'conditions.transparency': 'transparency',
};

/** Goal and conditions as a request takes them. Not checked: an unreadable number is lacking. */
export function fromGoalDraft(draft: GoalDraft) {
  const number = (field: keyof GoalDraft) => parseNumber(draft[field]) ?? undefined;
  const exposureSeconds = number('single');
  const goals = {
    signalToNoise: { value: number('snr'), per: draft.per, exposureSeconds },
    lineSignificance: { sigma: number('snr'), exposureSeconds },
    exposureTime: { exposureSeconds, exposureCount: number('count'), per: draft.per },
  };
  return {
    goal: { kind: draft.goal, ...goals[draft.goal] },
    conditions: {
      seeingArcsec: number('seeing'),
      airmass: number('airmass'),
      moonClass: draft.moon,
      transparency: draft.transparency,
    },
  };
}
