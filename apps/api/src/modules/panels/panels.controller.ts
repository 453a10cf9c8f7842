import { Id } from '@faintward/contracts/common';
import { Assignment, AutomaticAssignment, AutomaticAssignmentResult, Panel } from '@faintward/contracts/reviews';
import { Body, Controller, Delete, Get, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IdempotencyKey } from '../../platform/idempotency.js';
import { PanelsService } from './panels.service.js';

@ApiTags('panels')
@Controller('panels/:panelId')
export class PanelsController {
  constructor(private readonly panels: PanelsService) {}

  @Get()
  @Requires('panel.read')
  @Answers(Panel)
  get(@CurrentPerson() actor: Actor, @Param('panelId', { schema: Id }) panelId: string): Promise<Panel> {
    return this.panels.get(actor, panelId);
  }

  @Post('assignments')
  @Requires('panel.assign')
  @Answers(Panel, { status: 201 })
  assign(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @IdempotencyKey() key: string | undefined,
    @Body({ schema: Assignment }) input: Assignment,
  ): Promise<Panel> {
    return this.panels.assign(actor, panelId, key, input);
  }

  @Delete('assignments/:proposalId/:personId')
  @Requires('panel.assign')
  @Answers(Panel)
  unassign(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('personId', { schema: Id }) personId: string,
  ): Promise<Panel> {
    return this.panels.unassign(actor, panelId, proposalId, personId);
  }

  @Post('automatic-assignment')
  @Requires('panel.assign')
  @Answers(AutomaticAssignmentResult, { status: 200 })
  assignAutomatically(
    @CurrentPerson() actor: Actor,
    @Param('panelId', { schema: Id }) panelId: string,
    @IdempotencyKey() key: string | undefined,
    @Body({ schema: AutomaticAssignment }) input: AutomaticAssignment,
  ): Promise<z.infer<typeof AutomaticAssignmentResult>> {
    return this.panels.assignAutomatically(actor, panelId, key, input);
  }
}
