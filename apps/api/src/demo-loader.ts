import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { INestApplicationContext } from '@nestjs/common';
import { sql } from 'drizzle-orm';
import { DatabaseService } from './database/transaction.js';
import { DemoMode } from './platform/demo-mode.js';

/** Any number that no other program on the same server is likely to lock. */
const SEED_LOCK = 727_002;

/** Fills an empty database with the demo scenario where that is wanted; says whether it did. */
export async function seedDemoIfWanted(app: INestApplicationContext): Promise<boolean> {
  if (!(await app.get(DemoMode).shouldSeed())) return false;
  const entry = new URL('./demo/index.js', import.meta.url);
  if (!existsSync(fileURLToPath(entry))) return false;
  // Loaded only when it is needed: an observatory's own installation never reads it.
  const { seedDemo } = (await import(entry.href)) as { seedDemo: (app: INestApplicationContext) => Promise<void> };
  const database = app.get(DatabaseService);
  return database.transaction(async () => {
    // Of several processes that start on one empty server, the others wait here and find the database filled.
    await database.current().execute(sql`select pg_advisory_xact_lock(${SEED_LOCK})`);
    if (!(await app.get(DemoMode).shouldSeed())) return false;
    await seedDemo(app);
    return true;
  });
}
