import { spawn, spawnSync } from 'node:child_process';
import { existsSync, statSync } from 'node:fs';
import { createServer } from 'node:net';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const repositoryRoot = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../../..');
const serverFile = path.join(repositoryRoot, 'apps/api/dist/main.js');
const pageFile = path.join(repositoryRoot, 'apps/web/dist/index.html');

/** Addresses of demo people, by what they are needed for. Their password is what `GET /demo-people` answers. */
export const demoPeople = {
  investigator: 'marisol.quintrel@valdeluna.example',
  largeList: 'adaeze.okonlind@saltmarsh.example',
  reviewer: 'benoit.carraz@val-brevan.example',
  chair: 'leonor.abrantes@serraclara.example',
  staff: 'joaquin.pailahual@cerrolumbre.example',
  administrator: 'greta.olufsborg@cerrolumbre.example',
};

/**
 * The demo at an address: `BASE` when it is set, else a server of its own on a free port with a database in memory, built
 * first when nothing has been built (`--build` builds in any case).
 * @returns {Promise<{ base: string; stop: () => Promise<void> }>}
 */
export async function openDemo() {
  if (process.env.BASE) return { base: process.env.BASE, stop: async () => undefined };
  if (process.argv.includes('--build') || !existsSync(serverFile) || !existsSync(pageFile)) {
    run('npx', ['tsc', '-b', 'tsconfig.build.json']);
    run('npx', ['vite', 'build', 'apps/web', '--logLevel', 'warn']);
  } else console.log(`Using the build of ${statSync(pageFile).mtime.toISOString()}; --build makes a new one.`);
  const port = await freePort();
  const server = spawn(process.execPath, ['--enable-source-maps', serverFile], {
    cwd: repositoryRoot,
    env: { ...process.env, PORT: String(port), DATA_DIR: 'memory://', DEMO: 'on', RATE_LIMITS: 'off' },
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  const ended = new Promise((resolve) => server.once('exit', resolve));
  const stop = async () => {
    server.kill('SIGTERM');
    await ended;
  };
  const base = `http://127.0.0.1:${port}`;
  try {
    await answering(`${base}/api/v1/demo-people`, server, 240_000);
  } catch (error) {
    await stop();
    throw error;
  }
  return { base, stop };
}

/** Signs a demo person in within a browser context. Undefined leaves it to nobody. */
export async function signIn(context, base, email) {
  if (!email) return;
  const people = await (await context.request.get(`${base}/api/v1/demo-people`)).json();
  const answer = await context.request.post(`${base}/api/v1/session`, { data: { email, password: people.password } });
  if (!answer.ok()) throw new Error(`${email} could not sign in: ${await answer.text()}`);
}

/** A context with a theme chosen beforehand: `paper`, `slate` or `dome`. */
export async function openContext(browser, { theme, width, height = 900 }) {
  const context = await browser.newContext({
    viewport: { width, height },
    colorScheme: theme === 'paper' ? 'light' : 'dark',
    reducedMotion: 'reduce',
  });
  await context.addInitScript((chosen) => {
    globalThis.localStorage.setItem('faintward-mode', chosen === 'paper' ? 'light' : 'dark');
    globalThis.localStorage.setItem('faintward-scheme-dark', chosen === 'dome' ? 'dome' : 'dark');
  }, theme);
  return context;
}

/** Opens an address and waits until nothing loads any more. */
export async function openPage(page, address) {
  await page.goto(address, { waitUntil: 'networkidle', timeout: 60_000 });
  await page.waitForFunction(
    () =>
      !globalThis.document.querySelector('main [aria-busy=true], main .MuiSkeleton-root') &&
      !/^(One moment)?$/.test(globalThis.document.querySelector('h1')?.textContent ?? '') &&
      globalThis.document.fonts.status === 'loaded',
    undefined,
    { timeout: 60_000 },
  );
  await page.waitForTimeout(500);
}

/** Paths of the application's screens, found with the requests of the person who opens them. */
export const screenPaths = {
  async proposal(request, base, section, state = 'draft') {
    const list = await (await request.get(`${base}/api/v1/proposals?pageSize=50`)).json();
    const row = list.rows.find((one) => one.state === state) ?? list.rows[0];
    return `/proposals/${row.proposalId}/${section}`;
  },
  /** The sheet of the first target with a brightness. */
  async target(request, base) {
    const targets = await screenPaths.proposal(request, base, 'targets');
    const list = await (await request.get(`${base}/api/v1${targets}?pageSize=50`)).json();
    const row = list.rows.find((one) => one.light?.kind === 'apparentMagnitude') ?? list.rows[0];
    return `${targets}/${row.targetId}`;
  },
  async review(request, base) {
    const list = await (await request.get(`${base}/api/v1/reading-list`)).json();
    return `/reviews/${(list.rows.find((row) => row.state === 'begun') ?? list.rows[0]).proposalId}`;
  },
  /** The panel that is being ranked: of the semester in review. */
  async panel(request, base, rest = '') {
    const [me, semesters] = await Promise.all(
      ['session', 'semesters'].map(async (name) => (await request.get(`${base}/api/v1/${name}`)).json()),
    );
    const inReview = new Set(semesters.rows.filter((row) => row.stage === 'reviewing').map((row) => row.semesterId));
    const chaired = me.panels.filter((panel) => panel.role === 'chair');
    return `/panels/${(chaired.find((panel) => inReview.has(panel.semesterId)) ?? chaired[0]).panelId}${rest}`;
  },
  async semester(request, base, rest = '') {
    const list = await (await request.get(`${base}/api/v1/semesters`)).json();
    return `/semesters/${list.rows[0].semesterId}${rest}`;
  },
  async newConfiguration(request, base) {
    const list = await (await request.get(`${base}/api/v1/telescopes`)).json();
    return `/instruments/modes/${list.rows[0].instruments[0].modes[0].modeId}/new-configuration`;
  },
};

export const chromium = {
  executablePath: process.env.CHROMIUM ?? (existsSync('/usr/bin/chromium') ? '/usr/bin/chromium' : undefined),
  args: ['--no-sandbox', '--disable-gpu', '--disable-dev-shm-usage', '--disable-background-networking'],
};

function run(command, parameters) {
  const done = spawnSync(command, parameters, { cwd: repositoryRoot, stdio: 'inherit' });
  if (done.status !== 0) throw new Error(`${command} ${parameters.join(' ')} failed.`);
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

async function answering(address, server, timeoutMs) {
  const end = Date.now() + timeoutMs;
  while (Date.now() < end) {
    if (server.exitCode !== null) throw new Error(`The server ended with ${server.exitCode}.`);
    const ok = await fetch(address).then(
      (answer) => answer.ok,
      // Not listening yet.
      () => false,
    );
    if (ok) return;
    await new Promise((resolve) => setTimeout(resolve, 500));
  }
  throw new Error(`No answer from ${address} within ${timeoutMs / 1000} s.`);
}
