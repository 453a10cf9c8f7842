import 'reflect-metadata';
import { createApp } from '../app.setup.js';
import { Config, readConfig } from '../config/config.js';
import { openDatabase } from '../database/connection.js';
import { seedDemoIfWanted } from '../demo-loader.js';
import { CommandRefused, runCommand } from '../startup.js';

await runCommand(async () => {
  // Asking for the seed is wanting the demo, on either database.
  const config = new Config({ ...readConfig(), demo: 'on', areJobsPolled: false });
  const app = await createApp(config, await openDatabase(config));
  try {
    if (!(await seedDemoIfWanted(app)))
      throw new CommandRefused('Nothing was changed: there are people in this database already.');
    console.log('The demo scenario is in the database.');
  } finally {
    await app.close();
  }
});
