import { Module } from '@nestjs/common';
import { ReviewsReadModule } from '../reviews/reviews-read.module.js';
import { SubmissionsReadModule } from '../submissions/submissions-read.module.js';
import { ConflictsModule } from './conflicts.module.js';
import { PanelAccess } from './panel-access.service.js';
import { PanelProposalsReadModel } from './panel-proposals.read-model.js';
import { PanelsController } from './panels.controller.js';
import { PanelsQueries } from './panels.queries.js';
import { PanelsReadModule } from './panels-read.module.js';
import { PanelsService } from './panels.service.js';

@Module({
  imports: [ConflictsModule, PanelsReadModule, ReviewsReadModule, SubmissionsReadModule],
  controllers: [PanelsController],
  providers: [PanelAccess, PanelProposalsReadModel, PanelsQueries, PanelsService],
  exports: [ConflictsModule, PanelAccess, PanelProposalsReadModel, PanelsReadModule],
})
export class PanelsModule {}
