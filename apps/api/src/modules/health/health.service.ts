import { Injectable, Logger } from '@nestjs/common';
import { sql } from 'drizzle-orm';
import { DatabaseService } from '../../database/transaction.js';
import { databaseFailure } from '../../platform/database-errors.js';
import { DomainError } from '../../platform/domain-error.js';
import { JobsService } from '../../platform/jobs.js';
import { VERSION } from '../../version.js';

@Injectable()
export class HealthService {
  private readonly logger = new Logger('Health');

  constructor(
    private readonly database: DatabaseService,
    private readonly jobs: JobsService,
  ) {}

  /** @throws {DomainError} `unavailable` when the database does not answer or the jobs have not started */
  async checkReady() {
    try {
      await this.database.current().execute(sql`select 1`);
    } catch (error) {
      this.logger.error(`The database does not answer: ${databaseFailure(error)?.code ?? 'no connection'}`);
      throw new DomainError('unavailable', 'The database does not answer.', { retryAfterSeconds: 5 });
    }
    if (!this.jobs.isReady) throw new DomainError('unavailable', 'Still starting.', { retryAfterSeconds: 2 });
    return { state: 'ready' as const, version: VERSION, database: this.database.engine, jobs: 'running' as const };
  }
}
