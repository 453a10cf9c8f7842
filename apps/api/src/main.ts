import 'reflect-metadata';
import type { AddressInfo } from 'node:net';
import process from 'node:process';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { createApp } from './app.setup.js';
import { MEMORY_DATA_DIR, readConfig } from './config/config.js';
import { openDatabase } from './database/connection.js';
import { seedDemoIfWanted } from './demo-loader.js';
import { AccountsService } from './modules/accounts/accounts.service.js';
import { DemoMode } from './platform/demo-mode.js';
import { runCommand } from './startup.js';
import { VERSION } from './version.js';

await runCommand(async () => {
  const config = readConfig();
  const database = await openDatabase(config);
  const app = await createApp(config, database);
  endCleanly(app);
  if (await app.get(DemoMode).shouldSeed()) console.log('The database is empty: filling it with the demo scenario …');
  await seedDemoIfWanted(app);
  await app.listen(config.port, config.host);
  const { port } = app.getHttpServer().address() as AddressInfo;
  const address = config.port === 0 ? `http://${config.host}:${port}` : config.publicUrl;
  const where =
    config.databaseUrl !== undefined
      ? 'on a PostgreSQL server'
      : config.dataDir === MEMORY_DATA_DIR
        ? 'in memory'
        : `in ${config.dataDir}`;
  console.log(`Faintward ${VERSION} answers at ${address} (data ${where}).`);
  if (config.databaseUrl !== undefined && config.isSessionSecretKept) {
    console.log(
      'SESSION_SECRET is not set: this process uses a secret of its own data folder. Several processes need one in common.',
    );
  }
  await printDemoPeople(app);
});

async function printDemoPeople(app: NestExpressApplication): Promise<void> {
  if ((await app.get(DemoMode).findPassword()) === undefined) return;
  const { people, password } = await app.get(AccountsService).listDemoPeople();
  console.log(`\nDemo people, all with the password "${password}":`);
  const width = Math.max(...people.map(({ email }) => email.length));
  for (const { email, name, part } of people) console.log(`  ${email.padEnd(width)}  ${name}, ${part}`);
  console.log('');
}

/** Lets running requests and jobs finish, closes the database, and ends with 0; a second signal ends at once. */
function endCleanly(app: NestExpressApplication): void {
  let isEnding = false;
  const end = () => {
    if (isEnding) process.exit(1);
    isEnding = true;
    app.close().then(
      () => process.exit(0),
      (error: unknown) => {
        console.error(error instanceof Error ? error.message : error);
        process.exit(1);
      },
    );
  };
  process.on('SIGTERM', end);
  process.on('SIGINT', end);
}
