import { Id } from '@faintward/contracts/common';
import {
  ModeConfigurationHistory,
  ModeConfigurationVersion,
  NewModeConfiguration,
  TelescopeList,
} from '@faintward/contracts/facilities';
import { Body, Controller, Get, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Public, Requires, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { FacilitiesService } from './facilities.service.js';

@ApiTags('facilities')
@Controller()
export class FacilitiesController {
  constructor(private readonly facilities: FacilitiesService) {}

  @Get('telescopes')
  @Public()
  @Answers(TelescopeList)
  listTelescopes(): Promise<z.infer<typeof TelescopeList>> {
    return this.facilities.listTelescopes();
  }

  @Get('modes/:modeId/configurations')
  @SignedIn()
  @Answers(ModeConfigurationHistory)
  listConfigurations(
    @Param('modeId', { schema: Id }) modeId: string,
  ): Promise<z.infer<typeof ModeConfigurationHistory>> {
    return this.facilities.listConfigurations(modeId);
  }

  @Post('modes/:modeId/configurations')
  @Requires('facility.manage')
  @Answers(ModeConfigurationVersion, { status: 201 })
  addConfiguration(
    @CurrentPerson() actor: Actor,
    @Param('modeId', { schema: Id }) modeId: string,
    @Body({ schema: NewModeConfiguration }) input: NewModeConfiguration,
  ): Promise<ModeConfigurationVersion> {
    return this.facilities.addConfiguration(actor, modeId, input);
  }
}
