import { Id } from '@faintward/contracts/common';
import { NewSpectrum, StoredSpectrum, StoredSpectrumList } from '@faintward/contracts/light-report';
import { Body, Controller, Delete, Get, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers, AnswersNothing } from '../../platform/answers.js';
import { BodyLimit } from '../../platform/http.js';
import { SpectraService } from './spectra.service.js';

/** Megabytes of a request that carries a spectrum: five million characters and what JSON adds to them. */
const SPECTRUM_MEGABYTES = 8;

@ApiTags('spectra')
@Controller('proposals/:proposalId/spectra')
export class SpectraController {
  constructor(private readonly spectra: SpectraService) {}

  @Get()
  @Requires('proposal.read')
  @Answers(StoredSpectrumList)
  list(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<z.infer<typeof StoredSpectrumList>> {
    return this.spectra.list(actor, proposalId);
  }

  @Post()
  @Requires('proposal.edit-targets')
  @BodyLimit(SPECTRUM_MEGABYTES)
  @Answers(StoredSpectrum, { status: 201 })
  create(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: NewSpectrum }) input: NewSpectrum,
  ): Promise<StoredSpectrum> {
    return this.spectra.create(actor, proposalId, input);
  }

  @Delete(':spectrumId')
  @Requires('proposal.edit-targets')
  @AnswersNothing()
  remove(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('spectrumId', { schema: Id }) spectrumId: string,
  ): Promise<void> {
    return this.spectra.remove(actor, proposalId, spectrumId);
  }
}
