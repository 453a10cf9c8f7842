import { Module } from '@nestjs/common';
import { ConflictsModule } from '../panels/conflicts.module.js';
import { PanelsReadModule } from '../panels/panels-read.module.js';
import { PeopleModule } from '../people/people.module.js';
import { SemestersModule } from '../semesters/semesters.module.js';
import { SubmissionsReadModule } from '../submissions/submissions-read.module.js';
import { TargetsModule } from '../targets/targets.module.js';
import { CaseService } from './case.service.js';
import { ProposalsController } from './proposals.controller.js';
import { ProposalsQueries } from './proposals.queries.js';
import { ProposalsReadModel } from './proposals.read-model.js';
import { ProposalsReadModule } from './proposals-read.module.js';
import { ProposalsService } from './proposals.service.js';

@Module({
  imports: [
    ConflictsModule,
    PanelsReadModule,
    PeopleModule,
    ProposalsReadModule,
    SemestersModule,
    SubmissionsReadModule,
    TargetsModule,
  ],
  controllers: [ProposalsController],
  providers: [CaseService, ProposalsQueries, ProposalsReadModel, ProposalsService],
  exports: [CaseService, ProposalsReadModule, ProposalsService],
})
export class ProposalsModule {}
