import { Conditions, Goal } from '@faintward/contracts/estimates';
import type { Observation } from '@faintward/contracts/observations';
import { z } from 'zod';
import { formatDuration, formatNumber } from '../../lib/format';
import { perWords } from '../../ui/estimate/estimateWords';
import { fromGoalDraft, goalFieldOfPath, type GoalDraft } from '../../ui/estimate/goalDraft';
import { parseNumber } from '../../ui/form/parseNumber';

/** A setup, a goal and conditions as typed and chosen. */
export interface PlanDraft extends GoalDraft {
  mode: string;
  repeat: string;
}
export type PlanField = keyof PlanDraft;
export type PlanErrors = Partial<Record<PlanField, string>>;

export const firstPlan: PlanDraft = {
  mode: '',
  goal: 'signalToNoise',
  snr: '5',
  per: 'aperture',
  single: '',
  count: '6',
  seeing: '',
  airmass: '1.2',
  moon: 'dark',
  transparency: 'clear',
  repeat: '1',
};

const text = (value: number | undefined) => (value === undefined ? '' : String(value));

export function toPlanDraft({
  modeId,
  goal,
  conditions,
  repeatCount,
}: Pick<Observation, 'modeId' | 'goal' | 'conditions' | 'repeatCount'>): PlanDraft {
  return {
    ...firstPlan,
    mode: modeId,
    goal: goal.kind,
    ...(goal.kind === 'signalToNoise' ? { snr: text(goal.value), per: goal.per } : {}),
    ...(goal.kind === 'lineSignificance' ? { snr: text(goal.sigma) } : {}),
    ...(goal.kind === 'exposureTime' ? { count: text(goal.exposureCount), per: goal.per ?? 'aperture' } : {}),
    single: text(goal.exposureSeconds),
    seeing: text(conditions.seeingArcsec),
    airmass: text(conditions.airmass),
    moon: conditions.moonClass,
    transparency: conditions.transparency,
    repeat: text(repeatCount),
  };
}

const Plan = z.object({
  modeId: z.uuid({ error: 'Choose an instrument and a mode.' }),
  goal: Goal,
  conditions: Conditions,
  repeatCount: z.int({ error: 'A whole number, 1 or more.' }).min(1, { error: 'At least once.' }).max(200),
});
export type Plan = z.output<typeof Plan>;

/** Which typed field a path of the request came from. */
const fieldOfPart: Record<string, PlanField> = {
  ...goalFieldOfPath,
  modeId: 'mode',
  setup: 'mode',
  'setup.modeId': 'mode',
  repeatCount: 'repeat',
};
export const planFieldOf = (path: string): PlanField | undefined => fieldOfPart[path];

export type ReadPlan = { ok: true; plan: Plan } | { ok: false; errors: PlanErrors };

/** What a draft asks for, or what is wrong with which field. */
export function readPlanDraft(draft: PlanDraft): ReadPlan {
  const parsed = Plan.safeParse({
    modeId: draft.mode,
    ...fromGoalDraft(draft),
    repeatCount: parseNumber(draft.repeat) ?? undefined,
  });
  if (parsed.success) return { ok: true, plan: parsed.data };
  const errors: PlanErrors = {};
  for (const issue of parsed.error.issues) {
    const field = planFieldOf(issue.path.join('.'));
    if (field) errors[field] ??= draft[field] === '' && field !== 'mode' ? 'Needed.' : issue.message;
  }
  return { ok: false, errors };
}

export function describeGoal(goal: Goal): string {
  const number = (value: number) => formatNumber(value, { significant: 3 });
  switch (goal.kind) {
    case 'signalToNoise':
      return `S/N ${number(goal.value)} per ${perWords[goal.per]}`;
    case 'lineSignificance':
      return `line at ${number(goal.sigma)} σ`;
    case 'exposureTime':
      return `${goal.exposureCount} × ${formatDuration(goal.exposureSeconds)}`;
  }
}

export function describeConditions(conditions: Conditions): string {
  return [
    `${conditions.seeingArcsec}″`,
    `airmass ${conditions.airmass}`,
    conditions.moonClass,
    conditions.transparency === 'clear' ? 'clear' : 'thin cloud',
  ].join(' · ');
}

/** The same in a few signs, for a table: seeing and airmass are limits, the sky is as dark and clear or better. */
export function shortConditions({ seeingArcsec, airmass, moonClass, transparency }: Conditions): string {
  const sky = transparency === 'clear' ? 'clear' : 'thin cloud';
  // In a narrow column the sky goes to the next line as a whole.
  return [`≤ ${seeingArcsec}″ · X ≤ ${airmass}`, `${moonClass} · ${sky}`]
    .map((line) => line.replaceAll(' ', '\u00a0'))
    .join(' · ');
}
