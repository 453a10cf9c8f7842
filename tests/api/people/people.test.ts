import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { changes } from '../../../apps/api/src/database/schema/history.js';
import { HistoryService } from '../../../apps/api/src/platform/history.js';
import { anInstitution, aPerson, signedInAs } from '../../factories/people.js';
import { createTestApp, type TestApp } from '../support/app.js';

describe('people', () => {
  let app: TestApp;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(() => app.empty());
  afterAll(() => app.close());

  it('are found by a part of their name, without their address', async () => {
    const institution = await anInstitution(app);
    const sought = await aPerson(app, {
      givenName: 'Ingrid',
      familyName: 'Håkansdatter',
      institutionId: institution.id,
    });
    const agent = await signedInAs(app, await aPerson(app));
    const { body } = await agent.get('/api/v1/people').query({ search: 'grid hå' }).expect(200);
    expect(body).toEqual({
      rows: [{ personId: sought.id, name: 'Ingrid Håkansdatter', institutionName: institution.name }],
    });
  });

  it('are found by their whole address, but not by a part of it', async () => {
    const sought = await aPerson(app, { email: 'unusual@institute.example' });
    const agent = await signedInAs(app, await aPerson(app));
    expect((await agent.get('/api/v1/people').query({ search: 'Unusual@institute.example' })).body.rows).toHaveLength(
      1,
    );
    expect((await agent.get('/api/v1/people').query({ search: 'unusual@' })).body.rows).toEqual([]);
    expect(sought.email).toBe('unusual@institute.example');
  });

  it('cannot be listed by wildcards', async () => {
    await aPerson(app);
    const agent = await signedInAs(app, await aPerson(app));
    for (const search of ['%%', '__', '\\\\']) {
      expect((await agent.get('/api/v1/people').query({ search }).expect(200)).body.rows).toEqual([]);
    }
    await agent.get('/api/v1/people').query({ search: 'a' }).expect(422);
  });

  it('are listed in pages with their roles, for administrators', async () => {
    const administrator = await aPerson(app, { familyName: 'Aa', isAdministrator: true });
    for (const familyName of ['Cc', 'Bb', 'Dd']) await aPerson(app, { familyName });
    const agent = await signedInAs(app, administrator);
    const { body } = await agent
      .get('/api/v1/administration/people')
      .query({ page: 2, pageSize: 2, sort: 'name' })
      .expect(200);
    expect(body).toMatchObject({ rowCount: 4, page: 2, pageSize: 2 });
    expect(body.rows.map(({ name }: { name: string }) => name.split(' ')[1])).toEqual(['Cc', 'Dd']);
    const refused = await agent.get('/api/v1/administration/people').query({ sort: 'passwordHash' }).expect(422);
    expect(refused.body.fieldErrors[0].path).toBe('sort');
  });

  it('get and lose roles through administrators, who leave a record', async () => {
    const administrator = await aPerson(app, { isAdministrator: true });
    const person = await aPerson(app, { givenName: 'Ola', familyName: 'Berg' });
    const agent = await signedInAs(app, administrator);
    const { body } = await agent
      .patch(`/api/v1/administration/people/${person.id}`)
      .set('If-Match', '"1"')
      .send({ isStaff: true })
      .expect(200);
    expect(body).toMatchObject({ isStaff: true, isAdministrator: false, version: 2 });
    const [change] = await app.db.select().from(changes);
    expect(change).toMatchObject({
      personId: administrator.id,
      scope: 'person',
      subject: 'roles',
      details: { isStaff: { before: false, after: true } },
    });
    const trail = await agent.get('/api/v1/administration/changes').expect(200);
    expect(trail.body.rows[0]).toMatchObject({ subject: 'roles', summary: 'Ola Berg: staff role given' });
  });

  it('never lose the last administrator, not even when two take the role from each other at once', async () => {
    const one = await aPerson(app, { isAdministrator: true });
    const two = await aPerson(app, { isAdministrator: true });
    const [asOne, asTwo] = [await signedInAs(app, one), await signedInAs(app, two)];
    const responses = await Promise.all([
      asOne.patch(`/api/v1/administration/people/${two.id}`).set('If-Match', '"1"').send({ isAdministrator: false }),
      asTwo.patch(`/api/v1/administration/people/${one.id}`).set('If-Match', '"1"').send({ isAdministrator: false }),
    ]);
    const statuses = responses.map(({ status }) => status).sort();
    expect(statuses[0]).toBe(200);
    expect([403, 409]).toContain(statuses[1]);
  });

  it('show administrators that a draft changed, but nothing of what it says', async () => {
    const author = await aPerson(app);
    await app.get(HistoryService).record({
      personId: author.id,
      scope: 'proposal',
      scopeId: author.id,
      subject: 'caseSection',
      subjectId: author.id,
      subjectName: 'secret title',
      action: 'changed',
      details: { text: { before: 'secret before', after: 'secret after' } },
    });
    const agent = await signedInAs(app, await aPerson(app, { isAdministrator: true }));
    const { body } = await agent.get('/api/v1/administration/changes').expect(200);
    expect(body.rows[0]).toMatchObject({ subject: 'caseSection', summary: 'proposal: changed text' });
    expect(JSON.stringify(body)).not.toContain('secret');
  });

  it('see the list of institutions before they have an account', async () => {
    const institution = await anInstitution(app);
    const { body } = await app.http().get('/api/v1/institutions').expect(200);
    expect(body.rows).toEqual([
      { institutionId: institution.id, name: institution.name, country: 'Norway', partnerId: null, partnerName: null },
    ]);
  });
});
