import type { Proposal } from '@faintward/contracts/proposals';

/** Why the targets of a proposal can be read and not changed. */
export function readOnlyReason(state: Proposal['state']): string {
  return state === 'draft' || state === 'submitted'
    ? 'You may read these targets. The principal investigator can let you edit them, under Team.'
    : 'The deadline has passed: targets can be read and no longer changed.';
}
