import { Module } from '@nestjs/common';
import { EngineModule } from '../../engine/engine.module.js';
import { FacilitiesModule } from '../facilities/facilities.module.js';
import { ProposalsReadModule } from '../proposals/proposals-read.module.js';
import { TargetsReadModule } from '../targets/targets-read.module.js';
import { ObservationsController } from './observations.controller.js';
import { ObservationsQueries } from './observations.queries.js';
import { ObservationsReadModel } from './observations.read-model.js';
import { ObservationsService } from './observations.service.js';
import { ObservationEstimates } from './observation-estimates.service.js';

@Module({
  imports: [EngineModule, FacilitiesModule, ProposalsReadModule, TargetsReadModule],
  controllers: [ObservationsController],
  providers: [ObservationEstimates, ObservationsQueries, ObservationsReadModel, ObservationsService],
  exports: [ObservationEstimates, ObservationsReadModel],
})
export class ObservationsModule {}
