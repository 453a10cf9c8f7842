import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { RATE_LIMITS } from '../../../apps/api/src/platform/rate-limits.js';
import { aPerson, PASSWORD, signedInAs } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('protection against other sites', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  it('refuses a change that a page of another site sends with the person’s cookies', async () => {
    const agent = await signedInAs(app, await aPerson(app, { givenName: 'Unchanged' }));
    for (const headers of [
      { 'Sec-Fetch-Site': 'cross-site' },
      { 'Sec-Fetch-Site': 'same-site' },
      { Origin: 'https://elsewhere.example' },
    ]) {
      const { body } = await agent.patch('/api/v1/profile').set(headers).send({ givenName: 'Changed' }).expect(403);
      expect(body.code).toBe('cross-site-request');
    }
    expect((await agent.get('/api/v1/profile').expect(200)).body.givenName).toBe('Unchanged');
  });

  it('accepts the same change from its own pages, and from the public address behind a proxy', async () => {
    const agent = await signedInAs(app, await aPerson(app));
    await agent.patch('/api/v1/profile').set('Sec-Fetch-Site', 'same-origin').send({ givenName: 'Once' }).expect(200);
    await agent.patch('/api/v1/profile').set('Origin', app.config.publicUrl).send({ givenName: 'Twice' }).expect(200);
  });

  it('sends security headers, but nothing that would force https where there is none', async () => {
    const { headers } = await app.http().get('/api/v1/health').expect(200);
    expect(headers['content-security-policy']).toContain("default-src 'self'");
    expect(headers['content-security-policy']).not.toContain('upgrade-insecure-requests');
    expect(headers['strict-transport-security']).toBeUndefined();
    expect(headers['x-content-type-options']).toBe('nosniff');
    expect(headers['x-powered-by']).toBeUndefined();
    expect(headers['cache-control']).toBe('no-store');
  });

  it('forces https where the public address has it', async () => {
    const secure = await createTestApp({ publicUrl: 'https://faintward.test', isCookieSecure: true });
    try {
      const { headers } = await secure.http().get('/api/v1/health').expect(200);
      expect(headers['content-security-policy']).toContain('upgrade-insecure-requests');
      expect(headers['strict-transport-security']).toMatch(/max-age=\d{7,}/);
      const person = await aPerson(secure);
      const response = await secure.http().post('/api/v1/session').send({ email: person.email, password: PASSWORD });
      for (const cookie of response.get('Set-Cookie') ?? []) expect(cookie).toContain('Secure');
    } finally {
      await secure.close();
    }
  });
});

describe('rate limits', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp({ areRateLimitsOn: true });
  });
  afterAll(() => app.close());

  it('stop guessing at one account, tell how long to wait, and leave other accounts alone', async () => {
    const person = await aPerson(app);
    for (let attempt = 0; attempt < RATE_LIMITS.credentials; attempt += 1) {
      await app
        .http()
        .post('/api/v1/session')
        .send({ email: person.email, password: `guess ${attempt}` })
        .expect(401);
    }
    const refused = await app
      .http()
      .post('/api/v1/session')
      .send({ email: person.email.toUpperCase(), password: PASSWORD })
      .expect(429);
    expect(refused.body).toMatchObject({ code: 'rate-limited', retryAfterSeconds: expect.any(Number) });
    expect(Number(refused.headers['retry-after'])).toBeGreaterThan(0);
    expect(Number(refused.headers['retry-after'])).toBeLessThanOrEqual(60);
    await app
      .http()
      .post('/api/v1/session')
      .send({ email: (await aPerson(app)).email, password: PASSWORD })
      .expect(200);
  });
});
