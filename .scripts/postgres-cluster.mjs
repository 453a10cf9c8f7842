// Starts a PostgreSQL server of its own for the tests, on a port the system chooses and with its data in a temporary
// folder, and removes both again. Returns undefined where PostgreSQL's programs are not installed.
import { execFileSync, spawnSync } from 'node:child_process';
import { chownSync, existsSync, mkdirSync, mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs';
import net from 'node:net';
import os from 'node:os';
import path from 'node:path';
import process from 'node:process';

export async function startPostgres() {
  const programs = findPrograms();
  if (programs === undefined) return undefined;
  const folder = mkdtempSync(path.join(os.tmpdir(), 'faintward-pg-'));
  const data = path.join(folder, 'data');
  mkdirSync(data, { mode: 0o700 });
  // PostgreSQL refuses to run as root: then it runs as the account that its package made, or as nobody.
  const account = process.getuid?.() === 0 ? accountFor(['postgres', 'nobody']) : undefined;
  if (account !== undefined) for (const each of [folder, data]) chownSync(each, account.uid, account.gid);
  const run = (program, parameters) => {
    const result = spawnSync(path.join(programs, program), parameters, {
      ...account,
      cwd: folder,
      encoding: 'utf8',
      // The server inherits these; a pipe that it kept open would never end.
      stdio: program === 'pg_ctl' ? 'ignore' : 'pipe',
      env: { PATH: process.env.PATH, HOME: folder, LC_ALL: 'C.UTF-8' },
    });
    if (result.status !== 0) {
      const log = path.join(folder, 'log');
      const reason = result.stderr || (existsSync(log) ? readFileSync(log, 'utf8') : '') || String(result.error ?? '');
      throw new Error(`${program} failed: ${reason.trim()}`);
    }
  };
  const stop = () => {
    if (existsSync(path.join(data, 'postmaster.pid'))) run('pg_ctl', ['-D', data, '-m', 'immediate', '-w', 'stop']);
    rmSync(folder, { recursive: true, force: true });
  };
  try {
    run('initdb', ['-D', data, '-U', 'faintward', '-A', 'trust', '-E', 'UTF8', '--no-sync']);
    const port = await freePort();
    const options = `-c listen_addresses=127.0.0.1 -p ${port} -c unix_socket_directories=${folder} -c fsync=off`;
    run('pg_ctl', ['-D', data, '-l', path.join(folder, 'log'), '-o', options, '-w', '-t', '60', 'start']);
    return { url: `postgresql://faintward@127.0.0.1:${port}/postgres`, stop };
  } catch (error) {
    stop();
    throw error;
  }
}

function findPrograms() {
  const debian = '/usr/lib/postgresql';
  const versions = existsSync(debian) ? readdirSync(debian).sort((a, b) => Number(b) - Number(a)) : [];
  const folders = [
    ...(process.env.PATH ?? '').split(path.delimiter),
    ...versions.map((version) => `${debian}/${version}/bin`),
  ];
  return folders.find(
    (folder) => folder !== '' && ['initdb', 'pg_ctl', 'postgres'].every((name) => existsSync(path.join(folder, name))),
  );
}

function accountFor(names) {
  for (const name of names) {
    const result = spawnSync('id', ['-u', name], { encoding: 'utf8' });
    if (result.status !== 0) continue;
    const gid = execFileSync('id', ['-g', name], { encoding: 'utf8' });
    return { uid: Number(result.stdout), gid: Number(gid) };
  }
  throw new Error('PostgreSQL does not run as root, and there is no account "postgres" or "nobody" to run it as.');
}

function freePort() {
  return new Promise((resolve, reject) => {
    const server = net.createServer();
    server.once('error', reject);
    server.listen(0, '127.0.0.1', () => {
      const { port } = server.address();
      server.close(() => resolve(port));
    });
  });
}
