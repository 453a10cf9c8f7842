// Type-checks every workspace and the root's own files, two at a time; prints each failing project and ends with 1 if any failed.
import { spawn } from 'node:child_process';
import { readdirSync } from 'node:fs';
import process from 'node:process';

// The largest first, so that none of them is left alone at the end.
const projects = ['apps/web', 'apps/api', '.', ...readdirSync('libs').map((name) => `libs/${name}`)];
const waiting = [...projects];
const failed = [];

async function work() {
  for (let project = waiting.shift(); project !== undefined; project = waiting.shift()) {
    const { code, output } = await check(project);
    if (code === 0) continue;
    failed.push(project);
    process.stdout.write(output);
  }
}

function check(project) {
  return new Promise((resolve) => {
    const child = spawn(process.execPath, ['node_modules/typescript/bin/tsc', '-p', project]);
    let output = '';
    for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk) => (output += chunk));
    child.on('error', (error) => resolve({ code: 1, output: `${error.message}\n` }));
    child.on('close', (code) => resolve({ code, output }));
  });
}

await Promise.all([work(), work()]);
if (failed.length > 0) {
  console.error(`Types do not hold in: ${failed.join(', ')}`);
  process.exit(1);
}
