import { Module } from '@nestjs/common';
import { FacilitiesModule } from '../modules/facilities/facilities.module.js';
import { SemestersModule } from '../modules/semesters/semesters.module.js';
import { SpectraReadModule } from '../modules/spectra/spectra-read.module.js';
import { ProposalSpectra } from './proposal-spectra.service.js';
import { ProposalSkies } from './proposal-sky.service.js';

/** The one place between stored rows and the science libraries. */
@Module({
  imports: [FacilitiesModule, SemestersModule, SpectraReadModule],
  providers: [ProposalSkies, ProposalSpectra],
  exports: [ProposalSkies, ProposalSpectra],
})
export class EngineModule {}
