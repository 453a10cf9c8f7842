import { readConfig } from '../config/config.js';
import { openDatabase } from '../database/connection.js';
import { runCommand } from '../startup.js';

await runCommand(async () => {
  const database = await openDatabase(readConfig());
  await database.close();
  console.log('The database has the newest tables.');
});
