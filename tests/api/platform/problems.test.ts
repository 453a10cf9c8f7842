import { Problem } from '@faintward/contracts/errors';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { PeopleReadModel } from '../../../apps/api/src/modules/people/people.read-model.js';
import { aPerson, PASSWORD, signedInAs } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('a refusal', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  afterAll(() => app.close());

  it('is problem details with a stable code and the id of the request', async () => {
    const response = await app.http().get('/api/v1/nothing-here').set('X-Request-Id', 'trace-12345').expect(404);
    expect(response.headers['content-type']).toBe('application/problem+json; charset=utf-8');
    expect(Problem.parse(response.body)).toMatchObject({ code: 'not-found', status: 404 });
    expect(response.body.instance).toBe('urn:faintward:request:trace-12345');
    expect(response.headers['x-request-id']).toBe('trace-12345');
  });

  it('names each field that cannot be used by its path', async () => {
    const { body } = await app
      .http()
      .post('/api/v1/accounts')
      .send({ email: 'nonsense', password: 'short' })
      .expect(422);
    const paths = Problem.parse(body).fieldErrors?.map(({ path }) => path);
    expect(paths).toEqual(expect.arrayContaining(['email', 'password', 'givenName', 'familyName']));
    expect(JSON.stringify(body)).not.toContain('nonsense');
  });

  it('says 400 to a body that is not JSON, without quoting it', async () => {
    const { body } = await app
      .http()
      .post('/api/v1/session')
      .set('Content-Type', 'application/json')
      .send('{"email": "hidden-value')
      .expect(400);
    expect(body.code).toBe('malformed-request');
    expect(JSON.stringify(body)).not.toContain('hidden-value');
  });

  it('says 400 to a body that is nested beyond reason, and takes brackets inside text for text', async () => {
    const send = (body: string) =>
      app.http().post('/api/v1/session').set('Content-Type', 'application/json').send(body);
    const { body } = await send(`{"email":${'['.repeat(100_000)}${']'.repeat(100_000)}}`).expect(400);
    expect(body).toMatchObject({ code: 'malformed-request', detail: 'The body is nested too deeply.' });
    await send(JSON.stringify({ email: 'a@b.example', password: `\\"${'['.repeat(150)}` })).expect(401);
    await send(`{"list":[${'[],'.repeat(200)}[]]}`).expect(422);
  });

  it('says 422 to a request without any body where one is needed', async () => {
    const { body } = await app.http().post('/api/v1/session').expect(422);
    expect(body.code).toBe('validation-failed');
  });

  it('says 413 to a body above the limit of the route', async () => {
    const { body } = await app
      .http()
      .post('/api/v1/session')
      .send({ email: 'a@b.example', password: 'x'.repeat(1_100_000) })
      .expect(413);
    expect(body).toMatchObject({ code: 'too-large', detail: expect.stringContaining('1 MB') });
  });

  it('says 415 to content that is not JSON', async () => {
    const { body } = await app
      .http()
      .post('/api/v1/session')
      .set('Content-Type', 'application/xml')
      .send('<email/>')
      .expect(415);
    expect(body.code).toBe('unsupported-media-type');
  });

  it('says 405 with the possible methods where only the method is wrong', async () => {
    const response = await app.http().delete('/api/v1/institutions').expect(405);
    expect(response.headers['allow']).toBe('GET, HEAD');
    expect(response.body.code).toBe('method-not-allowed');
  });

  it('says 404 to an identifier that is none', async () => {
    const agent = await signedInAs(app, await aPerson(app, { isAdministrator: true }));
    await agent.patch('/api/v1/administration/people/not-an-id').set('If-Match', '"1"').send({}).expect(404);
  });

  it('says 428 without If-Match, 400 to an unreadable one and 412 with what is stored to a stale one', async () => {
    const agent = await signedInAs(app, await aPerson(app, { isAdministrator: true }));
    const other = await aPerson(app);
    const address = `/api/v1/administration/people/${other.id}`;
    expect((await agent.patch(address).send({ isStaff: true }).expect(428)).body.code).toBe('precondition-required');
    await agent.patch(address).set('If-Match', 'W/"1"').send({ isStaff: true }).expect(400);
    const first = await agent.patch(address).set('If-Match', '"1"').send({ isStaff: true }).expect(200);
    expect(first.headers['etag']).toBe('"2"');
    const { body } = await agent.patch(address).set('If-Match', '"1"').send({ isStaff: false }).expect(412);
    expect(body).toMatchObject({ code: 'stale-version', current: { personId: other.id, isStaff: true, version: 2 } });
  });

  it('keeps an unforeseen failure to itself and gives the number it has in the log', async () => {
    const broken = await createTestApp();
    try {
      const agent = await signedInAs(broken, await aPerson(broken));
      const queries = broken.get(PeopleReadModel);
      queries.search = () => Promise.reject(new Error('inner detail with secret-value'));
      const { body } = await agent.get('/api/v1/people?search=abc').expect(500);
      expect(Problem.parse(body)).toMatchObject({
        code: 'internal',
        errorId: expect.stringMatching(/^[0-9a-f-]{36}$/),
      });
      expect(JSON.stringify(body)).not.toContain('secret-value');
    } finally {
      await broken.close();
    }
  });

  it('never lets a person’s secrets out with an answer', async () => {
    const person = await aPerson(app);
    const response = await app
      .agent()
      .post('/api/v1/session')
      .send({ email: person.email, password: PASSWORD })
      .expect(200);
    expect(Object.keys(response.body as object).sort()).toEqual(
      [
        'email',
        'familyName',
        'givenName',
        'institution',
        'isAdministrator',
        'isStaff',
        'orcid',
        'panels',
        'personId',
      ].sort(),
    );
  });
});
