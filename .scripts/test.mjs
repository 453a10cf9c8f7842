// Runs every gate, goes on after a failed one, prints a table of all, and ends with the line "N passed, N failed".
// A gate without tests of its own (format, lint, types) counts as one. Names of gates as arguments run only those.
import { spawn } from 'node:child_process';
import { existsSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import process from 'node:process';
import { fileURLToPath } from 'node:url';
import { startPostgres } from './postgres-cluster.mjs';

process.chdir(path.resolve(path.dirname(fileURLToPath(import.meta.url)), '..'));

const tool = (name) => path.join('node_modules', '.bin', name);
const countsFolder = mkdtempSync(path.join(os.tmpdir(), 'faintward-counts-'));

const gates = [
  // These three read only and use one core each: they run side by side, and each tells what it said when it has ended.
  { name: 'format', command: [tool('prettier'), '--check', '--log-level', 'warn', '.'], isStatic: true },
  { name: 'lint', command: [tool('eslint'), '.'], isStatic: true },
  { name: 'types', command: ['node', '.scripts/typecheck.mjs'], isStatic: true },
  { name: 'libraries', command: [tool('vitest'), 'run', '--project', 'libs'], counts: true },
  { name: 'web', command: [tool('vitest'), 'run', '--project', 'web'], counts: true },
  { name: 'api', title: 'api, embedded database', command: [tool('vitest'), 'run', '--project', 'api'], counts: true },
  {
    name: 'api-server',
    title: 'api, PostgreSQL server',
    // What happens to the embedded database's folder does not change with a server beside it.
    command: [tool('vitest'), 'run', '--project', 'api', '--exclude', 'tests/faults/**'],
    counts: true,
    isOnServer: true,
    // Each of the two api gates uses one core.
    isBeside: 'api',
  },
  {
    name: 'journeys',
    title: 'journeys in Chromium',
    command: [tool('playwright'), 'test', '--config', 'tests/e2e/playwright.config.ts'],
    counts: true,
  },
];

const wanted = process.argv.slice(2);
const unknown = wanted.filter((name) => !gates.some((gate) => gate.name === name));
if (unknown.length > 0) {
  console.error(`There is no gate ${unknown.join(', ')}. Gates: ${gates.map(({ name }) => name).join(', ')}.`);
  process.exit(1);
}

// A server that is started here outlives an interrupted run unless it is told.
let stopCluster = () => {};
for (const signal of ['SIGINT', 'SIGTERM']) {
  process.on(signal, () => {
    stopCluster();
    rmSync(countsFolder, { recursive: true, force: true });
    process.exit(1);
  });
}

const asked = gates.filter(({ name }) => wanted.length === 0 || wanted.includes(name));
const results = await Promise.all(asked.filter(({ isStatic }) => isStatic).map(timed));
for (const gate of asked.filter(({ isStatic, isBeside }) => !isStatic && !isAsked(isBeside))) {
  const beside = asked.filter(({ isBeside }) => isBeside === gate.name);
  results.push(...(await Promise.all([gate, ...beside].map(timed))));
}
rmSync(countsFolder, { recursive: true, force: true });

const width = Math.max(...results.map(({ title }) => title.length));
console.log('\n');
for (const { title, passed, failed, skipped, seconds, note } of results) {
  const parts = [
    failed === 0 ? (note === undefined ? 'ok    ' : '-     ') : 'FAILED',
    title.padEnd(width),
    `${String(passed).padStart(6)} passed`,
    `${String(failed).padStart(4)} failed`,
    `${seconds.toFixed(0).padStart(5)} s`,
    ...(skipped > 0 ? [`${skipped} skipped`] : []),
    ...(note === undefined ? [] : [note]),
  ];
  console.log(parts.join('  '));
}
const total = (key) => results.reduce((sum, result) => sum + result[key], 0);
console.log(`\n${total('passed')} passed, ${total('failed')} failed`);
process.exit(total('failed') === 0 ? 0 : 1);

function isAsked(name) {
  return asked.some((gate) => gate.name === name);
}

/** What runs beside others keeps its words until it has ended. */
function isQuiet({ isStatic, isBeside }) {
  return isStatic || isAsked(isBeside);
}

async function timed(gate) {
  const title = gate.title ?? gate.name;
  if (!isQuiet(gate)) console.log(`\n== ${title}`);
  const startedAt = Date.now();
  const outcome = gate.isOnServer ? await runOnServer(gate) : await run(gate);
  return { title, seconds: (Date.now() - startedAt) / 1000, ...outcome };
}

async function runOnServer(gate) {
  let cluster;
  try {
    cluster = process.env.FAINTWARD_TEST_DATABASE_URL
      ? { url: process.env.FAINTWARD_TEST_DATABASE_URL, stop() {} }
      : await startPostgres();
  } catch (error) {
    console.error(error instanceof Error ? error.message : error);
    return { passed: 0, failed: 1, skipped: 0 };
  }
  if (cluster === undefined) {
    return {
      passed: 0,
      failed: 0,
      skipped: 0,
      note: 'not run: PostgreSQL (initdb, pg_ctl, postgres) is not installed',
    };
  }
  stopCluster = () => cluster.stop();
  try {
    return await run(gate, { FAINTWARD_TEST_DATABASE_URL: cluster.url });
  } finally {
    stopCluster = () => {};
    cluster.stop();
  }
}

async function run(gate, environment = {}) {
  const countsFile = path.join(countsFolder, `${gate.name}.json`);
  const [program, ...parameters] = gate.command;
  const said = [];
  const code = await new Promise((resolve) => {
    const child = spawn(program === 'node' ? process.execPath : program, parameters, {
      stdio: isQuiet(gate) ? ['ignore', 'pipe', 'pipe'] : 'inherit',
      shell: process.platform === 'win32',
      env: { ...process.env, ...environment, FAINTWARD_COUNTS: countsFile },
    });
    child.stdout?.on('data', (chunk) => said.push(chunk));
    child.stderr?.on('data', (chunk) => said.push(chunk));
    child.on('error', (error) => {
      console.error(error.message);
      resolve(1);
    });
    child.on('close', (status) => resolve(status ?? 1));
  });
  if (isQuiet(gate)) console.log(`\n== ${gate.title ?? gate.name}\n${Buffer.concat(said).toString().trimEnd()}`);
  if (!gate.counts) return { passed: code === 0 ? 1 : 0, failed: code === 0 ? 0 : 1, skipped: 0 };
  const counted = existsSync(countsFile)
    ? JSON.parse(readFileSync(countsFile, 'utf8'))
    : { passed: 0, failed: 0, skipped: 0 };
  // A skipped test is a promise nobody checks, and a runner that ends badly without a failed test has failed as a whole.
  const failed = counted.failed + counted.skipped;
  const nothingRan = counted.passed + failed === 0;
  return { ...counted, failed: failed > 0 ? failed : code !== 0 || nothingRan ? 1 : 0 };
}
