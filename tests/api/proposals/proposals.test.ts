import { eq, sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { changes } from '../../../apps/api/src/database/schema/history.js';
import { proposals } from '../../../apps/api/src/database/schema/proposals.js';
import { semesters } from '../../../apps/api/src/database/schema/semesters.js';
import { countWords } from '../../../apps/api/src/modules/proposals/case-sections.js';
import { aPanel, inDays } from '../../factories/committee.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aDraft, anOpenSemester, aReadyDraft, aTarget, aTeamMember, planAll } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const closeCall = (semesterId: string, deadlineAt: Date) =>
  app.db.update(semesters).set({ deadlineAt }).where(eq(semesters.id, semesterId));

describe('a new proposal', () => {
  it('gets the label of its semester’s prefix and the next number, also when many begin at once', async () => {
    const semester = await anOpenSemester(app, { labelPrefix: '27B' });
    const agent = await signedInAs(app, await aPerson(app));
    const answers = await Promise.all(
      Array.from({ length: 8 }, () => agent.post('/api/v1/proposals').send({ semesterId: semester.id, title: 'T' })),
    );
    expect(answers.map(({ status }) => status)).toEqual(new Array(8).fill(201));
    expect(answers.map(({ body }) => body.label).sort()).toEqual(
      [1, 2, 3, 4, 5, 6, 7, 8].map((number) => `27B-00${number}`),
    );
  });

  it('begins only while a call is open', async () => {
    const agent = await signedInAs(app, await aPerson(app));
    const past = await anOpenSemester(app, { deadlineAt: inDays(-1) });
    const coming = await anOpenSemester(app, { callOpensAt: inDays(3) });
    const start = (semesterId: string) => agent.post('/api/v1/proposals').send({ semesterId, title: 'T' });
    expect((await start(past.id).expect(409)).body.code).toBe('deadline-passed');
    expect((await start(coming.id).expect(409)).body.code).toBe('wrong-state');
    expect((await start('3f0d4c5e-8a35-4c1b-9d5c-0f1a2b3c4d5e').expect(422)).body.fieldErrors[0].path).toBe(
      'semesterId',
    );
    await app.http().post('/api/v1/proposals').send({ semesterId: past.id, title: 'T' }).expect(401);
  });

  it('says section by section what it lacks', async () => {
    const draft = await aDraft(app);
    const sections = async () =>
      Object.fromEntries(
        (await draft.pi.get(draft.base).expect(200)).body.sections.map((each: { section: string; summary: string }) => [
          each.section,
          each.summary,
        ]),
      );
    expect(await sections()).toMatchObject({
      targets: 'no targets yet',
      case: 'Scientific case and Technical case empty',
      team: '1 person',
      submit: '2 to settle',
    });
    await aTarget(draft);
    await planAll(app, draft);
    expect(await sections()).toMatchObject({ targets: '1 target', exposures: '1 observation' });
  });
});

describe('changing a proposal', () => {
  it('needs its version and answers a stale writer with what is stored', async () => {
    const draft = await aDraft(app);
    await draft.pi.patch(draft.base).send({ title: 'B' }).expect(428);
    await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ title: 'B' }).expect(200);
    const { body } = await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ title: 'C' }).expect(412);
    expect(body.current).toMatchObject({ title: 'B', version: 2 });
  });

  it('to another cosmology computes all targets and observations again', async () => {
    const draft = await aDraft(app);
    await aTarget(draft, { light: { kind: 'absoluteMagnitude', magnitude: -23 } });
    await planAll(app, draft);
    const [before] = (await draft.pi.get(`${draft.base}/targets`).expect(200)).body.rows;
    await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ cosmology: 'conv70' }).expect(200);
    const [after] = (await draft.pi.get(`${draft.base}/targets`).expect(200)).body.rows;
    const [observation] = (await draft.pi.get(`${draft.base}/observations`).expect(200)).body.rows;
    expect(after.computed.cosmologyId).toBe('conv70');
    expect(observation.estimate.cosmologyId).toBe('conv70');
    const { body } = await app
      .http()
      .post('/api/v1/distances')
      .send({ cosmology: 'conv70', redshifts: [3] })
      .expect(200);
    expect(after.computed.luminosityDistanceMpc).toBe(body.rows[0].luminosityDistanceMpc);
    expect(after.computed.luminosityDistanceMpc).not.toBe(before.computed.luminosityDistanceMpc);
    expect(after.requestedSeconds).not.toBe(before.requestedSeconds);
  });

  it.each([
    [{ hubbleConstantKmSMpc: 70, omegaMatter: 0.1, omegaDarkEnergy: 3 }, 'cosmology.omegaDarkEnergy'],
    [{ hubbleConstantKmSMpc: 70, omegaMatter: 0, omegaDarkEnergy: 1 }, 'cosmology'],
  ])('refuses the cosmology %j, in which sources have no distance or age', async (cosmology, path) => {
    const draft = await aDraft(app);
    const { body } = await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ cosmology }).expect(422);
    expect(body.fieldErrors[0].path).toBe(path);
  });

  it('refuses a panel of another semester', async () => {
    const draft = await aDraft(app);
    const own = await aPanel(app, { semesterId: draft.semesterId });
    const other = await aPanel(app);
    const send = (panelId: string) => draft.pi.patch(draft.base).set('If-Match', '"1"').send({ panelId });
    expect((await send(other.id).expect(422)).body.fieldErrors[0].path).toBe('panelId');
    await send(own.id).expect(200);
    const { body } = await draft.pi.get(`${draft.base}/choices`).expect(200);
    expect(body.panels).toEqual([{ panelId: own.id, name: own.name }]);
  });

  it('ends with the deadline, but for a request that was on its way', async () => {
    const draft = await aDraft(app);
    const target = await aTarget(draft);
    await closeCall(draft.semesterId, new Date(Date.now() - 5000));
    await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ title: 'Just in time' }).expect(200);
    await closeCall(draft.semesterId, new Date(Date.now() - 60_000));
    const { body } = await draft.pi.patch(draft.base).set('If-Match', '"2"').send({ title: 'Too late' }).expect(409);
    expect(body.code).toBe('deadline-passed');
    const url = `${draft.base}/targets/${target.targetId}`;
    expect((await draft.pi.patch(url).set('If-Match', '"1"').send({ redshift: 1 }).expect(409)).body.code).toBe(
      'deadline-passed',
    );
    const { body: shown } = await draft.pi.get(draft.base).expect(200);
    expect(shown.title).toBe('Just in time');
    expect(shown.abilities).toMatchObject({ canEditTargets: false, canEditEverything: false, canSubmit: false });
  });

  it.each(['withdrawn', 'awarded', 'declined'] as const)('is not possible once it is %s', async (state) => {
    const draft = await aDraft(app);
    await app.db.update(proposals).set({ state }).where(eq(proposals.id, draft.proposalId));
    const { body } = await draft.pi.patch(draft.base).set('If-Match', '"1"').send({ title: 'T' }).expect(409);
    expect(body.code).toBe('wrong-state');
  });
});

describe('deleting a draft', () => {
  it('takes it away from the whole team and keeps its number', async () => {
    const draft = await aDraft(app);
    const member = await aTeamMember(app, draft, 'editsEverything');
    await member.agent.delete(draft.base).set('If-Match', '"1"').expect(403);
    await draft.pi.delete(draft.base).set('If-Match', '"1"').expect(204);
    await draft.pi.get(draft.base).expect(404);
    await member.agent.get(draft.base).expect(404);
    const next = await aDraft(app, { semesterId: draft.semesterId });
    expect((await next.pi.get(next.base).expect(200)).body.label).toMatch(/-002$/);
  });

  it('is not possible for a submitted one', async () => {
    const draft = await aReadyDraft(app);
    await draft.pi.post(`${draft.base}/submissions`).expect(201);
    const { body } = await draft.pi.get(draft.base).expect(200);
    await draft.pi.delete(draft.base).set('If-Match', `"${body.version}"`).expect(409);
  });
});

describe('the list of proposals', () => {
  it('holds those of one’s own teams and no others', async () => {
    const draft = await aDraft(app);
    await aDraft(app);
    const member = await aTeamMember(app, draft, 'reads');
    const { body } = await member.agent.get('/api/v1/proposals').expect(200);
    expect(body.rows).toHaveLength(1);
    expect(body.rows[0]).toMatchObject({
      proposalId: draft.proposalId,
      myAccess: 'reads',
      isPrincipal: false,
      state: 'draft',
      latestChange: { summary: 'created the proposal' },
    });
    const staff = await signedInAs(app, await aPerson(app, { isStaff: true, isAdministrator: true }));
    expect((await staff.get('/api/v1/proposals').expect(200)).body.rowCount).toBe(0);
  });

  it('shows a submitted proposal as in review once the deadline has passed, and finds it so', async () => {
    const draft = await aReadyDraft(app);
    await draft.pi.post(`${draft.base}/submissions`).expect(201);
    const states = async (state: string) =>
      (await draft.pi.get(`/api/v1/proposals?state=${state}`).expect(200)).body.rows.map(
        ({ state: shown }: { state: string }) => shown,
      );
    expect(await states('submitted')).toEqual(['submitted']);
    await closeCall(draft.semesterId, inDays(-1));
    expect(await states('submitted')).toEqual([]);
    expect(await states('inReview')).toEqual(['inReview']);
  });
});

describe('the case', () => {
  it('has a version before its first word, and lets only one of two first writers through', async () => {
    const draft = await aDraft(app);
    const { body: list } = await draft.pi.get(`${draft.base}/case`).expect(200);
    expect(
      list.rows.map(({ sectionId, isRequired, wordLimit, version }: Record<string, unknown>) => [
        sectionId,
        isRequired,
        wordLimit,
        version,
      ]),
    ).toEqual([
      ['science', true, 1000, 1],
      ['technical', true, 600, 1],
      ['background', false, 600, 1],
    ]);
    const save = (body: string, version: number) =>
      draft.pi.put(`${draft.base}/case/science`).set('If-Match', `"${version}"`).send({ body });
    const { body: saved } = await save('Three little words', 1).expect(200);
    expect(saved).toMatchObject({ wordCount: 3, version: 2 });
    expect((await save('Other words', 1).expect(412)).body.current.body).toBe('Three little words');
    await save('', 2).expect(200);
    await draft.pi.put(`${draft.base}/case/poetry`).set('If-Match', '"1"').send({ body: 'x' }).expect(404);
  });

  it('keeps one person’s saves of a section within ten minutes as one change, with the text that was there first', async () => {
    const draft = await aDraft(app);
    const { agent: other } = await aTeamMember(app, draft, 'editsEverything');
    let version = 1;
    const save = async (agent: typeof other, body: string, sectionId = 'science') => {
      const isScience = sectionId === 'science';
      await agent
        .put(`${draft.base}/case/${sectionId}`)
        .set('If-Match', `"${isScience ? version : 1}"`)
        .send({ body })
        .expect(200);
      if (isScience) version += 1;
    };
    const bodies = async () => {
      const { body } = await draft.pi.get(`${draft.base}/history?pageSize=50`).expect(200);
      return (body.rows as { subject: string; subjectName: string; changes: { field: string }[] }[])
        .filter(({ subject }) => subject === 'caseSection')
        .map(({ subjectName, changes }) => ({ subjectName, ...changes.find(({ field }) => field === 'body') }))
        .reverse();
    };
    await save(draft.pi, 'One');
    await save(draft.pi, 'Other section', 'technical');
    await save(draft.pi, 'One two');
    await save(draft.pi, 'One two three');
    expect(await bodies()).toMatchObject([
      { subjectName: 'Scientific case', before: '', after: 'One two three' },
      { subjectName: 'Technical case', before: '', after: 'Other section' },
    ]);
    await save(other, 'One two three four');
    await save(draft.pi, 'Five');
    expect((await bodies()).slice(2)).toMatchObject([
      { before: 'One two three', after: 'One two three four' },
      { before: 'One two three four', after: 'Five' },
    ]);
    // An hour later it is another change.
    await app.db
      .update(changes)
      .set({ at: sql`${changes.at} - interval '1 hour'` })
      .where(eq(changes.scopeId, draft.proposalId));
    await save(draft.pi, 'Six');
    expect((await bodies()).at(-1)).toMatchObject({ before: 'Five', after: 'Six' });
  });

  it('narrows to what became of one thing', async () => {
    const draft = await aDraft(app);
    const [one, other] = [await aTarget(draft, { name: 'One' }), await aTarget(draft, { name: 'Other' })];
    await draft.pi
      .patch(`${draft.base}/targets/${one.targetId}`)
      .set('If-Match', `"${one.version}"`)
      .send({ redshift: 3.2 })
      .expect(200);
    const of = async (query: string) => (await draft.pi.get(`${draft.base}/history?${query}`).expect(200)).body;
    expect(await of(`subjectId=${one.targetId}&pageSize=1`)).toMatchObject({
      rowCount: 2,
      rows: [{ subjectName: 'One', action: 'changed', changes: [{ field: 'redshift', before: 3, after: 3.2 }] }],
    });
    expect((await of(`subjectId=${other.targetId}`)).rows).toMatchObject([{ subjectName: 'Other', action: 'created' }]);
    expect((await of('')).rowCount).toBeGreaterThanOrEqual(3);
    // Of another proposal nothing is told, whatever is asked for.
    const elsewhere = await aDraft(app);
    const { body } = await elsewhere.pi.get(`${elsewhere.base}/history?subjectId=${one.targetId}`).expect(200);
    expect(body).toMatchObject({ rows: [], rowCount: 0 });
    await draft.pi.get(`${draft.base}/history?subjectId=one`).expect(422);
  });

  it('begins another change after a submission', async () => {
    const ready = await aReadyDraft(app);
    await ready.pi.post(`${ready.base}/submissions`).expect(201);
    await ready.pi
      .put(`${ready.base}/case/science`)
      .set('If-Match', '"2"')
      .send({ body: 'Because of darkness.' })
      .expect(200);
    const { body } = await ready.pi.get(`${ready.base}/history?pageSize=50`).expect(200);
    const section = (body.rows as { subjectName: string }[]).filter(
      ({ subjectName }) => subjectName === 'Scientific case',
    );
    expect(section).toHaveLength(2);
  });

  it('counts words as people do', () => {
    expect(countWords('')).toBe(0);
    expect(countWords('  one\n two\tthree — four  ')).toBe(4);
    expect(countWords('z ≈ 7.1')).toBe(2);
  });
});

describe('a change of the cosmology', () => {
  it('takes up what others change while it computes: every number is of one cosmology', async () => {
    const draft = await aDraft(app);
    const targets = [];
    for (let index = 0; index < 8; index += 1) {
      targets.push(await aTarget(draft, { name: `T${index}`, rightAscensionDeg: 10 * index }));
    }
    await planAll(app, draft);
    const { body: before } = await draft.pi.get(draft.base).expect(200);
    const [changed, ...edits] = await Promise.all([
      draft.pi.patch(draft.base).set('If-Match', `"${before.version}"`).send({ cosmology: 'wmap9' }),
      ...targets.map(({ targetId, version }, index) =>
        draft.pi
          .patch(`${draft.base}/targets/${targetId}`)
          .set('If-Match', `"${version}"`)
          .send({ redshift: 4 + index / 10 }),
      ),
      draft.pi.post(`${draft.base}/targets/import`).send({ text: 'name,ra,dec,z,brightness\nNew,200,-30,2,22 AB (r)' }),
    ]);
    expect(changed?.status).toBe(200);
    // An edit that came after the change of all rows is told so.
    expect(edits.filter(({ status }) => status !== 200 && status !== 412)).toEqual([]);
    const { body: list } = await draft.pi.get(`${draft.base}/targets`).expect(200);
    const redshifts = list.rows.map(({ redshift }: { redshift: number }) => redshift);
    const { body: distances } = await draft.pi
      .post('/api/v1/distances')
      .send({ cosmology: 'wmap9', redshifts })
      .expect(200);
    expect(
      list.rows.map(({ computed }: { computed: { luminosityDistanceMpc: number } }) => computed.luminosityDistanceMpc),
    ).toEqual(distances.rows.map((row: { luminosityDistanceMpc: number }) => row.luminosityDistanceMpc));
    const { body: observations } = await draft.pi.get(`${draft.base}/observations`).expect(200);
    expect(
      observations.rows.map(({ estimate }: { estimate: { cosmologyId: string } }) => estimate.cosmologyId),
    ).toEqual(new Array(targets.length).fill('wmap9'));
  });
});

describe('going around the screens', () => {
  it.each([
    ['an outsider', {}],
    ['staff', { isStaff: true }],
    ['an administrator', { isAdministrator: true }],
  ])('%s finds a draft absent, on every route', async (_, roles) => {
    const draft = await aDraft(app);
    const agent = await signedInAs(app, await aPerson(app, roles));
    for (const path of ['', '/choices', '/case', '/history', '/checks', '/submissions', '/members']) {
      expect([path, (await agent.get(`${draft.base}${path}`)).status]).toEqual([path, 404]);
    }
    await agent.patch(draft.base).set('If-Match', '"1"').send({ title: 'Mine' }).expect(404);
    await agent.delete(draft.base).set('If-Match', '"1"').expect(404);
    await agent.put(`${draft.base}/case/science`).set('If-Match', '"1"').send({ body: 'Mine' }).expect(404);
    await agent.post(`${draft.base}/submissions`).expect(404);
    await agent.post(`${draft.base}/withdrawal`).expect(404);
    await agent.post(`${draft.base}/members/me/signature`).expect(404);
    expect((await draft.pi.get(draft.base).expect(200)).body.version).toBe(1);
  });
});
