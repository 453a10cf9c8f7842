import { Module } from '@nestjs/common';
import { ConflictsModule } from '../panels/conflicts.module.js';
import { ProposalsReadModule } from '../proposals/proposals-read.module.js';
import { TeamController } from './team.controller.js';
import { TeamQueries } from './team.queries.js';
import { TeamReadModel } from './team.read-model.js';
import { TeamService } from './team.service.js';

@Module({
  imports: [ConflictsModule, ProposalsReadModule],
  controllers: [TeamController],
  providers: [TeamQueries, TeamReadModel, TeamService],
  exports: [TeamReadModel],
})
export class TeamModule {}
