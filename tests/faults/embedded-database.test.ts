import { existsSync, mkdtempSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { type RunningServer, runBuilt, startServer } from './process.js';

const PASSWORD = 'correct horse battery staple';

// Each test starts the application several times, which costs seconds on an idle machine and more on a busy one.
describe('the embedded database', { timeout: 300_000 }, () => {
  let dataDir: string;
  let running: RunningServer | undefined;

  const start = async () => (running = await startServer({ DATA_DIR: dataDir }));
  const signUp = (address: string, email: string) =>
    fetch(`${address}/api/v1/accounts`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ email, password: PASSWORD, givenName: 'A', familyName: '0' }),
    });
  const signIn = (address: string, email: string) =>
    fetch(`${address}/api/v1/session`, {
      method: 'POST',
      headers: { 'content-type': 'application/json' },
      body: JSON.stringify({ email, password: PASSWORD }),
    });

  beforeEach(() => {
    dataDir = mkdtempSync(path.join(os.tmpdir(), 'faintward-faults-'));
  });
  afterEach(async () => {
    if (running?.child.exitCode === null) await running.end('SIGKILL');
    running = undefined;
    rmSync(dataDir, { recursive: true, force: true });
  });

  it('keeps every acknowledged write when the process is killed in the middle of writing', async () => {
    const first = await start();
    const created = await signUp(first.address, 'writer@institute.example');
    expect(created.status).toBe(201);
    const cookie = created.headers
      .getSetCookie()
      .map((entry) => entry.split(';', 1)[0])
      .join('; ');

    const acknowledged: string[] = [];
    let lastNumber = 0;
    let isDead = false;
    // Two kinds of writers: new accounts, and a counter that only grows.
    const newAccounts = async (writer: number) => {
      for (let count = 0; !isDead; count += 1) {
        const email = `person-${writer}-${count}@institute.example`;
        const status = await signUp(first.address, email).then(
          (response) => response.status,
          () => undefined,
        );
        if (status === 201) acknowledged.push(email);
      }
    };
    const counter = async () => {
      for (let number = 1; !isDead; number += 1) {
        const status = await fetch(`${first.address}/api/v1/profile`, {
          method: 'PATCH',
          headers: { 'content-type': 'application/json', cookie },
          body: JSON.stringify({ familyName: String(number) }),
        }).then(
          (response) => response.status,
          () => undefined,
        );
        if (status === 200) lastNumber = number;
      }
    };
    const writers = [newAccounts(1), newAccounts(2), newAccounts(3), counter()];
    while (acknowledged.length < 25 || lastNumber < 25) await new Promise((resolve) => setTimeout(resolve, 20));
    expect(await first.end('SIGKILL')).toBe('SIGKILL');
    isDead = true;
    await Promise.all(writers);

    const second = await start();
    const response = await signIn(second.address, 'writer@institute.example');
    const me = (await response.json()) as { familyName: string };
    expect(Number(me.familyName)).toBeGreaterThanOrEqual(lastNumber);
    const statuses = await Promise.all(acknowledged.map(async (email) => (await signIn(second.address, email)).status));
    expect(statuses).toEqual(acknowledged.map(() => 200));
  });

  it('refuses a second process on the same data folder, and frees the folder however the first one ends', async () => {
    const first = await start();
    const second = await runBuilt('main.js', [], { DATA_DIR: dataDir, PORT: '0' });
    expect(second.code).toBe(1);
    expect(second.output).toContain(`Another Faintward process uses the data folder ${dataDir}.`);
    expect(second.output).not.toMatch(/^\s+at /m);
    const backup = await runBuilt('commands/backup.js', [], { DATA_DIR: dataDir });
    expect(backup).toMatchObject({ code: 1, output: expect.stringContaining('Another Faintward process') });
    await first.end('SIGKILL');
    const third = await start();
    expect(await third.end('SIGTERM')).toBe(0);
  });

  it('comes back from a backup with everybody in it, into an empty folder only', async () => {
    const first = await start();
    expect((await signUp(first.address, 'kept@institute.example')).status).toBe(201);
    expect(await first.end('SIGTERM')).toBe(0);
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
    expect((await signIn(running.address, 'kept@institute.example')).status).toBe(200);
  });

  it('does not start on a configuration that cannot be used, and says all that is wrong with it', async () => {
    const { code, output } = await runBuilt('main.js', [], { DATA_DIR: dataDir, PORT: 'eighty', DEMO: 'perhaps' });
    expect(code).toBe(1);
    expect(output).toContain('PORT:');
    expect(output).toContain('DEMO:');
    expect(output).not.toMatch(/^\s+at /m);
  });
});
