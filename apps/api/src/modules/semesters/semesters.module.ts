import { Module } from '@nestjs/common';
import { FacilitiesModule } from '../facilities/facilities.module.js';
import { ReviewsReadModule } from '../reviews/reviews-read.module.js';
import { SemestersController } from './semesters.controller.js';
import { SemestersQueries } from './semesters.queries.js';
import { SemestersReadModel } from './semesters.read-model.js';
import { SemestersService } from './semesters.service.js';

@Module({
  imports: [FacilitiesModule, ReviewsReadModule],
  controllers: [SemestersController],
  providers: [SemestersQueries, SemestersReadModel, SemestersService],
  exports: [SemestersReadModel, SemestersService],
})
export class SemestersModule {}
