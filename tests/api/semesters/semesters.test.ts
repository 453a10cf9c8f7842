import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import {
  aPanel,
  aPanelMember,
  aReview,
  aSemester,
  aSite,
  aSubmittedProposal,
  aTelescope,
  inDays,
  MERIT,
  METHOD,
} from '../../factories/committee.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

describe('semesters', () => {
  let app: TestApp;
  let staff: Agent;

  beforeAll(async () => {
    app = await createTestApp();
  });
  beforeEach(async () => {
    await app.empty();
    staff = await signedInAs(app, await aPerson(app, { isStaff: true }));
  });
  afterAll(() => app.close());

  async function anInput(overrides: Record<string, unknown> = {}) {
    const telescope = await aTelescope(app);
    return {
      name: 'Oct 2030 to Mar 2031',
      startsOn: '2030-10-01',
      endsOn: '2031-03-31',
      callOpensAt: '2030-03-01T12:00:00Z',
      deadlineAt: '2030-04-15T18:00:00Z',
      isAnonymised: true,
      callText: 'Proposals are invited.',
      criteria: [MERIT, METHOD],
      telescopes: [{ telescopeId: telescope.id, availableHours: { dark: 300, grey: 200, bright: 100 } }],
      ...overrides,
    };
  }

  describe('the calls on the front page', () => {
    it('are those open or announced, the soonest deadline first, with the server’s clock', async () => {
      await aSemester(app, { name: 'past' });
      await aSemester(app, { name: 'later', callOpensAt: inDays(20), deadlineAt: inDays(60) });
      await aSemester(app, { name: 'open', callOpensAt: inDays(-5), deadlineAt: inDays(30) });
      const before = Date.now();
      const { body } = await app.http().get('/api/v1/calls').expect(200);
      expect(body.calls.map((call: { name: string; stage: string }) => [call.name, call.stage])).toEqual([
        ['open', 'open'],
        ['later', 'announced'],
      ]);
      expect(body.observatoryName).toBe('Test Ridge Observatory');
      expect(body.siteTimeZone).toBe('America/Santiago');
      expect(Date.parse(body.now)).toBeGreaterThanOrEqual(before);
      expect(Date.parse(body.now)).toBeLessThanOrEqual(Date.now());
    });

    it('are an empty list at an observatory that is not set up', async () => {
      const { body } = await app.http().get('/api/v1/calls').expect(200);
      expect(body.calls).toEqual([]);
    });
  });

  it('are created by staff, with their hours and criteria', async () => {
    const { body, headers } = await staff
      .post('/api/v1/semesters')
      .send(await anInput())
      .expect(201);
    expect(body).toMatchObject({ name: 'Oct 2030 to Mar 2031', stage: 'announced', version: 1 });
    expect(body.telescopes[0].availableHours).toEqual({ dark: 300, grey: 200, bright: 100 });
    expect(headers['etag']).toBe('"1"');
    const listed = await staff.get('/api/v1/semesters').expect(200);
    expect(listed.body.rows).toEqual([body]);
  });

  it('can be read by every signed-in person and changed by staff alone', async () => {
    const semester = await aSemester(app);
    const agent = await signedInAs(app, await aPerson(app));
    await agent.get(`/api/v1/semesters/${semester.id}`).expect(200);
    await agent
      .patch(`/api/v1/semesters/${semester.id}`)
      .set('If-Match', '"1"')
      .send({ callText: 'Mine.' })
      .expect(403);
    await agent
      .post('/api/v1/semesters')
      .send(await anInput())
      .expect(403);
    await app.http().get('/api/v1/semesters').expect(401);
  });

  it.each([
    ['deadlineAt', { deadlineAt: '2030-03-01T12:00:00Z' }],
    ['startsOn', { startsOn: '2030-04-14' }],
    ['endsOn', { endsOn: '2030-09-30' }],
    ['reviewsDueAt', { reviewsDueAt: '2030-04-15T18:00:00Z' }],
    ['criteria.1.criterionId', { criteria: [MERIT, { ...METHOD, criterionId: 'merit' }] }],
    ['criteria', { criteria: [] }],
    ['criteria.0.weight', { criteria: [{ ...MERIT, weight: 0 }] }],
    ['name', { name: '   ' }],
    ['callOpensAt', { callOpensAt: 'soon' }],
  ])('with an impossible value are refused at %s', async (path, overrides) => {
    const { body } = await staff
      .post('/api/v1/semesters')
      .send(await anInput(overrides))
      .expect(422);
    expect(body.fieldErrors.map((error: { path: string }) => error.path)).toContain(path);
  });

  it('refuse negative hours and telescopes that do not exist', async () => {
    const telescope = await aTelescope(app);
    const negative = await staff
      .post('/api/v1/semesters')
      .send(
        await anInput({
          telescopes: [{ telescopeId: telescope.id, availableHours: { dark: -1, grey: 0, bright: 0 } }],
        }),
      )
      .expect(422);
    expect(negative.body.fieldErrors[0].path).toBe('telescopes.0.availableHours.dark');
    const absent = await staff
      .post('/api/v1/semesters')
      .send(
        await anInput({
          telescopes: [
            {
              telescopeId: 'c0ffee00-0000-4000-8000-000000000000',
              availableHours: { dark: 1, grey: 0, bright: 0 },
            },
          ],
        }),
      )
      .expect(422);
    expect(absent.body.fieldErrors[0].path).toBe('telescopes.0.telescopeId');
  });

  it('share out the telescopes of one site', async () => {
    const here = await aTelescope(app);
    const elsewhere = await aTelescope(app, { siteId: (await aSite(app)).id });
    const availableHours = { dark: 1, grey: 1, bright: 1 };
    const { body } = await staff
      .post('/api/v1/semesters')
      .send(
        await anInput({
          telescopes: [here, elsewhere].map(({ id }) => ({ telescopeId: id, availableHours })),
        }),
      )
      .expect(422);
    expect(body.fieldErrors[0].path).toBe('telescopes');
  });

  it('have different names', async () => {
    await staff
      .post('/api/v1/semesters')
      .send(await anInput())
      .expect(201);
    const { body } = await staff
      .post('/api/v1/semesters')
      .send(await anInput())
      .expect(409);
    expect(body.code).toBe('already-exists');
  });

  it('need the version that is changed, and keep what a stale writer would overwrite', async () => {
    const semester = await aSemester(app);
    const path = `/api/v1/semesters/${semester.id}`;
    await staff.patch(path).send({ callText: 'x' }).expect(428);
    const changed = await staff.patch(path).set('If-Match', '"1"').send({ callText: 'First.' }).expect(200);
    expect(changed.headers['etag']).toBe('"2"');
    const stale = await staff.patch(path).set('If-Match', '"1"').send({ callText: 'Second.' }).expect(412);
    expect(stale.body.current).toMatchObject({ callText: 'First.', version: 2 });
    expect((await staff.get(path)).body.callText).toBe('First.');
  });

  it('say when reviews are due, and keep the date through a patch that does not mention it', async () => {
    const reviewsDueAt = '2030-06-01T12:00:00.000Z';
    const created = await staff
      .post('/api/v1/semesters')
      .send(await anInput({ reviewsDueAt }))
      .expect(201);
    expect(created.body.reviewsDueAt).toBe(reviewsDueAt);
    const path = `/api/v1/semesters/${created.body.semesterId}`;
    const kept = await staff.patch(path).set('If-Match', '"1"').send({ callText: 'Changed.' }).expect(200);
    expect(kept.body.reviewsDueAt).toBe(reviewsDueAt);
    const dropped = await staff.patch(path).set('If-Match', '"2"').send({ reviewsDueAt: null }).expect(200);
    expect(dropped.body.reviewsDueAt).toBeNull();
  });

  it('check a patch together with what is stored', async () => {
    const semester = await aSemester(app);
    const { body } = await staff
      .patch(`/api/v1/semesters/${semester.id}`)
      .set('If-Match', '"1"')
      .send({ endsOn: '2001-01-01' })
      .expect(422);
    expect(body.fieldErrors[0].path).toBe('endsOn');
  });

  it('fix their criteria once a review has begun', async () => {
    const semester = await aSemester(app);
    const panel = await aPanel(app, { semesterId: semester.id });
    const path = `/api/v1/semesters/${semester.id}`;
    const heavier = { criteria: [{ ...MERIT, weight: 5 }, METHOD] };
    await staff.patch(path).set('If-Match', '"1"').send(heavier).expect(200);
    await aReview(app, await aSubmittedProposal(app, panel), await aPanelMember(app, panel), 7);
    const { body } = await staff
      .patch(path)
      .set('If-Match', '"2"')
      .send({ criteria: [MERIT] })
      .expect(409);
    expect(body.code).toBe('wrong-state');
    const moved = await staff
      .patch(path)
      .set('If-Match', '"2"')
      .send({ deadlineAt: inDays(20).toISOString() })
      .expect(409);
    expect(moved.body.fieldErrors[0].path).toBe('deadlineAt');
    // The same criteria again are no change.
    await staff
      .patch(path)
      .set('If-Match', '"2"')
      .send({ ...heavier, callText: 'Still here.' })
      .expect(200);
  });

  it('keep their promise of anonymity once the call is open', async () => {
    const semester = await aSemester(app, { isAnonymised: true, deadlineAt: inDays(10) });
    const { body } = await staff
      .patch(`/api/v1/semesters/${semester.id}`)
      .set('If-Match', '"1"')
      .send({ isAnonymised: false })
      .expect(409);
    expect(body.code).toBe('wrong-state');
  });
});
