import { Id } from '@faintward/contracts/common';
import { LightReport, ProposalCosmologies, TargetLightQuery } from '@faintward/contracts/light-report';
import { Controller, Get, Param, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { ProposalLightService } from './proposal-light.service.js';

@ApiTags('targets')
@Controller('proposals/:proposalId')
export class ProposalLightController {
  constructor(private readonly light: ProposalLightService) {}

  @Get('targets/:targetId/light')
  @Requires('proposal.read')
  @Answers(LightReport)
  report(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('targetId', { schema: Id }) targetId: string,
    @Query({ schema: TargetLightQuery }) query: TargetLightQuery,
  ): Promise<LightReport> {
    return this.light.report(actor, proposalId, targetId, query);
  }

  @Get('cosmologies')
  @Requires('proposal.read')
  @Answers(ProposalCosmologies)
  compareCosmologies(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<ProposalCosmologies> {
    return this.light.compareCosmologies(actor, proposalId);
  }
}
