import { Module } from '@nestjs/common';
import { FacilitiesModule } from '../modules/facilities/facilities.module.js';
import { SemestersModule } from '../modules/semesters/semesters.module.js';
import { ProposalSkies } from './proposal-sky.service.js';

/** The one place between stored rows and the science libraries. */
@Module({
  imports: [FacilitiesModule, SemestersModule],
  providers: [ProposalSkies],
  exports: [ProposalSkies],
})
export class EngineModule {}
