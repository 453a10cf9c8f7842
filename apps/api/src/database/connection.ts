import path from 'node:path';
import type { PGlite } from '@electric-sql/pglite';
import type { PgDatabase, PgQueryResultHKT } from 'drizzle-orm/pg-core';
import { type Config, MEMORY_DATA_DIR } from '../config/config.js';
import { lockDataFolder } from './lock.js';
import * as schema from './schema/index.js';

/** Either database, or a transaction on it: the one type that queries are written against. */
export type Database = PgDatabase<PgQueryResultHKT, typeof schema>;

export type Engine = 'embedded' | 'server';

/** An open, migrated database. */
export interface DatabaseHandle {
  readonly db: Database;
  readonly engine: Engine;
  /** Runs SQL outside any transaction of the application; several statements at once are allowed without parameters. */
  executeSql(text: string, values?: unknown[]): Promise<{ rows: Record<string, unknown>[] }>;
  /** A copy of the embedded database as a gzipped tar; undefined on a server, where the server's own tools do it. */
  dump?(): Promise<Blob>;
  close(): Promise<void>;
}

/** The files of the embedded database cannot be opened by this engine. */
export class DatabaseUnreadable extends Error {
  override readonly name = 'DatabaseUnreadable';
  constructor(folder: string, cause: unknown) {
    super(
      `The database in ${folder} cannot be opened: it is damaged, or another version of the engine made it. Keep the ` +
        'folder, and restore the newest backup into another one: DATA_DIR=… npm run restore -- faintward-….tar.gz',
      { cause },
    );
  }
}

/** Generated migrations, beside the workspaces; the same relative path from sources and from the build. */
export const MIGRATIONS_FOLDER = path.resolve(import.meta.dirname, '../../../../drizzle');

/** Any number that no other program on the same server is likely to lock. */
const MIGRATION_LOCK = 727_001;

/** Extensions have to be handed over whenever the embedded database is opened, not only when they are created. */
export async function embeddedExtensions() {
  const [{ pg_trgm }, { btree_gist }, { unaccent }, { citext }] = await Promise.all([
    import('@electric-sql/pglite/contrib/pg_trgm'),
    import('@electric-sql/pglite/contrib/btree_gist'),
    import('@electric-sql/pglite/contrib/unaccent'),
    import('@electric-sql/pglite/contrib/citext'),
  ]);
  return { pg_trgm, btree_gist, unaccent, citext };
}

/** Folder of the embedded database inside the data folder. */
export function embeddedFolder(dataDir: string): string {
  return path.join(dataDir, 'database');
}

/**
 * Opens the database that the configuration names and brings it to the newest migration.
 *
 * @throws {DataFolderInUse} when another process holds the data folder
 */
export async function openDatabase(config: Config): Promise<DatabaseHandle> {
  return config.databaseUrl === undefined
    ? openEmbedded(config.dataDir)
    : openServer(config.databaseUrl, config.databasePoolSize);
}

async function openEmbedded(dataDir: string): Promise<DatabaseHandle> {
  const { PGlite } = await import('@electric-sql/pglite');
  const extensions = await embeddedExtensions();
  if (dataDir === MEMORY_DATA_DIR) return embeddedHandle(await PGlite.create({ extensions }));
  const unlock = await lockDataFolder(dataDir);
  try {
    const folder = embeddedFolder(dataDir);
    const client = await PGlite.create({ dataDir: folder, extensions }).catch((error: unknown) => {
      // A full disk or a folder of somebody else says so itself.
      throw isFileError(error) ? error : new DatabaseUnreadable(folder, error);
    });
    return await embeddedHandle(client, unlock);
  } catch (error) {
    await unlock();
    throw error;
  }
}

function isFileError(error: unknown): boolean {
  return error instanceof Error && typeof (error as NodeJS.ErrnoException).syscall === 'string';
}

/** Wraps an open PGlite, for instance one that a test restored from a template. */
export async function embeddedHandle(client: PGlite, unlock = async () => {}): Promise<DatabaseHandle> {
  const { drizzle } = await import('drizzle-orm/pglite');
  const { migrate } = await import('drizzle-orm/pglite/migrator');
  const db = drizzle(client, { schema });
  await migrate(db, { migrationsFolder: MIGRATIONS_FOLDER });
  return {
    db: db as unknown as Database,
    engine: 'embedded',
    executeSql: async (text, values = []) => {
      if (values.length > 0) return client.query<Record<string, unknown>>(text, values);
      const results = await client.exec(text);
      return { rows: (results.at(-1)?.rows ?? []) as Record<string, unknown>[] };
    },
    dump: () => client.dumpDataDir('gzip'),
    close: async () => {
      await client.close();
      await unlock();
    },
  };
}

async function openServer(connectionString: string, poolSize: number): Promise<DatabaseHandle> {
  const { default: pg } = await import('pg');
  const { drizzle } = await import('drizzle-orm/node-postgres');
  const { migrate } = await import('drizzle-orm/node-postgres/migrator');
  const pool = new pg.Pool({
    connectionString,
    max: poolSize,
    // Waiting for ever would pile up requests while the server is away or all connections are busy.
    connectionTimeoutMillis: 10_000,
    keepAlive: true,
    application_name: 'faintward',
    // The locks of a process that stands still must not hold up the others for ever.
    idle_in_transaction_session_timeout: 60_000,
  });
  // An idle connection that the server drops must not end the process; the pool opens another.
  pool.on('error', () => undefined);
  const db = drizzle(pool, { schema });
  // The migrator itself takes no lock: several processes that start together would each create the same tables.
  try {
    const client = await pool.connect();
    try {
      await client.query('select pg_advisory_lock($1)', [MIGRATION_LOCK]);
      await migrate(db, { migrationsFolder: MIGRATIONS_FOLDER });
    } finally {
      // The lock ends with its connection, in whatever state that is.
      client.release(true);
    }
  } catch (error) {
    await pool.end();
    throw error;
  }
  return {
    db: db as unknown as Database,
    engine: 'server',
    executeSql: async (text, values = []) => {
      const result: unknown = await pool.query(text, values);
      const last = (Array.isArray(result) ? result.at(-1) : result) as { rows: Record<string, unknown>[] };
      return { rows: last.rows };
    },
    close: () => pool.end(),
  };
}
