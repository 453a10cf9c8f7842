import { mkdirSync, mkdtempSync, writeFileSync } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp } from '../support/app.js';

describe('the web pages', () => {
  let app: TestApp;

  beforeAll(async () => {
    const folder = mkdtempSync(path.join(os.tmpdir(), 'faintward-web-'));
    mkdirSync(path.join(folder, 'assets'));
    writeFileSync(path.join(folder, 'index.html'), '<!doctype html><title>the page</title>');
    writeFileSync(path.join(folder, 'assets', 'main-abc123.js'), 'export {};');
    app = await createTestApp({}, { webFolder: folder });
  });
  afterAll(() => app.close());

  it('are served at every address without a file ending, and asked for again each time', async () => {
    for (const address of ['/', '/proposals/7/targets', '/apiary']) {
      const response = await app.http().get(address).set('Accept', 'text/html').expect(200);
      expect(response.text).toContain('the page');
      expect(response.headers['cache-control']).toBe('no-cache');
    }
  });

  it('come with files that are kept for ever', async () => {
    const { headers } = await app.http().get('/assets/main-abc123.js').expect(200);
    expect(headers['cache-control']).toBe('public, max-age=31536000, immutable');
    expect(headers['content-type']).toContain('javascript');
  });

  it('never stand in for a missing file or a missing part of the api', async () => {
    for (const address of ['/assets/main-old999.js', '/favicon.png', '/api/v1/nothing', '/api']) {
      const response = await app.http().get(address).set('Accept', 'text/html').expect(404);
      expect([address, response.headers['content-type']]).toEqual([address, 'application/problem+json; charset=utf-8']);
    }
    await app.http().post('/proposals').set('Accept', 'text/html').expect(404);
  });

  it('never stand in for the api under another spelling of its address, nor for hidden files', async () => {
    const addresses = [
      '/API/V1/health',
      '//api/v1/health',
      '/api%2Fv1%2Fhealth',
      '/assets',
      '/assets/',
      '/assets/x',
      '/.env',
    ];
    for (const address of [...addresses, '/.git/config']) {
      const response = await app.http().get(address).set('Accept', 'text/html');
      expect([address, response.status, response.headers['content-type']]).toEqual([
        address,
        404,
        'application/problem+json; charset=utf-8',
      ]);
    }
  });

  it('cannot be left for another folder', async () => {
    const response = await app.http().get('/assets/..%2f..%2fpackage.json').set('Accept', 'text/html');
    expect(response.text).not.toContain('the page"');
    expect([400, 403, 404]).toContain(response.status);
  });
});
