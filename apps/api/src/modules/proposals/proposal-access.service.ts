import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { TeamAccess } from '@faintward/contracts/permissions';
import type { ProposalState } from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { and, eq, isNull, sql } from 'drizzle-orm';
import { proposalMembers, proposals } from '../../database/schema/proposals.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { forbidden, notFound } from '../../platform/domain-error.js';
import { proposalLabel } from '../semesters/semesters.read-model.js';
import { canEditEverything, canEditTargets, requireChangeable } from './proposal-rules.js';

/** A proposal as seen by one member of its team: what decisions about it need. */
export interface ProposalForMember {
  proposalId: string;
  label: string;
  title: string;
  abstract: string;
  state: ProposalState;
  semesterId: string;
  semesterName: string;
  deadlineAt: Date;
  panelId: string | null;
  cosmology: CosmologyChoice;
  version: number;
  memberId: string;
  access: TeamAccess;
  isPrincipal: boolean;
}

/**
 * Who may do what with a proposal's working copy. Only the team: neither staff nor administrators nor committees, who read
 * what was submitted. To everybody else the proposal is absent.
 *
 * The `…ForChange` methods belong into a transaction: they keep the proposal's row until it ends, so that an edit, a
 * submission and a change of cosmology come one after the other.
 */
@Injectable()
export class ProposalAccess {
  constructor(private readonly database: DatabaseService) {}

  /** @throws {DomainError} `not-found` unless the person is on the team */
  async requireRead(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    return this.get(actor, proposalId, false);
  }

  /** @throws {DomainError} `not-found`, `forbidden`, `wrong-state` or `deadline-passed` */
  async requireTargetsForChange(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.get(actor, proposalId, true);
    requireTargets(proposal);
    requireChangeable(proposal, new Date());
    return proposal;
  }

  /** As {@link requireTargetsForChange}, without keeping the row: for work that is done before the transaction begins. */
  async requireTargets(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.get(actor, proposalId, false);
    requireTargets(proposal);
    requireChangeable(proposal, new Date());
    return proposal;
  }

  async requireEverythingForChange(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.get(actor, proposalId, true);
    if (!canEditEverything(proposal)) {
      throw forbidden(
        'Your access to this proposal does not include its text and settings. Ask the principal investigator.',
      );
    }
    requireChangeable(proposal, new Date());
    return proposal;
  }

  /** For a member's own place on the team. */
  async requireMemberForChange(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.get(actor, proposalId, true);
    requireChangeable(proposal, new Date());
    return proposal;
  }

  async requirePrincipalForChange(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.requirePrincipalInAnyState(actor, proposalId);
    requireChangeable(proposal, new Date());
    return proposal;
  }

  /** For what its own rule allows in other states as well. */
  async requirePrincipalInAnyState(actor: Actor, proposalId: string): Promise<ProposalForMember> {
    const proposal = await this.get(actor, proposalId, true);
    if (!proposal.isPrincipal) throw forbidden('Only the principal investigator can do this.');
    return proposal;
  }

  private async get(actor: Actor, proposalId: string, isLocked: boolean): Promise<ProposalForMember> {
    const query = this.database
      .current()
      .select({
        proposalId: proposals.id,
        number: proposals.number,
        title: proposals.title,
        abstract: proposals.abstract,
        state: proposals.state,
        semesterId: proposals.semesterId,
        panelId: proposals.panelId,
        cosmology: proposals.cosmology,
        version: proposals.version,
        semesterName: semesters.name,
        labelPrefix: semesters.labelPrefix,
        deadlineAt: semesters.deadlineAt,
        memberId: proposalMembers.id,
        access: proposalMembers.access,
        isPrincipal: proposalMembers.isPrincipal,
      })
      .from(proposals)
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .innerJoin(
        proposalMembers,
        and(eq(proposalMembers.proposalId, proposals.id), eq(proposalMembers.personId, actor.personId)),
      )
      .where(and(eq(proposals.id, proposalId), isNull(proposals.deletedAt)));
    const [row] = isLocked ? await query.for('no key update', { of: proposals }) : await query;
    if (row === undefined) throw notFound('proposal');
    const { number, labelPrefix, ...rest } = row;
    return { ...rest, label: proposalLabel(labelPrefix, number) };
  }

  /** Marks the proposal as changed for lists; its own version is for its own fields and stays. */
  async touch(proposalId: string): Promise<void> {
    await this.database
      .current()
      .update(proposals)
      .set({ updatedAt: sql`now()` })
      .where(eq(proposals.id, proposalId));
  }
}

function requireTargets(proposal: ProposalForMember): void {
  if (!canEditTargets(proposal)) {
    throw forbidden('Your access to this proposal is to read it. Ask the principal investigator for more.');
  }
}
