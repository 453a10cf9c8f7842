/*
 * A list of 5,000 targets through the running server: preview, import with every computed column, a page of the grid, a
 * setup for all of them, and cell edits with their recomputed columns. Each stands beside the bare database work: the
 * same rows stored, or one row locked, rewritten and recorded, in the same embedded engine with nothing else around it.
 *
 *   npm run bench -- targets      (needs a build)
 */
import { PGlite } from '@electric-sql/pglite';
import { spawn } from 'node:child_process';
import { createServer } from 'node:net';
import { pathToFileURL } from 'node:url';

const COUNT = 5000;
const EDITS = 60;

export async function run() {
  const port = await freePort();
  const base = `http://127.0.0.1:${port}/api/v1`;
  const server = spawn(process.execPath, ['--enable-source-maps', 'apps/api/dist/main.js'], {
    env: { ...process.env, PORT: String(port), DATA_DIR: 'memory://', DEMO: 'on', RATE_LIMITS: 'off' },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  try {
    await untilReady(base, server);
    const call = await signIn(base);
    const { calls } = await call('GET', '/calls');
    const open = calls.find((one) => one.stage === 'open');
    const proposal = await call('POST', '/proposals', { semesterId: open.semesterId, title: 'Five thousand targets' });
    const path = `/proposals/${proposal.proposalId}`;

    const text = listOf(COUNT);
    const options = { brightnessBandId: 'i', brightnessSystem: 'AB' };
    const preview = await timed(() => call('POST', `${path}/targets/import-preview`, { text, options }));
    const imported = await timed(() =>
      call('POST', `${path}/targets/import`, { text, options }, { 'Idempotency-Key': crypto.randomUUID() }),
    );
    if (imported.result.importedCount !== COUNT)
      throw new Error(`Imported ${imported.result.importedCount} of ${COUNT}.`);

    const rows = [];
    let pageMs = 0;
    for (let page = 1; rows.length < COUNT; page++) {
      const answer = await timed(() => call('GET', `${path}/targets?page=${page}&pageSize=100`));
      pageMs = Math.max(pageMs, answer.ms);
      if (answer.result.rows.length === 0) throw new Error(`The list ended after ${rows.length} rows.`);
      rows.push(...answer.result.rows);
    }

    const { rows: telescopes } = await call('GET', '/telescopes');
    const modes = telescopes.flatMap((telescope) => telescope.instruments.flatMap((instrument) => instrument.modes));
    const mode =
      modes.find((one) => one.configuration.kind === 'imaging' && one.configuration.bandId === 'i') ?? modes[0];
    const applied = await timed(() =>
      call(
        'POST',
        `${path}/observations/apply`,
        {
          modeId: mode.modeId,
          goal: { kind: 'signalToNoise', value: 10, per: 'aperture' },
          conditions: { seeingArcsec: 0.8, airmass: 1.3, moonClass: 'dark', transparency: 'clear' },
          targetIds: 'all',
        },
        { 'Idempotency-Key': crypto.randomUUID() },
      ),
    );

    const edits = [];
    for (let i = 0; i < EDITS; i++) {
      const row = rows[Math.floor((i * COUNT) / EDITS)];
      const redshift = (row.redshift + 0.01).toFixed(4);
      const edit = await timed(() =>
        call('PATCH', `${path}/targets/${row.targetId}`, { cells: { redshift } }, { 'If-Match': `"${row.version}"` }),
      );
      if (Math.abs(edit.result.redshift - Number(redshift)) > 1e-12) throw new Error('The edit was not stored.');
      edits.push(edit.ms);
    }

    const bare = await bareWork(rows);
    const edit = quantiles(edits);
    const bareEdit = quantiles(bare.editsMs);
    print([
      ['preview of 5,000 rows', preview.ms, undefined],
      ['import of 5,000 rows, all columns computed', imported.ms, bare.insertMs],
      ['setup for all, 5,000 estimates stored', applied.ms, bare.insertMs],
      ['slowest page of 100 rows', pageMs, undefined],
      ['cell edit, median', edit.median, bareEdit.median],
      ['cell edit, 95 %', edit.p95, bareEdit.p95],
    ]);
  } finally {
    server.kill('SIGTERM');
  }
}

/** The same rows and the same kind of edit, on a database of the same engine with nothing else in it. */
async function bareWork(rows) {
  const db = await PGlite.create('memory://');
  await db.exec(`
    create table bare_targets (id uuid primary key, proposal_id uuid, position int, name text, ra float8, dec float8,
      redshift float8, light jsonb, extent jsonb, notes text, computed jsonb, version int);
    create index on bare_targets (proposal_id, position);
    create table bare_changes (id uuid primary key default gen_random_uuid(), at timestamptz default now(), target uuid, details jsonb);`);
  const json = JSON.stringify(
    rows.map((row) => ({
      id: row.targetId,
      position: row.position,
      name: row.name,
      ra: row.rightAscensionDeg,
      dec: row.declinationDeg,
      redshift: row.redshift,
      light: row.light,
      extent: row.extent,
      notes: row.notes,
      computed: row.computed,
      version: 1,
    })),
  );
  const insert = await timed(() =>
    db.query(
      `insert into bare_targets select * from jsonb_to_recordset($1::jsonb) as r(id uuid, proposal_id uuid, position int, name text,
        ra float8, dec float8, redshift float8, light jsonb, extent jsonb, notes text, computed jsonb, version int)`,
      [json],
    ),
  );
  const editsMs = [];
  for (let i = 0; i < EDITS; i++) {
    const row = rows[Math.floor((i * rows.length) / EDITS)];
    const edit = await timed(() =>
      db.transaction(async (tx) => {
        await tx.query('select * from bare_targets where id = $1 for update', [row.targetId]);
        await tx.query(
          'update bare_targets set redshift = redshift + 0.01, computed = $2, version = version + 1 where id = $1',
          [row.targetId, JSON.stringify(row.computed)],
        );
        await tx.query('insert into bare_changes (target, details) values ($1, $2)', [
          row.targetId,
          JSON.stringify({ redshift: row.redshift }),
        ]);
      }),
    );
    editsMs.push(edit.ms);
  }
  await db.close();
  return { insertMs: insert.ms, editsMs };
}

function listOf(count) {
  const lines = ['name,ra,dec,z,mag'];
  for (let i = 0; i < count; i++) {
    const place = (i * 0.6180339887498949) % 1;
    const other = (i * 0.7548776662466927) % 1;
    lines.push(
      `BENCH ${i},${(place * 360).toFixed(6)},${(-70 + other * 90).toFixed(6)},${(0.5 + 4 * other).toFixed(4)},${(21 + 4 * place).toFixed(2)}`,
    );
  }
  return lines.join('\n');
}

async function signIn(base) {
  const demo = await (await fetch(`${base}/demo-people`)).json();
  const person = demo.people.find((one) => one.part.startsWith('Principal')) ?? demo.people[0];
  const response = await fetch(`${base}/session`, {
    method: 'POST',
    headers: { 'Content-Type': 'application/json' },
    body: JSON.stringify({ email: person.email, password: demo.password }),
  });
  if (!response.ok) throw new Error(`Signing in answered ${response.status}.`);
  const cookie = response.headers
    .getSetCookie()
    .map((one) => one.split(';')[0])
    .join('; ');
  return async (method, path, body, headers = {}) => {
    const answer = await fetch(base + path, {
      method,
      headers: { Cookie: cookie, ...(body ? { 'Content-Type': 'application/json' } : {}), ...headers },
      ...(body ? { body: JSON.stringify(body) } : {}),
    });
    if (!answer.ok)
      throw new Error(`${method} ${path} answered ${answer.status}: ${(await answer.text()).slice(0, 400)}`);
    return answer.json();
  };
}

async function untilReady(base, server) {
  for (let i = 0; i < 240; i++) {
    if (server.exitCode !== null) throw new Error('The server ended before it was ready.');
    const answer = await fetch(`${base}/health/ready`).catch(() => undefined);
    if (answer?.ok) return;
    await new Promise((resolve) => setTimeout(resolve, 500));
  }
  throw new Error('The server was not ready after two minutes.');
}

function freePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

async function timed(work) {
  const start = performance.now();
  const result = await work();
  return { result, ms: performance.now() - start };
}

function quantiles(values) {
  const sorted = [...values].sort((one, other) => one - other);
  return { median: sorted[Math.floor(sorted.length / 2)], p95: sorted[Math.floor(sorted.length * 0.95)] };
}

function print(rows) {
  for (const [what, ms, bareMs] of rows) {
    const bare =
      bareMs === undefined
        ? ''
        : `   bare database work ${bareMs.toFixed(1).padStart(8)} ms   ratio ${(ms / bareMs).toFixed(1)}`;
    console.log(`${what.padEnd(46)} ${ms.toFixed(1).padStart(9)} ms${bare}`);
  }
}

if (import.meta.url === pathToFileURL(process.argv[1] ?? '').href) await run();
