import { Module } from '@nestjs/common';
import { AwardsReadModule } from '../awards/awards-read.module.js';
import { PanelsModule } from '../panels/panels.module.js';
import { ReviewsReadModule } from '../reviews/reviews-read.module.js';
import { SemestersModule } from '../semesters/semesters.module.js';
import { RankingController } from './ranking.controller.js';
import { RankingService } from './ranking.service.js';

@Module({
  imports: [AwardsReadModule, PanelsModule, ReviewsReadModule, SemestersModule],
  controllers: [RankingController],
  providers: [RankingService],
  exports: [RankingService],
})
export class RankingModule {}
