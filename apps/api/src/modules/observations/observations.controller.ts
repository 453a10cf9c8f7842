import { Id } from '@faintward/contracts/common';
import {
  ApplySetup,
  ApplySetupResult,
  Observation,
  ObservationListQuery,
  ObservationPage,
  ObservationPatch,
  RemovedObservations,
  RemoveObservations,
  TimeRequest,
} from '@faintward/contracts/observations';
import { Body, Controller, Get, Param, Patch, Post, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { BodyLimit } from '../../platform/http.js';
import { ObservationsService } from './observations.service.js';

@ApiTags('observations')
@Controller('proposals/:proposalId')
export class ObservationsController {
  constructor(private readonly observations: ObservationsService) {}

  @Get('observations')
  @Requires('proposal.read')
  @Answers(ObservationPage)
  list(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Query({ schema: ObservationListQuery }) query: ObservationListQuery,
  ): Promise<z.infer<typeof ObservationPage>> {
    return this.observations.list(actor, proposalId, query);
  }

  @Post('observations/apply')
  @Requires('proposal.edit-targets')
  // Twenty thousand identifiers are 0.8 MB.
  @BodyLimit(2)
  @Answers(ApplySetupResult, { status: 200 })
  apply(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: ApplySetup }) input: ApplySetup,
  ): Promise<ApplySetupResult> {
    return this.observations.apply(actor, proposalId, input);
  }

  @Patch('observations/:observationId')
  @Requires('proposal.edit-targets')
  @Answers(Observation)
  update(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('observationId', { schema: Id }) observationId: string,
    @IfMatch() version: number,
    @Body({ schema: ObservationPatch }) patch: ObservationPatch,
  ): Promise<Observation> {
    return this.observations.update(actor, proposalId, observationId, version, patch);
  }

  @Post('observations/removal')
  @Requires('proposal.edit-targets')
  @BodyLimit(2)
  @Answers(RemovedObservations, { status: 200 })
  remove(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: RemoveObservations }) input: z.output<typeof RemoveObservations>,
  ): Promise<z.infer<typeof RemovedObservations>> {
    return this.observations.remove(actor, proposalId, input.observationIds);
  }

  @Get('time-request')
  @Requires('proposal.read')
  @Answers(TimeRequest)
  timeRequest(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<TimeRequest> {
    return this.observations.timeRequest(actor, proposalId);
  }
}
