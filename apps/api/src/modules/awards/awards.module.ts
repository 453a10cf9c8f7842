import { Module } from '@nestjs/common';
import { PanelsModule } from '../panels/panels.module.js';
import { ProposalOutcomesModule } from '../proposals/proposal-outcomes.module.js';
import { RankingModule } from '../ranking/ranking.module.js';
import { SemestersModule } from '../semesters/semesters.module.js';
import { AwardsController } from './awards.controller.js';
import { AwardsQueries } from './awards.queries.js';
import { AwardsReadModule } from './awards-read.module.js';
import { AwardsService } from './awards.service.js';

@Module({
  imports: [AwardsReadModule, PanelsModule, ProposalOutcomesModule, RankingModule, SemestersModule],
  controllers: [AwardsController],
  providers: [AwardsQueries, AwardsService],
  exports: [AwardsReadModule],
})
export class AwardsModule {}
