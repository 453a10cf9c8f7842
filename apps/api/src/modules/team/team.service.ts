import type { NewTeamMember, TeamMember, TeamMemberPatch } from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { onConstraint } from '../../platform/database-errors.js';
import { DomainError, forbidden, invalidField, notFound, staleVersion } from '../../platform/domain-error.js';
import { type Change, HistoryService } from '../../platform/history.js';
import { ConflictsService } from '../panels/conflicts.service.js';
import { ProposalAccess, type ProposalForMember } from '../proposals/proposal-access.service.js';
import { TeamQueries } from './team.queries.js';
import { TeamReadModel } from './team.read-model.js';

interface Members {
  rows: TeamMember[];
}

/** The people of a proposal: one principal investigator, who decides on all others; everybody may leave. */
@Injectable()
export class TeamService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: TeamQueries,
    private readonly readModel: TeamReadModel,
    private readonly conflicts: ConflictsService,
    private readonly history: HistoryService,
  ) {}

  async list(actor: Actor, proposalId: string): Promise<Members> {
    await this.access.requireRead(actor, proposalId);
    return this.listStored(actor, proposalId);
  }

  async add(actor: Actor, proposalId: string, { personId, access }: NewTeamMember): Promise<Members> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requirePrincipalForChange(actor, proposalId);
      const name = await this.queries.findPersonName(personId);
      if (name === undefined) throw invalidField('personId', 'There is no such person.');
      const memberId = await onConstraint({ proposal_members_unique: () => alreadyOnTeam(name) }, () =>
        this.queries.insert(proposalId, personId, access),
      );
      await this.record(actor, proposal, memberId, name, 'created', { access: { before: null, after: access } });
      // The committee has the proposal already: somebody of it may have joined.
      if (proposal.state === 'submitted') await this.conflicts.detectForProposal(proposalId);
      return this.listStored(actor, proposalId);
    });
  }

  async setAccess(
    actor: Actor,
    proposalId: string,
    memberId: string,
    version: number,
    { access }: TeamMemberPatch,
  ): Promise<Members> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requirePrincipalForChange(actor, proposalId);
      const member = await this.queries.findLocked(proposalId, memberId);
      if (member === undefined) throw notFound('member');
      if (member.version !== version) throw staleVersion(await this.listStored(actor, proposalId));
      if (member.isPrincipal) {
        throw new DomainError('wrong-state', 'The principal investigator always edits everything.');
      }
      if (member.access !== access) {
        await this.queries.setAccess(memberId, access);
        const name = (await this.queries.findPersonName(member.personId)) ?? '';
        await this.record(actor, proposal, memberId, name, 'changed', {
          access: { before: member.access, after: access },
        });
      }
      return this.listStored(actor, proposalId);
    });
  }

  /** The principal investigator removes others; everybody else may only leave, and then sees nothing of it any more. */
  async remove(actor: Actor, proposalId: string, memberId: string, version: number): Promise<Members> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requireMemberForChange(actor, proposalId);
      const isOwnPlace = memberId === proposal.memberId;
      if (!proposal.isPrincipal && !isOwnPlace) {
        throw forbidden('Only the principal investigator can remove others from the team.');
      }
      const member = await this.queries.findLocked(proposalId, memberId);
      if (member === undefined) throw notFound('member');
      if (member.version !== version) throw staleVersion(await this.listStored(actor, proposalId));
      if (member.isPrincipal) {
        throw new DomainError('wrong-state', 'A proposal has exactly one principal investigator, who cannot leave it.');
      }
      await this.queries.delete(memberId);
      const name = (await this.queries.findPersonName(member.personId)) ?? '';
      await this.record(actor, proposal, memberId, name, 'removed', {
        access: { before: member.access, after: null },
      });
      return isOwnPlace ? { rows: [] } : this.listStored(actor, proposalId);
    });
  }

  /** Everybody signs for themselves. A second signature changes nothing. */
  async sign(actor: Actor, proposalId: string): Promise<Members> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requireMemberForChange(actor, proposalId);
      const member = await this.queries.findLocked(proposalId, proposal.memberId);
      if (member === undefined) throw notFound('proposal');
      if (member.signedAt === null) {
        const signedAt = new Date();
        await this.queries.setSigned(proposal.memberId, signedAt);
        const name = (await this.queries.findPersonName(actor.personId)) ?? '';
        await this.record(actor, proposal, proposal.memberId, name, 'signed', {
          signedAt: { before: null, after: signedAt.toISOString() },
        });
      }
      return this.listStored(actor, proposalId);
    });
  }

  private async listStored(actor: Actor, proposalId: string): Promise<Members> {
    return { rows: await this.readModel.list(proposalId, actor.personId) };
  }

  private async record(
    actor: Actor,
    { proposalId }: ProposalForMember,
    memberId: string,
    name: string,
    action: string,
    details: Change['details'] & object,
  ): Promise<void> {
    await this.history.record({
      personId: actor.personId,
      scope: 'proposal',
      scopeId: proposalId,
      subject: 'member',
      subjectId: memberId,
      subjectName: name,
      action,
      details,
    });
    await this.access.touch(proposalId);
  }
}

function alreadyOnTeam(name: string): DomainError {
  return new DomainError('already-exists', `${name} is on the team already.`, {
    fieldErrors: [{ path: 'personId', message: `${name} is on the team already.` }],
  });
}
