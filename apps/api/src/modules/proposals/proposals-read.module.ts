import { Module } from '@nestjs/common';
import { ProposalAccess } from './proposal-access.service.js';
import { ProposalFactsReadModel } from './proposal-facts.read-model.js';

/** Access to proposals and facts about them: what team, targets, observations and submissions build on. */
@Module({
  providers: [ProposalAccess, ProposalFactsReadModel],
  exports: [ProposalAccess, ProposalFactsReadModel],
})
export class ProposalsReadModule {}
