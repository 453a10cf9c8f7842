import { Module } from '@nestjs/common';
import { EngineModule } from '../../engine/engine.module.js';
import { ObservationsModule } from '../observations/observations.module.js';
import { ProposalsReadModule } from '../proposals/proposals-read.module.js';
import { TargetImportsService } from './target-imports.service.js';
import { TargetRecomputation } from './target-recomputation.service.js';
import { TargetsReadModule } from './targets-read.module.js';
import { TargetsController } from './targets.controller.js';
import { TargetsQueries } from './targets.queries.js';
import { TargetsService } from './targets.service.js';

@Module({
  imports: [EngineModule, ObservationsModule, ProposalsReadModule, TargetsReadModule],
  controllers: [TargetsController],
  providers: [TargetImportsService, TargetRecomputation, TargetsQueries, TargetsService],
  exports: [TargetRecomputation, TargetsReadModule],
})
export class TargetsModule {}
