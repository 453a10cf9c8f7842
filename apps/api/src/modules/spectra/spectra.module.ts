import { Module } from '@nestjs/common';
import { ProposalsReadModule } from '../proposals/proposals-read.module.js';
import { SpectraReadModule } from './spectra-read.module.js';
import { SpectraController } from './spectra.controller.js';
import { SpectraQueries } from './spectra.queries.js';
import { SpectraService } from './spectra.service.js';

@Module({
  imports: [ProposalsReadModule, SpectraReadModule],
  controllers: [SpectraController],
  providers: [SpectraQueries, SpectraService],
  exports: [SpectraReadModule],
})
export class SpectraModule {}
