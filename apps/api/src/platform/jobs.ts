import {
  type BeforeApplicationShutdown,
  Inject,
  Injectable,
  Logger,
  type OnApplicationBootstrap,
} from '@nestjs/common';
import { sql } from 'drizzle-orm';
import PgBoss from 'pg-boss';
import { Config } from '../config/config.js';
import type { Database, DatabaseHandle } from '../database/connection.js';
import { DATABASE_HANDLE, DatabaseService } from '../database/transaction.js';
import { databaseFailure } from './database-errors.js';

export interface JobQueue<Data extends object> {
  /** Kebab-case; stays the same for ever, because stored jobs name it. */
  name: string;
  /** Must bear running twice: a job whose process died is run again once it expires. */
  handle(data: Data): Promise<void>;
  retryLimit?: number;
  retryDelaySeconds?: number;
  /** After this long a job counts as lost and is run again. */
  expireInSeconds?: number;
  /** Runs the job by the clock as well, once for all processes: five cron fields, UTC. */
  cron?: string;
}

/**
 * Durable jobs in the database itself. `enqueue` inside a transaction stores the job with it or not at all.
 * A module registers its queues in its constructor or `onModuleInit`.
 */
@Injectable()
export class JobsService implements OnApplicationBootstrap, BeforeApplicationShutdown {
  private readonly logger = new Logger('Jobs');
  private readonly queues = new Map<string, JobQueue<object>>();
  private readonly workers = new Map<string, string>();
  private readonly boss: PgBoss;
  private isStarted = false;

  constructor(
    @Inject(DATABASE_HANDLE) handle: DatabaseHandle,
    private readonly config: Config,
    private readonly database: DatabaseService,
  ) {
    this.boss = new PgBoss({
      db: { executeSql: (text, values) => handle.executeSql(text, values as unknown[]) },
      supervise: config.areJobsPolled,
      schedule: config.areJobsPolled,
    });
    this.boss.on('error', (error) => this.logger.error(`Queue upkeep failed: ${safeMessage(error)}`));
  }

  register<Data extends object>(queue: JobQueue<Data>): void {
    if (this.isStarted) throw new Error(`Queue ${queue.name} is registered after the start.`);
    if (this.queues.has(queue.name)) throw new Error(`Queue ${queue.name} is registered twice.`);
    this.queues.set(queue.name, queue as unknown as JobQueue<object>);
  }

  get isReady(): boolean {
    return this.isStarted;
  }

  async onApplicationBootstrap(): Promise<void> {
    await this.boss.start();
    for (const queue of this.queues.values()) {
      const options = {
        name: queue.name,
        retryLimit: queue.retryLimit ?? 5,
        retryDelay: queue.retryDelaySeconds ?? 10,
        retryBackoff: true,
        expireInSeconds: queue.expireInSeconds ?? 120,
      };
      await this.boss.createQueue(queue.name, options);
      if (!this.config.areJobsPolled) continue;
      if (queue.cron !== undefined) await this.boss.schedule(queue.name, queue.cron);
      const worker = await this.boss.work<object>(
        queue.name,
        { batchSize: 1, pollingIntervalSeconds: 2 },
        async (jobs) => {
          for (const job of jobs) await this.handleLogged(queue, job.data ?? {});
        },
      );
      this.workers.set(queue.name, worker);
    }
    this.isStarted = true;
  }

  /** Stores a job, inside the transaction of the caller where there is one. */
  async enqueue(
    queueName: string,
    data: object,
    options: { startAfter?: Date; singletonKey?: string } = {},
  ): Promise<void> {
    if (!this.queues.has(queueName)) throw new Error(`There is no queue ${queueName}.`);
    await this.boss.send(queueName, data, { ...options, db: executorOf(this.database.current()) });
    const worker = this.workers.get(queueName);
    if (worker !== undefined) await this.database.afterCommit(() => this.boss.notifyWorker(worker));
  }

  /** Works a queue until it is empty and returns the number of jobs done. For tests, which do not poll. */
  async drain(queueName: string): Promise<number> {
    const queue = this.queues.get(queueName);
    if (queue === undefined) throw new Error(`There is no queue ${queueName}.`);
    let count = 0;
    for (;;) {
      const [job] = await this.boss.fetch<object>(queueName, { batchSize: 1, ignoreStartAfter: true });
      if (job === undefined) return count;
      count += 1;
      try {
        await queue.handle(job.data);
        await this.boss.complete(queueName, job.id);
      } catch (error) {
        await this.boss.fail(queueName, job.id, { message: safeMessage(error) });
      }
    }
  }

  async beforeApplicationShutdown(): Promise<void> {
    if (!this.isStarted) return;
    await this.boss.stop({ graceful: this.config.areJobsPolled, timeout: 5000, close: false });
  }

  private async handleLogged(queue: JobQueue<object>, data: object): Promise<void> {
    const failure = await queue.handle(data).then(() => undefined, safeMessage);
    if (failure === undefined) return;
    this.logger.warn(`${queue.name} failed and will be tried again: ${failure}`);
    // What is thrown is stored with the job: a new error, because the first may hold a query's parameters.
    throw new Error(failure);
  }
}

/** pg-boss's view of a drizzle connection or transaction: its `$1` placeholders become drizzle parameters. */
function executorOf(db: Database): PgBoss.Db {
  return {
    executeSql: async (text, values = []) => {
      const parts = text
        .split(/(\$\d+)/)
        .map((part) => (/^\$\d+$/.test(part) ? sql`${sql.param(values[Number(part.slice(1)) - 1])}` : sql.raw(part)));
      return (await db.execute(sql.join(parts, sql.raw('')))) as unknown as { rows: unknown[] };
    },
  };
}

function safeMessage(error: unknown): string {
  const failure = databaseFailure(error);
  if (failure !== undefined) return `database error ${failure.code}`;
  return error instanceof Error ? error.message : String(error);
}
