import { eq } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { modeConfigurations } from '../../../apps/api/src/database/schema/facilities.js';
import { changes } from '../../../apps/api/src/database/schema/history.js';
import { FacilitiesReadModel } from '../../../apps/api/src/modules/facilities/facilities.read-model.js';
import { aMode, IMAGING } from '../../factories/committee.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { type Agent, createTestApp, type TestApp } from '../support/app.js';

describe('facilities', () => {
  let app: TestApp;
  let staff: Agent;
  let anybody: Agent;

  beforeAll(async () => {
    app = await createTestApp();
    staff = await signedInAs(app, await aPerson(app, { isStaff: true, givenName: 'Sol', familyName: 'Staff' }));
    anybody = await signedInAs(app, await aPerson(app));
  });
  afterAll(() => app.close());

  it('shows telescopes with their instruments and modes to everybody', async () => {
    const { mode, instrument, telescope } = await aMode(app, { name: 'r band' });
    const { body } = await app.http().get('/api/v1/telescopes').expect(200);
    expect(body.observatoryName).toBe('Test Ridge Observatory');
    const row = body.rows.find((candidate: { telescopeId: string }) => candidate.telescopeId === telescope.id);
    expect(row.site.timeZone).toBe('America/Santiago');
    expect(row.instruments).toHaveLength(1);
    expect(row.instruments[0].instrumentId).toBe(instrument.id);
    expect(row.instruments[0].modes[0]).toMatchObject({
      modeId: mode.id,
      name: 'r band',
      configurationVersion: 1,
      configuration: { kind: 'imaging', throughput: 0.4 },
    });
  });

  it('adds a configuration, puts it in force, and keeps the old one as it was', async () => {
    const { mode } = await aMode(app);
    const { body } = await staff
      .post(`/api/v1/modes/${mode.id}/configurations`)
      .send({ configuration: { ...IMAGING, throughput: 0.35 }, note: 'Mirror not yet recoated.' })
      .expect(201);
    expect(body).toMatchObject({ version: 2, createdByName: 'Sol Staff', note: 'Mirror not yet recoated.' });
    const readModel = app.get(FacilitiesReadModel);
    expect((await readModel.findMode(mode.id))?.configuration.throughput).toBe(0.35);
    expect((await readModel.findMode(mode.id, 1))?.configuration.throughput).toBe(0.4);
    const history = await anybody.get(`/api/v1/modes/${mode.id}/configurations`).expect(200);
    expect(history.body.rows.map((row: { version: number }) => row.version)).toEqual([2, 1]);
  });

  it('records who changed which numbers of a mode', async () => {
    const { mode } = await aMode(app);
    await staff
      .post(`/api/v1/modes/${mode.id}/configurations`)
      .send({ configuration: { ...IMAGING, throughput: 0.3 }, note: '' })
      .expect(201);
    const [entry] = await app.db.select().from(changes).where(eq(changes.scopeId, mode.id));
    expect(entry?.details).toEqual({ throughput: { before: 0.4, after: 0.3 } });
  });

  it('refuses a configuration that contradicts itself, naming the field', async () => {
    const { mode } = await aMode(app);
    const { body } = await staff
      .post(`/api/v1/modes/${mode.id}/configurations`)
      .send({ configuration: { ...IMAGING, wavelengthHighNm: 500 }, note: '' })
      .expect(422);
    expect(body.fieldErrors).toEqual([
      { path: 'configuration.wavelengthHighNm', message: 'The upper wavelength must lie above the lower one.' },
    ]);
    const stored = await app.db.select().from(modeConfigurations).where(eq(modeConfigurations.modeId, mode.id));
    expect(stored).toHaveLength(1);
  });

  it('does not let an imaging mode become a spectrograph', async () => {
    const { mode } = await aMode(app);
    const { body } = await staff
      .post(`/api/v1/modes/${mode.id}/configurations`)
      .send({
        configuration: {
          ...IMAGING,
          kind: 'slitSpectroscopy',
          resolvingPower: 1500,
          slitWidthArcsec: 1,
          pixelsPerResolutionElement: 4,
          extractionLengthFwhm: 2,
        },
        note: '',
      })
      .expect(422);
    expect(body.fieldErrors[0].path).toBe('configuration.kind');
  });

  it('lets nobody but staff change a mode', async () => {
    const { mode } = await aMode(app);
    const { body } = await anybody
      .post(`/api/v1/modes/${mode.id}/configurations`)
      .send({ configuration: IMAGING, note: '' })
      .expect(403);
    expect(body.code).toBe('forbidden');
  });

  it('gives every one of several simultaneous versions its own number', async () => {
    const { mode } = await aMode(app);
    const answers = await Promise.all(
      [0.31, 0.32, 0.33].map((throughput) =>
        staff
          .post(`/api/v1/modes/${mode.id}/configurations`)
          .send({ configuration: { ...IMAGING, throughput }, note: '' })
          .expect(201),
      ),
    );
    expect(answers.map(({ body }) => body.version).sort()).toEqual([2, 3, 4]);
  });

  it('reads many modes at once, in force or of a named version, and leaves out what does not exist', async () => {
    const first = await aMode(app);
    const second = await aMode(app);
    await staff
      .post(`/api/v1/modes/${first.mode.id}/configurations`)
      .send({ configuration: { ...IMAGING, throughput: 0.2 }, note: '' })
      .expect(201);
    const setups = await app
      .get(FacilitiesReadModel)
      .listModes([
        { modeId: first.mode.id, configurationVersion: 1 },
        { modeId: first.mode.id },
        { modeId: second.mode.id },
        { modeId: second.mode.id, configurationVersion: 9 },
      ]);
    expect(setups.map((setup) => [setup.modeId, setup.configurationVersion, setup.configuration.throughput])).toEqual(
      expect.arrayContaining([
        [first.mode.id, 1, 0.4],
        [first.mode.id, 2, 0.2],
        [second.mode.id, 1, 0.4],
      ]),
    );
    expect(setups).toHaveLength(3);
  });

  it('answers not-found for a mode that does not exist', async () => {
    await anybody.get('/api/v1/modes/c0ffee00-0000-4000-8000-000000000000/configurations').expect(404);
    await anybody.get('/api/v1/modes/not-an-id/configurations').expect(404);
  });
});
