import type { TeamAccess } from '@faintward/contracts/permissions';
import type { ProposalState } from '@faintward/contracts/proposals';
import type { HoursByMoonClass } from '@faintward/contracts/semesters';
import { formatNumber } from '../../../lib/format';

export const stateWords: Record<ProposalState, string> = {
  draft: 'draft',
  submitted: 'submitted',
  inReview: 'in review',
  awarded: 'awarded',
  declined: 'declined',
  withdrawn: 'withdrawn',
};

export const accessWords: Record<TeamAccess, string> = {
  reads: 'reads',
  editsTargets: 'edits targets',
  editsEverything: 'edits everything',
};

/** "61.4 h, 48 dark": the total, then the classes that are asked for. */
export function describeHours(hours: HoursByMoonClass): string {
  const total = hours.dark + hours.grey + hours.bright;
  if (total === 0) return 'no hours yet';
  const classes = (['dark', 'grey', 'bright'] as const).filter((moonClass) => hours[moonClass] > 0);
  const whole = `${formatNumber(total, { decimals: 1 })} h`;
  const [only] = classes;
  if (classes.length === 1 && only) return `${whole} ${only}`;
  return `${whole}: ${classes.map((moonClass) => `${formatNumber(hours[moonClass], { decimals: 1 })} ${moonClass}`).join(', ')}`;
}
