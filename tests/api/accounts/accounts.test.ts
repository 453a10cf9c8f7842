import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { mailboxMessages, outgoingMail, passwordResetTokens } from '../../../apps/api/src/database/schema/accounts.js';
import { people } from '../../../apps/api/src/database/schema/people.js';
import { PASSWORD_RESET_QUEUE } from '../../../apps/api/src/modules/accounts/password-resets.service.js';
import { DemoMode } from '../../../apps/api/src/platform/demo-mode.js';
import { MAIL_QUEUE } from '../../../apps/api/src/platform/mail/mail.service.js';
import { anInstitution, aPerson, PASSWORD, signedInAs } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

const NEW_PASSWORD = 'another long passphrase';

describe('an account', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  it('is made by signing up, and is signed in at once', async () => {
    const institution = await anInstitution(app);
    const agent = app.agent();
    const { body } = await agent
      .post('/api/v1/accounts')
      .send({
        email: 'Ada@Institute.example',
        password: PASSWORD,
        givenName: ' Ada ',
        familyName: 'Núñez',
        institutionId: institution.id,
      })
      .expect(201);
    expect(body).toMatchObject({
      email: 'ada@institute.example',
      givenName: 'Ada',
      institution: { institutionId: institution.id, name: institution.name },
      isStaff: false,
      isAdministrator: false,
    });
    await agent.get('/api/v1/profile').expect(200);
    const [stored] = await app.db.select().from(people).where(eq(people.email, 'ada@institute.example'));
    expect(stored?.passwordHash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/);
  });

  it('cannot be made twice, not even at the same moment or in another case', async () => {
    const request = { email: 'twice@institute.example', password: PASSWORD, givenName: 'A', familyName: 'B' };
    const responses = await Promise.all([
      app.http().post('/api/v1/accounts').send(request),
      app
        .http()
        .post('/api/v1/accounts')
        .send({ ...request, email: 'TWICE@institute.example' }),
    ]);
    expect(responses.map(({ status }) => status).sort()).toEqual([201, 409]);
    const refused = responses.find(({ status }) => status === 409);
    expect(refused?.body).toMatchObject({ code: 'already-exists', fieldErrors: [{ path: 'email' }] });
  });

  it('cannot give itself roles', async () => {
    const { body } = await app
      .http()
      .post('/api/v1/accounts')
      .send({
        email: 'sly@institute.example',
        password: PASSWORD,
        givenName: 'S',
        familyName: 'L',
        isAdministrator: true,
      })
      .expect(201);
    expect(body.isAdministrator).toBe(false);
    const agent = await signedInAs(app, { email: 'sly@institute.example' });
    expect((await agent.patch('/api/v1/profile').send({ isStaff: true }).expect(200)).body.isStaff).toBe(false);
  });

  it('says under the field when the institution does not exist', async () => {
    const agent = await signedInAs(app, await aPerson(app));
    const { body } = await agent
      .patch('/api/v1/profile')
      .send({ institutionId: 'c0ffee00-0000-4000-8000-000000000000' })
      .expect(422);
    expect(body.fieldErrors).toEqual([{ path: 'institutionId', message: 'There is no such institution.' }]);
  });

  it('changes its profile field by field', async () => {
    const person = await aPerson(app);
    const agent = await signedInAs(app, person);
    const { body } = await agent.patch('/api/v1/profile').send({ orcid: '0000-0002-1825-0097' }).expect(200);
    expect(body).toMatchObject({ orcid: '0000-0002-1825-0097', givenName: person.givenName });
    await agent.patch('/api/v1/profile').send({}).expect(200);
    expect(
      (await agent.patch('/api/v1/profile').send({ orcid: '0000-0002-1825-0098' }).expect(422)).body.fieldErrors[0]
        .path,
    ).toBe('orcid');
  });

  it('changes its password only with the current one, and then ends its other sessions', async () => {
    const person = await aPerson(app);
    const here = await signedInAs(app, person);
    const elsewhere = await signedInAs(app, person);
    const { body } = await here
      .put('/api/v1/profile/password')
      .send({ currentPassword: 'not the one', newPassword: NEW_PASSWORD })
      .expect(422);
    expect(body.fieldErrors[0].path).toBe('currentPassword');
    await here
      .put('/api/v1/profile/password')
      .send({ currentPassword: PASSWORD, newPassword: NEW_PASSWORD })
      .expect(200);
    await here.get('/api/v1/session').expect(200);
    await elsewhere.get('/api/v1/session').expect(401);
    await app.http().post('/api/v1/session').send({ email: person.email, password: PASSWORD }).expect(401);
    await app.http().post('/api/v1/session').send({ email: person.email, password: NEW_PASSWORD }).expect(200);
  });
});

describe('a forgotten password', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  async function askForLink(email: string): Promise<string> {
    await app.http().post('/api/v1/password-resets').send({ email }).expect(202);
    await app.work(PASSWORD_RESET_QUEUE, MAIL_QUEUE);
    const received = await app.db
      .select()
      .from(mailboxMessages)
      .where(eq(mailboxMessages.toAddress, email.toLowerCase()));
    const token = /password-reset\/([\w-]+)/.exec(received.at(-1)?.textBody ?? '')?.[1];
    if (token === undefined) throw new Error('No mail with a link arrived.');
    return token;
  }

  it('is replaced through a link in a mail, which really went through a mail server', async () => {
    const person = await aPerson(app, { givenName: 'O’Neil <b>' });
    const session = await signedInAs(app, person);
    const token = await askForLink(person.email);
    const [mail] = await app.db.select().from(outgoingMail).where(eq(outgoingMail.toAddress, person.email));
    expect(mail).toMatchObject({ state: 'sent', attemptCount: 1, lastError: null });
    const [received] = await app.db.select().from(mailboxMessages).where(eq(mailboxMessages.toAddress, person.email));
    expect(received?.htmlBody).toContain('O’Neil &lt;b&gt;');
    expect(received?.htmlBody).toContain(`${app.config.publicUrl}/password-reset/${token}`);
    await app.http().put(`/api/v1/password-resets/${token}`).send({ password: NEW_PASSWORD }).expect(200);
    await app.http().post('/api/v1/session').send({ email: person.email, password: NEW_PASSWORD }).expect(200);
    await session.get('/api/v1/session').expect(401);
    const { body } = await app.http().put(`/api/v1/password-resets/${token}`).send({ password: PASSWORD }).expect(410);
    expect(body.code).toBe('link-expired');
  });

  it('is asked for with the same answer whether or not there is such an account', async () => {
    const person = await aPerson(app);
    const known = await app.http().post('/api/v1/password-resets').send({ email: person.email }).expect(202);
    const unknown = await app
      .http()
      .post('/api/v1/password-resets')
      .send({ email: 'nobody@institute.example' })
      .expect(202);
    expect(unknown.body).toEqual(known.body);
    await app.work(PASSWORD_RESET_QUEUE, MAIL_QUEUE);
    expect(
      await app.db.select().from(outgoingMail).where(eq(outgoingMail.toAddress, 'nobody@institute.example')),
    ).toEqual([]);
  });

  it('cannot be replaced through a link that is too old or was never sent', async () => {
    const person = await aPerson(app);
    const token = await askForLink(person.email);
    await app.db.update(passwordResetTokens).set({ expiresAt: sql`now() - interval '1 second'` });
    await app.http().put(`/api/v1/password-resets/${token}`).send({ password: NEW_PASSWORD }).expect(410);
    await app.http().put('/api/v1/password-resets/made-up').send({ password: NEW_PASSWORD }).expect(410);
  });

  it('keeps a mail that the server does not take, with the reason, and tries again', async () => {
    const failing = await createTestApp({ smtpUrl: 'smtp://127.0.0.1:1' });
    try {
      const person = await aPerson(failing);
      await failing.http().post('/api/v1/password-resets').send({ email: person.email }).expect(202);
      await failing.work(PASSWORD_RESET_QUEUE, MAIL_QUEUE);
      const [mail] = await failing.db.select().from(outgoingMail);
      expect(mail).toMatchObject({ state: 'failed', attemptCount: 6, sentAt: null });
      expect(mail?.lastError).toContain('ECONNREFUSED');
      const administrator = await signedInAs(failing, await aPerson(failing, { isAdministrator: true }));
      const { body } = await administrator.get('/api/v1/administration/mail').expect(200);
      expect(body).toMatchObject({ rowCount: 1, rows: [{ to: person.email, state: 'failed', attempts: 6 }] });
      expect(JSON.stringify(body)).not.toContain('password-reset/');
    } finally {
      await failing.close();
    }
  });
});

describe('the demo', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  it('shows neither people nor mailbox on a database that it did not fill', async () => {
    await aPerson(app, { demoPart: 'looks like one' });
    await app.http().get('/api/v1/demo-people').expect(404);
    await app.http().get('/api/v1/mailbox').expect(404);
  });

  it('lists its people with their part and the password, and opens the mailbox', async () => {
    await aPerson(app, { givenName: 'Vera', familyName: 'Lund', demoPart: 'chair of the panel' });
    await app.get(DemoMode).enable(PASSWORD);
    const { body } = await app.http().get('/api/v1/demo-people').expect(200);
    expect(body).toMatchObject({
      password: PASSWORD,
      people: expect.arrayContaining([expect.objectContaining({ name: 'Vera Lund', part: 'chair of the panel' })]),
    });
    expect((await app.http().get('/api/v1/mailbox').expect(200)).body).toEqual({ rows: [] });
  });

  it('lets administrators read the mailbox outside of the demo, and nobody else', async () => {
    await app.empty();
    const administrator = await signedInAs(app, await aPerson(app, { isAdministrator: true }));
    await administrator.get('/api/v1/mailbox').expect(200);
    const staff = await signedInAs(app, await aPerson(app, { isStaff: true }));
    await staff.get('/api/v1/mailbox').expect(404);
  });
});
