import 'reflect-metadata';
import type { Server } from 'node:http';
import net, { type AddressInfo } from 'node:net';
import process from 'node:process';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { MEMORY_DATA_DIR, readConfig } from './config/config.js';
import { openDatabase } from './database/connection.js';
import { finishRequests } from './platform/finish-requests.js';
import { runCommand } from './startup.js';
import { VERSION } from './version.js';

/** Longer than any answer takes; a request that is still coming in after it is cut off. */
const PATIENCE_MS = 10_000;

await runCommand(async () => {
  const config = readConfig();
  await assertPortIsFree(config.port, config.host);
  const database = await openDatabase(config);
  // Loaded only now: what makes a start impossible shows in a moment.
  const [{ createApp }, { seedDemoIfWanted }, { DemoMode }] = await Promise.all([
    import('./app.setup.js'),
    import('./demo-loader.js'),
    import('./platform/demo-mode.js'),
  ]);
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

/** Asked before anything else, because an empty database takes a while to fill. */
async function assertPortIsFree(port: number, host: string): Promise<void> {
  const server = net.createServer();
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, host, () => server.close(() => resolve()));
  });
}

async function printDemoPeople(app: NestExpressApplication): Promise<void> {
  const [{ AccountsService }, { DemoMode }] = await Promise.all([
    import('./modules/accounts/accounts.service.js'),
    import('./platform/demo-mode.js'),
  ]);
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
    const closing = finishRequests(app.getHttpServer() as Server, PATIENCE_MS).then(() => app.close());
    closing.then(
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
