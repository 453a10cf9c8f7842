import { Module } from '@nestjs/common';
import { SubmissionsReadModel } from './submissions.read-model.js';

/** The part of submissions that knows no other subject, so that committees and proposals can import it. */
@Module({ providers: [SubmissionsReadModel], exports: [SubmissionsReadModel] })
export class SubmissionsReadModule {}
