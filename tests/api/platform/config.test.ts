import { mkdtempSync, readFileSync, statSync } from 'node:fs';
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

  it('marks cookies secure where people come by https', () => {
    const config = readConfig({ DATA_DIR: 'memory://', PUBLIC_URL: 'https://faintward.example.org/' });
    expect(config).toMatchObject({ isCookieSecure: true, publicUrl: 'https://faintward.example.org' });
  });
});
