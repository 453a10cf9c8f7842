import { Module } from '@nestjs/common';
import { PanelsModule } from '../panels/panels.module.js';
import { SemestersModule } from '../semesters/semesters.module.js';
import { ReviewsController } from './reviews.controller.js';
import { ReviewsQueries } from './reviews.queries.js';
import { ReviewsReadModule } from './reviews-read.module.js';
import { ReviewsService } from './reviews.service.js';

@Module({
  imports: [PanelsModule, ReviewsReadModule, SemestersModule],
  controllers: [ReviewsController],
  providers: [ReviewsQueries, ReviewsService],
  exports: [ReviewsReadModule],
})
export class ReviewsModule {}
