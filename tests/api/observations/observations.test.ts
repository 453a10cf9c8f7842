import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { ModeConfiguration } from '@faintward/contracts/facilities';
import { aMode, IMAGING } from '../../factories/committee.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aDraft, aTarget, CONDITIONS, GOAL } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

const SPECTRA: ModeConfiguration = {
  ...IMAGING,
  kind: 'slitSpectroscopy',
  label: 'red',
  resolvingPower: 2000,
  slitWidthArcsec: 1,
  pixelsPerResolutionElement: 3,
  extractionLengthFwhm: 2,
};

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

describe('a setup applied to targets', () => {
  it('gives each the estimate that the calculator gives', async () => {
    const draft = await aDraft(app);
    const target = await aTarget(draft);
    const { mode } = await aMode(app);
    const { body } = await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all', repeatCount: 3 })
      .expect(200);
    expect(body).toMatchObject({
      createdCount: 1,
      replacedCount: 0,
      feasibleCount: 1,
      infeasibleCount: 0,
      lackingCount: 0,
    });
    const { body: page } = await draft.pi.get(`${draft.base}/observations`).expect(200);
    const [observation] = page.rows;
    const { body: estimate } = await app
      .http()
      .post('/api/v1/estimates')
      .send({
        target: { redshift: target['redshift'], light: target['light'] },
        setup: { modeId: mode.id },
        goal: GOAL,
        conditions: CONDITIONS,
      })
      .expect(200);
    expect(observation.estimate).toEqual(estimate);
    expect(observation.totalSeconds).toBe(3 * estimate.totalSeconds);
    expect(body.totalSeconds).toBe(observation.totalSeconds);
    expect(observation.configurationVersion).toBe(1);
  });

  it('replaces what a target has with this mode, or adds to it when told', async () => {
    const draft = await aDraft(app);
    await aTarget(draft);
    const { mode } = await aMode(app);
    const apply = (more: object) =>
      draft.pi
        .post(`${draft.base}/observations/apply`)
        .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all', ...more })
        .expect(200);
    await apply({});
    expect((await apply({})).body.replacedCount).toBe(1);
    await apply({ replaceSameMode: false });
    const { body } = await draft.pi.get(`${draft.base}/observations`).expect(200);
    expect(body.rowCount).toBe(2);
  });

  it('says for a target without brightness, and for one that a goal does not fit, why there is no time', async () => {
    const draft = await aDraft(app);
    await aTarget(draft, { name: 'Dark', light: null });
    await aTarget(draft, { name: 'Continuum' });
    const { mode } = await aMode(app);
    const { body } = await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal: { kind: 'lineSignificance', sigma: 5 }, conditions: CONDITIONS, targetIds: 'all' })
      .expect(200);
    expect(body).toMatchObject({ lackingCount: 2, totalSeconds: 0 });
    const { body: page } = await draft.pi.get(`${draft.base}/observations`).expect(200);
    expect(page.rows[0].lacking).toMatch(/no brightness/);
    expect(page.rows[1].lacking).toMatch(/line/);
  });

  it.each([
    [IMAGING, { kind: 'signalToNoise', value: 5, per: 'resolutionElement' }, 'goal.per'],
    [IMAGING, { kind: 'signalToNoise', value: 5, per: 'aperture', exposureSeconds: 5000 }, 'goal.exposureSeconds'],
    [IMAGING, { kind: 'signalToNoise', value: 1e300, per: 'aperture' }, 'goal.value'],
    [
      { ...IMAGING, skySubtraction: { kind: 'ditheredFrames' } } satisfies ModeConfiguration,
      { kind: 'exposureTime', exposureSeconds: 60, exposureCount: 2 },
      'goal.exposureCount',
    ],
  ] as const)('refuses a goal that the mode cannot have', async (configuration, goal, path) => {
    const draft = await aDraft(app);
    await aTarget(draft);
    const { mode } = await aMode(app, { configuration });
    const { body } = await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal, conditions: CONDITIONS, targetIds: 'all' })
      .expect(422);
    expect(body.fieldErrors.map((error: { path: string }) => error.path)).toEqual([path]);
    expect((await draft.pi.get(`${draft.base}/observations`).expect(200)).body.rowCount).toBe(0);
  });

  it('takes a ratio per resolution element for a spectrum', async () => {
    const draft = await aDraft(app);
    await aTarget(draft);
    const { mode } = await aMode(app, { configuration: SPECTRA });
    const { body } = await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({
        modeId: mode.id,
        goal: { kind: 'signalToNoise', value: 5, per: 'resolutionElement' },
        conditions: CONDITIONS,
        targetIds: 'all',
      })
      .expect(200);
    expect(body.feasibleCount).toBe(1);
  });

  it('names targets that are not in the list, and modes that are not there', async () => {
    const draft = await aDraft(app);
    const target = await aTarget(draft);
    const { mode } = await aMode(app);
    const absent = '3f0d4c5e-8a35-4c1b-9d5c-0f1a2b3c4d5e';
    const send = (body: object) =>
      draft.pi
        .post(`${draft.base}/observations/apply`)
        .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, ...body });
    expect((await send({ targetIds: [target.targetId, absent] }).expect(422)).body.fieldErrors[0].path).toBe(
      'targetIds.1',
    );
    expect((await send({ targetIds: 'all', modeId: absent }).expect(422)).body.fieldErrors[0].path).toBe('modeId');
  });

  it('reaches five thousand targets in one request', async () => {
    const draft = await aDraft(app);
    const rows = Array.from(
      { length: 5000 },
      (_, index) => `T${index},${(index * 0.07).toFixed(4)},-30,${1 + (index % 50) / 10},20`,
    );
    await draft.pi
      .post(`${draft.base}/targets/import`)
      .send({ text: `name,ra,dec,z,mag\n${rows.join('\n')}` })
      .expect(200);
    const { mode } = await aMode(app);
    const { body } = await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all' })
      .expect(200);
    expect(body.createdCount).toBe(5000);
    expect(body.feasibleCount + body.infeasibleCount).toBe(5000);
    const { body: request } = await draft.pi.get(`${draft.base}/time-request`).expect(200);
    expect(request.rows[0].observationCount).toBe(5000);
    expect(Math.abs(request.totalHours * 3600 - body.totalSeconds)).toBeLessThan(1e-6 * body.totalSeconds);
  });
});

describe('an observation', () => {
  it('answers a changed goal with its new estimate and version; a stale writer gets what is stored', async () => {
    const draft = await aDraft(app);
    await aTarget(draft);
    const { mode } = await aMode(app);
    await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all' })
      .expect(200);
    const [before] = (await draft.pi.get(`${draft.base}/observations`).expect(200)).body.rows;
    const url = `${draft.base}/observations/${before.observationId}`;
    const answer = await draft.pi
      .patch(url)
      .set('If-Match', '"1"')
      .send({ goal: { ...GOAL, value: 40 }, repeatCount: 2 })
      .expect(200);
    expect(answer.headers['etag']).toBe('"2"');
    expect(answer.body.totalSeconds).toBeGreaterThan(2 * before.totalSeconds);
    const stale = await draft.pi.patch(url).set('If-Match', '"1"').send({ repeatCount: 5 }).expect(412);
    expect(stale.body.current).toMatchObject({ repeatCount: 2, version: 2 });
    const { body: removed } = await draft.pi
      .post(`${draft.base}/observations/removal`)
      .send({ observationIds: [before.observationId] })
      .expect(200);
    expect(removed.removedCount).toBe(1);
  });

  it.each([
    ['an outsider', {}],
    ['staff', { isStaff: true }],
    ['an administrator', { isAdministrator: true }],
  ])('is absent for %s, on every route', async (_, roles) => {
    const draft = await aDraft(app);
    await aTarget(draft);
    const { mode } = await aMode(app);
    const apply = { modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: 'all' };
    await draft.pi.post(`${draft.base}/observations/apply`).send(apply).expect(200);
    const [observation] = (await draft.pi.get(`${draft.base}/observations`).expect(200)).body.rows;
    const agent = await signedInAs(app, await aPerson(app, roles));
    await agent.get(`${draft.base}/observations`).expect(404);
    await agent.get(`${draft.base}/time-request`).expect(404);
    await agent.post(`${draft.base}/observations/apply`).send(apply).expect(404);
    await agent
      .post(`${draft.base}/observations/removal`)
      .send({ observationIds: [observation.observationId] })
      .expect(404);
    await agent
      .patch(`${draft.base}/observations/${observation.observationId}`)
      .set('If-Match', '"1"')
      .send({ repeatCount: 2 })
      .expect(404);
    expect((await draft.pi.get(`${draft.base}/observations`).expect(200)).body.rowCount).toBe(1);
  });
});
