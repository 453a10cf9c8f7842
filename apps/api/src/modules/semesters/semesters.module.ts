import { Module } from '@nestjs/common';
import { SemestersReadModel } from './semesters.read-model.js';

@Module({ providers: [SemestersReadModel], exports: [SemestersReadModel] })
export class SemestersModule {}
