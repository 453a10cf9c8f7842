import { Module } from '@nestjs/common';
import { ConflictsQueries } from './conflicts.queries.js';
import { ConflictsService } from './conflicts.service.js';

/** Conflicts know nothing of submissions and reviews, so that the subjects panels build on can have them found. */
@Module({ providers: [ConflictsQueries, ConflictsService], exports: [ConflictsQueries, ConflictsService] })
export class ConflictsModule {}
