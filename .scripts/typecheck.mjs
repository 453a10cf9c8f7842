// Type-checks every workspace and the root's own files; prints each failing project and ends with 1 if any failed.
import { spawnSync } from 'node:child_process';
import { readdirSync } from 'node:fs';
import process from 'node:process';

const projects = [...readdirSync('libs').map((name) => `libs/${name}`), 'apps/api', 'apps/web', '.'];
const failed = projects.filter(
  (project) => spawnSync('npx', ['tsc', '-p', project], { stdio: 'inherit' }).status !== 0,
);
if (failed.length > 0) {
  console.error(`Types do not hold in: ${failed.join(', ')}`);
  process.exit(1);
}
