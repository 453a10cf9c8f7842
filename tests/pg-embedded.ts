import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import process from 'node:process';
import { PGlite } from '@electric-sql/pglite';
import {
  type DatabaseHandle,
  embeddedExtensions,
  embeddedHandle,
  MIGRATIONS_FOLDER,
} from '../apps/api/src/database/connection.js';

const root = path.resolve(import.meta.dirname, '..');

/**
 * A migrated embedded database in memory. Creating one costs seconds, so a migrated copy is kept under
 * `node_modules/.cache`, named by a hash of the migrations and of the engine's version.
 */
export async function openEmbeddedForTests(): Promise<DatabaseHandle> {
  const file = templateFile();
  const extensions = await embeddedExtensions();
  if (existsSync(file)) {
    return embeddedHandle(await PGlite.create({ loadDataDir: new Blob([readFileSync(file)]), extensions }));
  }
  const client = await PGlite.create({ extensions });
  const handle = await embeddedHandle(client);
  const bytes = Buffer.from(await (await client.dumpDataDir('none')).arrayBuffer());
  mkdirSync(path.dirname(file), { recursive: true });
  // Renamed when complete: two runners may build it at the same time.
  const part = `${file}.${process.pid}.part`;
  writeFileSync(part, bytes);
  renameSync(part, file);
  return handle;
}

function templateFile(): string {
  const hash = createHash('sha256');
  for (const name of readdirSync(MIGRATIONS_FOLDER).sort()) {
    if (name.endsWith('.sql')) hash.update(name).update(readFileSync(path.join(MIGRATIONS_FOLDER, name)));
  }
  const engine = JSON.parse(
    readFileSync(path.join(root, 'node_modules/@electric-sql/pglite/package.json'), 'utf8'),
  ) as { version: string };
  hash.update(engine.version);
  return path.join(root, 'node_modules/.cache/faintward', `database-${hash.digest('hex').slice(0, 16)}.tar`);
}
