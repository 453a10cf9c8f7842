import { mkdtempSync, readdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { InvalidConfiguration, readConfig } from '../../../apps/api/src/config/config.js';

describe('the configuration', () => {
  it('needs nothing: the defaults run the embedded database on this machine only', () => {
    expect(readConfig({ DATA_DIR: 'memory://' })).toMatchObject({
      host: '127.0.0.1',
      port: 3000,
      databaseUrl: undefined,
      publicUrl: 'http://127.0.0.1:3000',
      isCookieSecure: false,
      demo: 'auto',
    });
  });

  it('takes an empty variable for an unset one', () => {
    expect(readConfig({ DATA_DIR: 'memory://', PORT: '', DATABASE_URL: '' }).port).toBe(3000);
  });

  it('lists every bad variable at once, without showing secrets', () => {
    const read = () =>
      readConfig({ PORT: 'eighty', DEMO: 'maybe', SESSION_SECRET: 'too-short', DATABASE_URL: 'mysql://u:hidden@h/d' });
    expect(read).toThrow(InvalidConfiguration);
    for (const name of ['PORT', 'DEMO', 'SESSION_SECRET', 'DATABASE_URL'])
      expect(read).toThrow(new RegExp(`  ${name}: `));
    expect(read).not.toThrow(/hidden|too-short/);
  });

  it('keeps its secret in the data folder, readable by its owner only', () => {
    const dataDir = mkdtempSync(path.join(os.tmpdir(), 'faintward-config-'));
    const first = readConfig({ DATA_DIR: dataDir }).sessionSecret;
    expect(first.length).toBeGreaterThanOrEqual(64);
    expect(readConfig({ DATA_DIR: dataDir }).sessionSecret).toBe(first);
    const file = path.join(dataDir, 'session-secret');
    expect(readFileSync(file, 'utf8')).toBe(first);
    expect(statSync(file).mode & 0o077).toBe(0);
  });

  it('refuses a kept secret that is too short to be one, and says how to get another', () => {
    const dataDir = mkdtempSync(path.join(os.tmpdir(), 'faintward-config-'));
    const file = path.join(dataDir, 'session-secret');
    for (const content of ['', 'short\n']) {
      writeFileSync(file, content);
      expect(() => readConfig({ DATA_DIR: dataDir })).toThrow(InvalidConfiguration);
      expect(() => readConfig({ DATA_DIR: dataDir })).toThrow(`${file} does not hold a secret`);
    }
    rmSync(file);
    expect(readConfig({ DATA_DIR: dataDir }).sessionSecret.length).toBeGreaterThanOrEqual(64);
    expect(readdirSync(dataDir)).toEqual(['session-secret']);
  });

  it('takes digits only for a number', () => {
    for (const PORT of [' ', '0x50', '1e3', '-1', '65536', '80.5']) {
      expect(() => readConfig({ DATA_DIR: 'memory://', PORT })).toThrow('PORT: must be a port number from 0 to 65535');
    }
    expect(readConfig({ DATA_DIR: 'memory://', PORT: '8080' }).port).toBe(8080);
  });

  it('marks cookies secure where people come by https', () => {
    const config = readConfig({ DATA_DIR: 'memory://', PUBLIC_URL: 'https://faintward.example.org/' });
    expect(config).toMatchObject({ isCookieSecure: true, publicUrl: 'https://faintward.example.org' });
  });
});
