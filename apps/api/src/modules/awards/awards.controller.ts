import { Id } from '@faintward/contracts/common';
import { AwardInput, Ranking } from '@faintward/contracts/reviews';
import { Body, Controller, Delete, Headers, Param, Post, Put } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch, parseIfMatch } from '../../platform/etag.js';
import { IdempotencyKey } from '../../platform/idempotency.js';
import { AwardsService } from './awards.service.js';

@ApiTags('awards')
@Controller('panels/:panelId')
export class AwardsController {
  constructor(private readonly awards: AwardsService) {}

  @Put('awards/:proposalId')
  @Requires('panel.award')
  @Answers(Ranking)
  set(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @Param('proposalId', { schema: Id }) proposalId: string,
    // A first award has no version to match; the service asks for it when there is one.
    @Headers('if-match') ifMatch: string | undefined,
    @IdempotencyKey() key: string | undefined,
    @Body({ schema: AwardInput }) input: AwardInput,
  ): Promise<Ranking> {
    const version = ifMatch === undefined ? undefined : parseIfMatch(ifMatch);
    return this.awards.set(actor, panelId, proposalId, version, key, input);
  }

  @Delete('awards/:proposalId')
  @Requires('panel.award')
  @Answers(Ranking)
  delete(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IfMatch() version: number,
  ): Promise<Ranking> {
    return this.awards.delete(actor, panelId, proposalId, version);
  }

  @Post('finalisation')
  @Requires('panel.award')
  @Answers(Ranking, { status: 200 })
  finalise(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @IdempotencyKey() key: string | undefined,
  ): Promise<Ranking> {
    return this.awards.finalise(actor, panelId, key);
  }
}
