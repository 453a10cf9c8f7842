import { Module } from '@nestjs/common';
import { FacilitiesController } from './facilities.controller.js';
import { FacilitiesQueries } from './facilities.queries.js';
import { FacilitiesReadModel } from './facilities.read-model.js';
import { FacilitiesService } from './facilities.service.js';

@Module({
  controllers: [FacilitiesController],
  providers: [FacilitiesQueries, FacilitiesReadModel, FacilitiesService],
  exports: [FacilitiesReadModel],
})
export class FacilitiesModule {}
