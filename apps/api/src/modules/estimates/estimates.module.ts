import { Module } from '@nestjs/common';
import { FacilitiesModule } from '../facilities/facilities.module.js';
import { EstimatesController } from './estimates.controller.js';
import { EstimatesService } from './estimates.service.js';

@Module({ imports: [FacilitiesModule], controllers: [EstimatesController], providers: [EstimatesService] })
export class EstimatesModule {}
