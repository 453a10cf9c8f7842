import { Module } from '@nestjs/common';
import { TargetsReadModel } from './targets.read-model.js';

/** The reading part of targets, which observations build on while targets build on observations. */
@Module({ providers: [TargetsReadModel], exports: [TargetsReadModel] })
export class TargetsReadModule {}
