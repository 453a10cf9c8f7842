import { Module } from '@nestjs/common';
import { ObservationsModule } from '../observations/observations.module.js';
import { ConflictsModule } from '../panels/conflicts.module.js';
import { PanelsReadModule } from '../panels/panels-read.module.js';
import { ProposalsModule } from '../proposals/proposals.module.js';
import { TargetsReadModule } from '../targets/targets-read.module.js';
import { TeamModule } from '../team/team.module.js';
import { SubmissionRows } from './submission-rows.service.js';
import { SubmissionsController } from './submissions.controller.js';
import { SubmissionsQueries } from './submissions.queries.js';
import { SubmissionsReadModule } from './submissions-read.module.js';
import { SubmissionsService } from './submissions.service.js';

@Module({
  imports: [
    ConflictsModule,
    ObservationsModule,
    PanelsReadModule,
    ProposalsModule,
    SubmissionsReadModule,
    TargetsReadModule,
    TeamModule,
  ],
  controllers: [SubmissionsController],
  providers: [SubmissionRows, SubmissionsQueries, SubmissionsService],
  exports: [SubmissionsReadModule],
})
export class SubmissionsModule {}
