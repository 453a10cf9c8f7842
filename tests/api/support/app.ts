import 'reflect-metadata';
import process from 'node:process';
import type { Type } from '@nestjs/common';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { sql } from 'drizzle-orm';
import request from 'supertest';
import { createApp } from '../../../apps/api/src/app.setup.js';
import { Config } from '../../../apps/api/src/config/config.js';
import { type Database, type DatabaseHandle, openDatabase } from '../../../apps/api/src/database/connection.js';
import { DatabaseService } from '../../../apps/api/src/database/transaction.js';
import { JobsService } from '../../../apps/api/src/platform/jobs.js';
import { openEmbeddedForTests } from '../../pg-embedded.js';

export type Agent = ReturnType<typeof request.agent>;

/** The whole application on a database of its own kind, empty at the start of each test file. */
export interface TestApp {
  readonly app: NestExpressApplication;
  readonly config: Config;
  readonly db: Database;
  readonly engine: 'embedded' | 'server';
  get<T>(provider: Type<T>): T;
  /** A client without cookies. */
  http(): ReturnType<typeof request>;
  /** A client that keeps cookies, as one browser does. */
  agent(): Agent;
  /** Runs the waiting jobs of a queue, and of those it fills when named after it. */
  work(...queues: string[]): Promise<void>;
  /** Empties every table. */
  empty(): Promise<void>;
  close(): Promise<void>;
}

/** With this set, the same tests run on a PostgreSQL server; the database it names is emptied. */
const serverUrl = process.env['FAINTWARD_TEST_DATABASE_URL'];

/** One database for all test files of this worker: opening one costs more than most files take. */
const shared = globalThis as unknown as { faintwardTestDatabase?: Promise<DatabaseHandle> };

export async function createTestApp(
  overrides: Partial<Config> = {},
  options: { webFolder?: string } = {},
): Promise<TestApp> {
  const config = new Config({
    host: '127.0.0.1',
    port: 0,
    dataDir: 'memory://',
    databaseUrl: serverUrl,
    databasePoolSize: 8,
    sessionSecret: 'a secret for the tests, and only for them',
    isSessionSecretKept: false,
    publicUrl: 'http://faintward.test',
    smtpUrl: undefined,
    mailFrom: 'Faintward <no-reply@faintward.test>',
    demo: 'auto',
    logFormat: 'text',
    isCookieSecure: false,
    areRateLimitsOn: false,
    trustedProxyCount: 0,
    areJobsPolled: false,
    ...overrides,
  });
  shared.faintwardTestDatabase ??= serverUrl === undefined ? openEmbeddedForTests() : openDatabase(config);
  const handle = await shared.faintwardTestDatabase;
  // Closing one file's application must leave the database open for the next file.
  const app = await createApp(config, { ...handle, close: async () => {} }, { logger: false, ...options });
  const emptyAll = () => emptyTables(handle);
  await emptyAll();
  return {
    app,
    config,
    db: app.get(DatabaseService).current(),
    engine: handle.engine,
    get: (provider) => app.get(provider, { strict: false }),
    http: () => request(app.getHttpServer()),
    agent: () => request.agent(app.getHttpServer()),
    work: async (...queues) => {
      for (const queue of queues) await app.get(JobsService).drain(queue);
    },
    empty: emptyAll,
    close: () => app.close(),
  };
}

async function emptyTables(handle: DatabaseHandle): Promise<void> {
  const { rows } = await handle.executeSql(
    "select quote_ident(schemaname) || '.' || quote_ident(tablename) as name from pg_tables where schemaname = 'public'",
  );
  const names = rows.map(({ name }) => String(name));
  await handle.db.execute(sql.raw(`truncate ${[...names, 'pgboss.job'].join(', ')} restart identity cascade`));
}
