import { existsSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import type { INestApplicationContext } from '@nestjs/common';
import { DemoMode } from './platform/demo-mode.js';

/** Fills an empty database with the demo scenario where that is wanted; says whether it did. */
export async function seedDemoIfWanted(app: INestApplicationContext): Promise<boolean> {
  if (!(await app.get(DemoMode).shouldSeed())) return false;
  const entry = new URL('./demo/index.js', import.meta.url);
  if (!existsSync(fileURLToPath(entry))) return false;
  // Loaded only when it is needed: an observatory's own installation never reads it.
  const { seedDemo } = (await import(entry.href)) as { seedDemo: (app: INestApplicationContext) => Promise<void> };
  await seedDemo(app);
  return true;
}
