import { existsSync, mkdirSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import http from 'node:http';
import os from 'node:os';
import path from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type RunningServer, runBuilt, startServer } from './process.js';

const PASSWORD = 'correct horse battery staple';

function post(address: string, route: string, body: object, headers: Record<string, string> = {}) {
  return fetch(`${address}/api/v1/${route}`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', ...headers },
    body: JSON.stringify(body),
  });
}
const signUp = (address: string, email: string) =>
  post(address, 'accounts', { email, password: PASSWORD, givenName: 'A', familyName: '0' });
const signIn = (address: string, email: string) => post(address, 'session', { email, password: PASSWORD });

/**
 * The life of one data folder, told in order: each start of the built application costs seconds, so the tests go on from
 * where the one before left the folder.
 */
describe('the embedded database', { timeout: 300_000 }, () => {
  let dataDir: string;
  let running: RunningServer;

  beforeAll(async () => {
    dataDir = mkdtempSync(path.join(os.tmpdir(), 'faintward-faults-'));
    running = await startServer({ DATA_DIR: dataDir });
  }, 300_000);
  afterAll(async () => {
    if (running?.child.exitCode === null && running.child.signalCode === null) await running.end('SIGKILL');
    rmSync(dataDir, { recursive: true, force: true });
  });

  it('is refused to a second process and to a backup while the first one runs', async () => {
    const second = await runBuilt('main.js', [], { DATA_DIR: dataDir, PORT: '0' });
    expect(second).toMatchObject({
      code: 1,
      output: expect.stringContaining(`Another Faintward process uses the data folder ${dataDir}.`),
    });
    expect(second.output).not.toMatch(/^\s+at /m);
    const backup = await runBuilt('commands/backup.js', [], { DATA_DIR: dataDir });
    expect(backup).toMatchObject({ code: 1, output: expect.stringContaining('Another Faintward process') });
  });

  it('keeps every acknowledged write when the process is killed in the middle of writing, and frees its folder', async () => {
    const { address } = running;
    const created = await signUp(address, 'writer@institute.example');
    expect(created.status).toBe(201);
    const cookie = created.headers
      .getSetCookie()
      .map((entry) => entry.split(';', 1)[0])
      .join('; ');

    const acknowledged: string[] = [];
    let lastNumber = 0;
    let isDead = false;
    const statusOf = (answer: Promise<Response>) =>
      answer.then(
        ({ status }) => status,
        () => undefined,
      );
    // Two kinds of writers: new accounts, and a counter that only grows.
    const newAccounts = async (writer: number) => {
      for (let count = 0; !isDead; count += 1) {
        const email = `person-${writer}-${count}@institute.example`;
        if ((await statusOf(signUp(address, email))) === 201) acknowledged.push(email);
      }
    };
    const counter = async () => {
      for (let number = 1; !isDead; number += 1) {
        const status = await statusOf(
          fetch(`${address}/api/v1/profile`, {
            method: 'PATCH',
            headers: { 'content-type': 'application/json', cookie },
            body: JSON.stringify({ familyName: String(number) }),
          }),
        );
        if (status === 200) lastNumber = number;
      }
    };
    const writers = [newAccounts(1), newAccounts(2), newAccounts(3), counter()];
    while (acknowledged.length < 25 || lastNumber < 25) await pause(20);
    expect(await running.end('SIGKILL')).toBe('SIGKILL');
    isDead = true;
    await Promise.all(writers);

    running = await startServer({ DATA_DIR: dataDir });
    const response = await signIn(running.address, 'writer@institute.example');
    const me = (await response.json()) as { familyName: string };
    expect(Number(me.familyName)).toBeGreaterThanOrEqual(lastNumber);
    const statuses = await Promise.all(
      acknowledged.map(async (email) => (await signIn(running.address, email)).status),
    );
    expect(statuses).toEqual(acknowledged.map(() => 200));
  });

  it('lets a request that is still coming in finish when it is told to end, and stores what it brought', async () => {
    const body = JSON.stringify({
      email: 'late@institute.example',
      password: PASSWORD,
      givenName: 'A',
      familyName: '0',
    });
    const { port } = new URL(running.address);
    const request = http.request({
      port,
      host: '127.0.0.1',
      method: 'POST',
      path: '/api/v1/accounts',
      headers: { 'content-type': 'application/json', 'content-length': Buffer.byteLength(body) },
    });
    const status = new Promise<number | undefined>((resolve, reject) => {
      request.once('response', (response) => resolve(response.resume().statusCode));
      request.once('error', reject);
    });
    request.write(body.slice(0, 20));
    await pause(200);
    const ended = running.end('SIGTERM');
    await pause(300);
    await expect(fetch(`${running.address}/api/v1/health`)).rejects.toThrow();
    request.end(body.slice(20));
    expect(await status).toBe(201);
    expect(await ended).toBe(0);
  });

  it('comes back from a backup with everybody in it, into an empty folder only', async () => {
    const file = path.join(dataDir, 'one.tar.gz');
    expect(await runBuilt('commands/backup.js', [file], { DATA_DIR: dataDir })).toMatchObject({ code: 0 });
    expect(await runBuilt('commands/backup.js', [file], { DATA_DIR: dataDir })).toMatchObject({ code: 1 });
    const refused = await runBuilt('commands/restore.js', [file], { DATA_DIR: dataDir });
    expect(refused).toMatchObject({ code: 1, output: expect.stringContaining('holds a database already') });

    const otherDir = path.join(dataDir, 'other');
    const broken = path.join(dataDir, 'broken.tar.gz');
    writeFileSync(broken, 'not an archive');
    const unreadable = await runBuilt('commands/restore.js', [broken], { DATA_DIR: otherDir });
    expect(unreadable).toMatchObject({ code: 1, output: expect.stringContaining('is not a backup that can be read') });
    expect(readdirSync(otherDir).filter((name) => name.startsWith('database'))).toEqual([]);

    expect(await runBuilt('commands/restore.js', [file], { DATA_DIR: otherDir })).toMatchObject({ code: 0 });
    expect(existsSync(path.join(otherDir, 'database'))).toBe(true);
    running = await startServer({ DATA_DIR: otherDir });
    for (const email of ['writer@institute.example', 'late@institute.example']) {
      expect((await signIn(running.address, email)).status).toBe(200);
    }
  });

  it('says what is wrong with a database that cannot be opened', async () => {
    const folder = path.join(dataDir, 'damaged');
    mkdirSync(path.join(folder, 'database'), { recursive: true });
    writeFileSync(path.join(folder, 'database', 'PG_VERSION'), '9\n');
    const { code, output } = await runBuilt('main.js', [], { DATA_DIR: folder, PORT: '0' });
    expect(code).toBe(1);
    expect(output).toContain('cannot be opened: it is damaged, or another version of the engine made it');
    expect(output).not.toMatch(/^\s+at /m);
  });

  it('is not even opened where the configuration or the port cannot be used', async () => {
    const untouched = path.join(dataDir, 'untouched');
    const { code, output } = await runBuilt('main.js', [], { DATA_DIR: untouched, PORT: 'eighty', DEMO: 'perhaps' });
    expect(code).toBe(1);
    expect(output).toContain('PORT:');
    expect(output).toContain('DEMO:');
    expect(output).not.toMatch(/^\s+at /m);
    const { port } = new URL(running.address);
    const taken = await runBuilt('main.js', [], { DATA_DIR: untouched, PORT: port });
    expect(taken).toMatchObject({ code: 1, output: expect.stringContaining(`Port ${port} on 127.0.0.1 is taken.`) });
    expect(existsSync(path.join(untouched, 'database'))).toBe(false);
  });
});
