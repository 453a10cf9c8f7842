import { Id } from '@faintward/contracts/common';
import { NewTeamMember, TeamMemberList, TeamMemberPatch } from '@faintward/contracts/proposals';
import { Body, Controller, Delete, Get, Param, Patch, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { TeamService } from './team.service.js';

type Members = Promise<z.infer<typeof TeamMemberList>>;

@ApiTags('team')
@Controller('proposals/:proposalId/members')
export class TeamController {
  constructor(private readonly team: TeamService) {}

  @Get()
  @Requires('proposal.read')
  @Answers(TeamMemberList)
  list(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Members {
    return this.team.list(actor, proposalId);
  }

  @Post()
  @Requires('proposal.manage-team')
  @Answers(TeamMemberList, { status: 201 })
  add(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: NewTeamMember }) input: NewTeamMember,
  ): Members {
    return this.team.add(actor, proposalId, input);
  }

  @Post('me/signature')
  @Requires('proposal.read')
  @Answers(TeamMemberList, { status: 200 })
  sign(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Members {
    return this.team.sign(actor, proposalId);
  }

  @Patch(':memberId')
  @Requires('proposal.manage-team')
  @Answers(TeamMemberList)
  setAccess(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('memberId', { schema: Id }) memberId: string,
    @IfMatch() version: number,
    @Body({ schema: TeamMemberPatch }) patch: TeamMemberPatch,
  ): Members {
    return this.team.setAccess(actor, proposalId, memberId, version, patch);
  }

  @Delete(':memberId')
  @Requires('proposal.read')
  @Answers(TeamMemberList)
  remove(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('memberId', { schema: Id }) memberId: string,
    @IfMatch() version: number,
  ): Members {
    return this.team.remove(actor, proposalId, memberId, version);
  }
}
