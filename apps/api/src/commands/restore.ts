import { existsSync, readdirSync, readFileSync, renameSync, rmSync } from 'node:fs';
import path from 'node:path';
import process from 'node:process';
import { PGlite } from '@electric-sql/pglite';
import { MEMORY_DATA_DIR, readConfig } from '../config/config.js';
import { embeddedExtensions, embeddedFolder, embeddedHandle } from '../database/connection.js';
import { lockDataFolder } from '../database/lock.js';
import { CommandRefused, runCommand } from '../startup.js';

/** `npm run restore -- file`: makes the embedded database from a backup. Refuses where a database exists. */
await runCommand(async () => {
  const config = readConfig();
  if (config.databaseUrl !== undefined) {
    throw new CommandRefused(
      'DATABASE_URL names a PostgreSQL server: restore it with its own tools, such as pg_restore.',
    );
  }
  if (config.dataDir === MEMORY_DATA_DIR) throw new CommandRefused('Name a data folder with DATA_DIR.');
  const file = process.argv[2];
  if (file === undefined || !existsSync(file))
    throw new CommandRefused('Name the backup: npm run restore -- faintward-….tar.gz');
  const folder = embeddedFolder(config.dataDir);
  const unlock = await lockDataFolder(config.dataDir);
  try {
    if (existsSync(folder) && readdirSync(folder).length > 0) {
      throw new CommandRefused(
        `${folder} holds a database already. Move it away first, or restore into another DATA_DIR.`,
      );
    }
    // Built beside its place and moved there whole, so that a bad archive leaves nothing that looks like a database.
    const building = path.join(config.dataDir, 'database.restoring');
    rmSync(building, { recursive: true, force: true });
    const client = await PGlite.create({
      dataDir: building,
      loadDataDir: new Blob([readFileSync(file)]),
      extensions: await embeddedExtensions(),
    }).catch((error: unknown) => {
      rmSync(building, { recursive: true, force: true });
      throw new CommandRefused(
        `${file} is not a backup that can be read (${error instanceof Error ? error.message : String(error)}).`,
      );
    });
    // Also brings an older backup to the newest tables.
    await (await embeddedHandle(client)).close();
    rmSync(folder, { recursive: true, force: true });
    renameSync(building, folder);
    console.log(`${folder} is restored from ${file}.`);
  } finally {
    await unlock();
  }
});
