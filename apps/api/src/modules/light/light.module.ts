import { Module } from '@nestjs/common';
import { EngineModule } from '../../engine/engine.module.js';
import { FacilitiesModule } from '../facilities/facilities.module.js';
import { ObservationsModule } from '../observations/observations.module.js';
import { ProposalsReadModule } from '../proposals/proposals-read.module.js';
import { TargetsReadModule } from '../targets/targets-read.module.js';
import { LightController } from './light.controller.js';
import { LightService } from './light.service.js';
import { ProposalLightController } from './proposal-light.controller.js';
import { ProposalLightService } from './proposal-light.service.js';

@Module({
  imports: [EngineModule, FacilitiesModule, ObservationsModule, ProposalsReadModule, TargetsReadModule],
  controllers: [LightController, ProposalLightController],
  providers: [LightService, ProposalLightService],
})
export class LightModule {}
