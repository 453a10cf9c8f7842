import type { ProposalAbilities, ProposalState } from '@faintward/contracts/proposals';
import type { TeamAccess } from '@faintward/contracts/permissions';
import { DomainError } from '../../platform/domain-error.js';
import { isPastDeadline } from '../semesters/semesters.read-model.js';

export interface ProposalStanding {
  state: ProposalState;
  deadlineAt: Date;
}

export interface Membership {
  access: TeamAccess;
  isPrincipal: boolean;
}

/** The state as people see it: a submitted proposal is in review from the deadline on, without anybody storing it. */
export function shownState({ state, deadlineAt }: ProposalStanding, now: Date): ProposalState {
  return state === 'submitted' && now >= deadlineAt ? 'inReview' : state;
}

/** @throws {DomainError} `wrong-state` or `deadline-passed` when nothing of the proposal can be changed any more */
export function requireChangeable({ state, deadlineAt }: ProposalStanding, now: Date): void {
  switch (state) {
    case 'draft':
    case 'submitted':
      if (isPastDeadline(deadlineAt, now)) {
        throw new DomainError(
          'deadline-passed',
          `The deadline was ${deadlineAt.toISOString()}; since then this proposal cannot be changed. Nothing of this change was stored.`,
        );
      }
      return;
    case 'withdrawn':
      throw new DomainError('wrong-state', 'This proposal was withdrawn and cannot be changed any more.');
    case 'inReview':
      throw new DomainError('wrong-state', 'This proposal is in review and cannot be changed any more.');
    case 'awarded':
    case 'declined':
      throw new DomainError('wrong-state', 'This proposal is decided and cannot be changed any more.');
  }
}

export function canEditTargets({ access, isPrincipal }: Membership): boolean {
  return isPrincipal || access === 'editsTargets' || access === 'editsEverything';
}

export function canEditEverything({ access, isPrincipal }: Membership): boolean {
  return isPrincipal || access === 'editsEverything';
}

/** What a member may do now; every service decides again. */
export function abilitiesOf(standing: ProposalStanding, membership: Membership, now: Date): ProposalAbilities {
  const isChangeable = (standing.state === 'draft' || standing.state === 'submitted') && now < standing.deadlineAt;
  return {
    canEditTargets: isChangeable && canEditTargets(membership),
    canEditEverything: isChangeable && canEditEverything(membership),
    canManageTeam: isChangeable && membership.isPrincipal,
    canSubmit: isChangeable && membership.isPrincipal,
    canWithdraw: membership.isPrincipal && (standing.state === 'submitted' || standing.state === 'inReview'),
  };
}
