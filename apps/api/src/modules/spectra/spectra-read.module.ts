import { Module } from '@nestjs/common';
import { SpectraReadModel } from './spectra.read-model.js';

/** The reading part of spectra, which knows no other subject, so that targets and light can build on it. */
@Module({ providers: [SpectraReadModel], exports: [SpectraReadModel] })
export class SpectraReadModule {}
