import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { refreshTokens, sessions } from '../../../apps/api/src/database/schema/accounts.js';
import { people } from '../../../apps/api/src/database/schema/people.js';
import { PasswordHasher } from '../../../apps/api/src/modules/accounts/passwords.js';
import { REUSE_GRACE_SECONDS } from '../../../apps/api/src/modules/accounts/sessions.service.js';
import { aPerson, PASSWORD, signedInAs } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('a session', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  const cookieOf = (response: { get(name: 'Set-Cookie'): string[] | undefined }, name: string) =>
    response.get('Set-Cookie')?.find((cookie) => cookie.startsWith(`${name}=`)) ?? '';
  const valueOf = (cookie: string) => cookie.split(';', 1)[0] ?? '';
  /** As if everything used up so far had been used longer ago than two windows ever differ. */
  const waitOutTheGrace = () =>
    app.db
      .update(refreshTokens)
      .set({ usedAt: sql`${refreshTokens.usedAt} - make_interval(secs => ${REUSE_GRACE_SECONDS + 1})` });

  it('opens with e-mail address and password, in whatever case the address is typed', async () => {
    const person = await aPerson(app);
    const agent = app.agent();
    const response = await agent
      .post('/api/v1/session')
      .send({ email: ` ${person.email.toUpperCase()}`, password: PASSWORD })
      .expect(200);
    expect(response.body).toMatchObject({ personId: person.id, email: person.email, isStaff: false, panels: [] });
    expect((await agent.get('/api/v1/session').expect(200)).body).toEqual(response.body);
  });

  it('keeps both tokens where scripts cannot read them, and the refresh token to its own path', async () => {
    const person = await aPerson(app);
    const response = await app.http().post('/api/v1/session').send({ email: person.email, password: PASSWORD });
    expect(cookieOf(response, 'faintward_access')).toMatch(/HttpOnly.*SameSite=Lax/);
    expect(cookieOf(response, 'faintward_refresh')).toMatch(/Path=\/api\/v1\/session;.*HttpOnly.*SameSite=Strict/);
    const stored = await app.db.select().from(refreshTokens);
    const token = valueOf(cookieOf(response, 'faintward_refresh')).split('=')[1] ?? '';
    expect(token).toHaveLength(43);
    expect(JSON.stringify(stored)).not.toContain(token);
  });

  it('answers alike to a wrong password, an unknown address and a person without a password', async () => {
    const person = await aPerson(app);
    const invited = await aPerson(app, { passwordHash: null });
    const bodies = [];
    for (const email of [person.email, 'nobody@institute.example', invited.email]) {
      const { body } = await app.http().post('/api/v1/session').send({ email, password: 'wrong password' }).expect(401);
      bodies.push({ code: body.code, detail: body.detail, title: body.title });
    }
    expect(bodies[1]).toEqual(bodies[0]);
    expect(bodies[2]).toEqual(bodies[0]);
    expect(bodies[0]?.code).toBe('wrong-credentials');
  });

  it('checks a decoy for an unknown address, so that the time of the answer tells nothing', async () => {
    const fits = vi.spyOn(PasswordHasher.prototype, 'fits');
    const hash = vi.spyOn(PasswordHasher.prototype, 'hash');
    try {
      await app
        .http()
        .post('/api/v1/session')
        .send({ email: 'nobody@institute.example', password: 'wrong password' })
        .expect(401);
      expect(fits).toHaveBeenCalledTimes(1);
      await expect(new PasswordHasher().fits('wrong password', undefined)).resolves.toBe(false);
      // A hasher that has seen nobody yet makes the decoy that it then verifies against.
      expect(hash).toHaveBeenCalled();
    } finally {
      fits.mockRestore();
      hash.mockRestore();
    }
  });

  it('is renewed with a new refresh token each time', async () => {
    const agent = await signedInAs(app, await aPerson(app));
    const first = await agent.post('/api/v1/session/refresh').expect(200);
    const second = await agent.post('/api/v1/session/refresh').expect(200);
    expect(valueOf(cookieOf(first, 'faintward_refresh'))).not.toBe(valueOf(cookieOf(second, 'faintward_refresh')));
    await agent.get('/api/v1/session').expect(200);
  });

  it('ends for everybody when a refresh token is used a second time', async () => {
    const person = await aPerson(app);
    const agent = app.agent();
    const signedIn = await agent.post('/api/v1/session').send({ email: person.email, password: PASSWORD }).expect(200);
    const stolen = valueOf(cookieOf(signedIn, 'faintward_refresh'));
    await agent.post('/api/v1/session/refresh').expect(200);
    await waitOutTheGrace();
    const { body } = await app.http().post('/api/v1/session/refresh').set('Cookie', stolen).expect(401);
    expect(body.code).toBe('session-expired');
    // The person who holds the newest tokens is out as well, at once and for good.
    expect((await agent.get('/api/v1/session').expect(401)).body.code).toBe('session-expired');
    await agent.post('/api/v1/session/refresh').expect(401);
    const [stored] = await app.db.select().from(sessions).where(eq(sessions.personId, person.id));
    expect(stored?.endedBecause).toBe('token-reused');
  });

  it('survives two windows that renew it at the same moment', async () => {
    const person = await aPerson(app);
    const agent = app.agent();
    const signedIn = await agent.post('/api/v1/session').send({ email: person.email, password: PASSWORD }).expect(200);
    const cookie = valueOf(cookieOf(signedIn, 'faintward_refresh'));
    const renewals = await Promise.all(
      [1, 2].map(() => app.http().post('/api/v1/session/refresh').set('Cookie', cookie)),
    );
    expect(renewals.map(({ status }) => status)).toEqual([200, 200]);
    await waitOutTheGrace();
    for (const renewal of renewals) {
      const next = valueOf(cookieOf(renewal, 'faintward_refresh'));
      await app.http().post('/api/v1/session/refresh').set('Cookie', next).expect(200);
    }
  });

  it('ends at sign-out: neither its access token nor its refresh token works again', async () => {
    const person = await aPerson(app);
    const agent = app.agent();
    const signedIn = await agent.post('/api/v1/session').send({ email: person.email, password: PASSWORD }).expect(200);
    const cookies = ['faintward_access', 'faintward_refresh'].map((name) => valueOf(cookieOf(signedIn, name)));
    await agent.delete('/api/v1/session').expect(204);
    await agent.get('/api/v1/session').expect(401);
    await app.http().get('/api/v1/session').set('Cookie', cookies).expect(401);
    await app.http().post('/api/v1/session/refresh').set('Cookie', cookies).expect(401);
  });

  it('takes a cookie of another form for no cookie', async () => {
    for (const value of ['j:{"a":1}', 'j:["a"]', 'j:null', '%00', '']) {
      const cookies = `faintward_refresh=${value}; faintward_access=${value}`;
      await app.http().post('/api/v1/session/refresh').set('Cookie', cookies).expect(401);
      await app.http().get('/api/v1/session').set('Cookie', cookies).expect(401);
      await app.http().delete('/api/v1/session').set('Cookie', cookies).expect(204);
    }
  });

  it('refuses a token that was signed by somebody else or not at all', async () => {
    const person = await aPerson(app);
    const encode = (value: object) => Buffer.from(JSON.stringify(value)).toString('base64url');
    const unsigned = `${encode({ alg: 'none', typ: 'JWT' })}.${encode({ sub: person.id, sid: person.id })}.`;
    await app.http().get('/api/v1/session').set('Cookie', `faintward_access=${unsigned}`).expect(401);
    await app.http().get('/api/v1/session').set('Cookie', 'faintward_access=garbage').expect(401);
  });

  it('gives up a role the moment it is taken away', async () => {
    const person = await aPerson(app, { isAdministrator: true });
    const agent = await signedInAs(app, person);
    await agent.get('/api/v1/administration/people').expect(200);
    await app.db.update(people).set({ isAdministrator: false }).where(eq(people.id, person.id));
    await agent.get('/api/v1/administration/people').expect(403);
  });
});
