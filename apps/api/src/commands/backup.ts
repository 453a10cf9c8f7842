import { existsSync, mkdirSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import process from 'node:process';
import { MEMORY_DATA_DIR, readConfig } from '../config/config.js';
import { embeddedFolder, openDatabase } from '../database/connection.js';
import { CommandRefused, runCommand } from '../startup.js';

/** `npm run backup [-- file]`: writes the embedded database to one compressed archive. The application must be stopped. */
await runCommand(async () => {
  const config = readConfig();
  if (config.databaseUrl !== undefined) {
    throw new CommandRefused('DATABASE_URL names a PostgreSQL server: back it up with its own tools, such as pg_dump.');
  }
  if (config.dataDir === MEMORY_DATA_DIR || !existsSync(embeddedFolder(config.dataDir))) {
    throw new CommandRefused(`There is no database in ${config.dataDir} to back up.`);
  }
  const stamp = new Date().toISOString().slice(0, 19).replaceAll(/[-:]/g, '').replace('T', '-');
  const file = path.resolve(process.argv[2] ?? path.join(config.dataDir, 'backups', `faintward-${stamp}.tar.gz`));
  if (existsSync(file)) throw new CommandRefused(`${file} exists already; name another file.`);
  const database = await openDatabase(config);
  try {
    if (database.dump === undefined) throw new Error('The embedded database cannot be dumped.');
    const bytes = Buffer.from(await (await database.dump()).arrayBuffer());
    mkdirSync(path.dirname(file), { recursive: true });
    // Under its name only when it is whole: half an archive must never look like a backup.
    writeFileSync(`${file}.part`, bytes, { flush: true, mode: 0o600 });
    renameSync(`${file}.part`, file);
    console.log(
      `${(bytes.length / 1024 / 1024).toFixed(1)} MB in ${file}. Keep it elsewhere: it holds password hashes and all proposals.`,
    );
  } finally {
    await database.close();
  }
});
