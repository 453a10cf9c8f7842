import type { INestApplicationContext } from '@nestjs/common';
import { DatabaseService } from '../database/transaction.js';
import { PasswordHasher } from '../modules/accounts/passwords.js';
import { DemoMode } from '../platform/demo-mode.js';
import { readDemoData } from './demo-data.js';
import { DemoWriter } from './demo-writer.js';
import { buildScenario } from './scenario.js';

/** The password of everybody in the demo. */
export const DEMO_PASSWORD = 'faintward-demo-night';

/**
 * Fills an empty database with the demo scenario, as seen from `now`: invented people, proposals and targets, with numbers
 * that the engine computes here and now. All or nothing: one transaction.
 */
export async function seedDemo(app: INestApplicationContext, now: Date = new Date()): Promise<void> {
  const data = await readDemoData();
  const scenario = buildScenario(data, now);
  const passwordHash = await app.get(PasswordHasher, { strict: false }).hash(DEMO_PASSWORD);
  await app.get(DatabaseService, { strict: false }).transaction(async () => {
    const writer = new DemoWriter(app, data, scenario, now);
    await writer.writeObservatory(passwordHash);
    await writer.writeProposals();
    await writer.writeCommittees();
    await app.get(DemoMode, { strict: false }).enable(DEMO_PASSWORD);
  });
}
