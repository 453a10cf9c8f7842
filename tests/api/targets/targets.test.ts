import { Light } from '@faintward/contracts/light';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aMode } from '../../factories/committee.js';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aDraft, aTarget, aTeamMember, CONDITIONS, type Draft, GOAL } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
let draft: Draft;
beforeAll(async () => {
  app = await createTestApp();
  draft = await aDraft(app);
});
afterAll(() => app.close());

const patch = (target: { targetId: string; version: number }, body: object) =>
  draft.pi.patch(`${draft.base}/targets/${target.targetId}`).set('If-Match', `"${target.version}"`).send(body);

describe('a target', () => {
  it('is made of texts as typed, in any usual notation', async () => {
    const { body } = await draft.pi
      .post(`${draft.base}/targets`)
      .send({
        cells: {
          name: 'BR J0355-3811',
          rightAscension: '03h55m04.9s',
          declination: '-38d11m42s',
          redshift: '4.545',
          brightness: '17.95 mag',
        },
      })
      .expect(201);
    expect(body.rightAscensionDeg).toBeCloseTo(15 * (3 + 55 / 60 + 4.9 / 3600), 10);
    expect(body.declinationDeg).toBeCloseTo(-(38 + 11 / 60 + 42 / 3600), 10);
    expect(body.light).toMatchObject({ kind: 'apparentMagnitude', magnitude: 17.95, system: 'AB', bandId: 'V' });
    expect(body.brightnessText).toBe('17.95 AB (V)');
    expect(body.computed.cosmologyId).toBe('planck18');
    expect(body.computed.inputHash).toMatch(/^[0-9a-f]{64}$/);
    expect(body.computed.upHoursByMonth.length).toBeGreaterThanOrEqual(6);
  });

  it.each([
    ['redshift', 'abc', /not a number/],
    ['redshift', '-1', /below 0/],
    ['redshift', '1e9', /up to 30/],
    ['redshift', '7,12', /decimal point/],
    ['redshift', '', /needed/],
    ['redshift', 'NaN', /finite/],
    ['redshiftUncertainty', '-0.1', /\+0\.05 -0\.03/],
    ['redshiftUncertainty', '+0.1 -3', /not below the redshift/],
    ['redshiftUncertainty', 'p(z), 2 peaks', /upload/],
    ['rightAscension', '25:00:00', /24 hours/],
    ['rightAscension', '12:60:00', /./],
    ['declination', '+91', /pole/],
    ['declination', '12h00m', /degrees/],
    ['brightness', '24 parsecs', /./],
    ['brightness', '99999', /./],
    ['brightness', '23 Vega (g)', /AB/],
    ['brightness', '=1+1', /./],
    ['name', '', /needed/],
    ['name', 'a\u0000b', /[Cc]ontrol/],
  ])('refuses %s "%s" at its cell and stores nothing', async (cell, text, message) => {
    const target = await aTarget(draft);
    const { body } = await patch(target, { cells: { [cell]: text, notes: 'not to be stored' } }).expect(422);
    expect(body.code).toBe('validation-failed');
    expect(body.fieldErrors).toHaveLength(1);
    expect(body.fieldErrors[0].path).toBe(`cells.${cell}`);
    expect(body.fieldErrors[0].message).toMatch(message);
    const { body: after } = await draft.pi.get(`${draft.base}/targets/${target.targetId}`).expect(200);
    expect(after).toEqual(target);
  });

  it('names every bad cell at once', async () => {
    const { body } = await draft.pi
      .post(`${draft.base}/targets`)
      .send({ cells: { name: 'X', rightAscension: 'x', declination: 'y', redshift: 'z' } })
      .expect(422);
    expect(body.fieldErrors.map(({ path }: { path: string }) => path).sort()).toEqual([
      'cells.declination',
      'cells.redshift',
      'cells.rightAscension',
    ]);
  });

  it.each([
    ['24.1', { kind: 'apparentMagnitude', magnitude: 24.1, system: 'AB', bandId: 'r' }],
    ['24.1 J', { kind: 'apparentMagnitude', magnitude: 24.1, system: 'AB', bandId: 'J' }],
    ['22.30 Vega (J)', { kind: 'apparentMagnitude', magnitude: 22.3, system: 'Vega', bandId: 'J' }],
    ['3.631 uJy', { kind: 'apparentMagnitude', system: 'AB', bandId: 'r' }],
    ['M -21.5 (150 nm)', { kind: 'absoluteMagnitude', magnitude: -21.5, restWavelengthNm: 150 }],
    ['M -21.3 Vega (B)', { kind: 'absoluteMagnitude', magnitude: -21.3, system: 'Vega', restBandId: 'B' }],
    ['8 Msun/yr', { kind: 'starFormationRate', solarMassesPerYear: 8, tracer: 'ultraviolet' }],
    ['typical galaxy', { kind: 'typical', of: 'starFormingGalaxy' }],
    ['typical supernova Ia', { kind: 'typical', of: 'supernovaIa', spectrum: { kind: 'supernovaIa' } }],
    ['2e-17 erg/s/cm^2', { kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567 }],
    ['1e42 erg/s (656.46 nm)', { kind: 'lineLuminosity', luminosityErgS: 1e42, restWavelengthNm: 656.46 }],
    ['', null],
  ])('reads the brightness "%s"', async (text, light) => {
    const target = await aTarget(draft);
    const { body } = await patch(target, { cells: { brightness: text } }).expect(200);
    if (light === null) expect(body.light).toBeNull();
    else expect(body.light).toMatchObject(light);
    // What the grid shows goes back in as it was.
    const { body: again } = await patch(body, { cells: { brightness: body.brightnessText } }).expect(200);
    expect(again.light).toEqual(body.light);
  });

  it('answers a changed redshift with recomputed columns, a new version and its ETag, and recomputes its observations', async () => {
    const target = await aTarget(draft, { light: { kind: 'absoluteMagnitude', magnitude: -23 } });
    const { mode } = await aMode(app);
    await draft.pi
      .post(`${draft.base}/observations/apply`)
      .send({ modeId: mode.id, goal: GOAL, conditions: CONDITIONS, targetIds: [target.targetId] })
      .expect(200);
    const before = (await draft.pi.get(`${draft.base}/targets/${target.targetId}`).expect(200)).body;
    const answer = await patch(before, { cells: { redshift: '3.5' } }).expect(200);
    expect(answer.headers['etag']).toBe(`"${before.version + 1}"`);
    expect(answer.body.redshift).toBe(3.5);
    expect(answer.body.computed.luminosityDistanceMpc).toBeGreaterThan(before.computed.luminosityDistanceMpc);
    expect(answer.body.requestedSeconds).toBeGreaterThan(before.requestedSeconds);
    const { body: history } = await draft.pi.get(`${draft.base}/history`).expect(200);
    expect(history.rows[0]).toMatchObject({
      subject: 'target',
      action: 'changed',
      changes: [{ field: 'redshift', before: 3, after: 3.5 }],
    });
  });

  it('keeps what a cell cannot say of its light', async () => {
    const light = Light.parse({
      kind: 'apparentMagnitude',
      magnitude: 22,
      bandId: 'J',
      spectrum: { kind: 'quasar' },
      galacticDust: { colourExcessMag: 0.1 },
      magnification: 4,
      sigmaMag: 0.1,
    });
    const target = await aTarget(draft, { light });
    const { body } = await patch(target, { cells: { brightness: '21.5' } }).expect(200);
    expect(body.light).toEqual({ ...light, magnitude: 21.5 });
  });

  it('takes the uncertainty of its redshift from a cell, around the redshift that comes with it', async () => {
    const target = await aTarget(draft, { redshiftKind: 'photometric' });
    expect(target).toMatchObject({
      redshiftUncertainty: null,
      redshiftUncertaintyText: '',
      redshiftKind: 'photometric',
    });
    const { body } = await patch(target, { cells: { redshift: '7.1', redshiftUncertainty: '+0.05 -0.03' } }).expect(
      200,
    );
    expect(body.redshiftUncertainty).toEqual({ kind: 'percentiles', p16: 7.07, p50: 7.1, p84: 7.15 });
    expect(body.redshiftUncertaintyText).toBe('+0.05 −0.03');
    const { body: moved } = await patch(body, { cells: { redshift: '6.5' } }).expect(200);
    expect(moved.redshiftUncertainty).toEqual({ kind: 'percentiles', p16: 6.47, p50: 6.5, p84: 6.55 });
    const table = { kind: 'table', redshifts: [1, 1.5, 2, 6, 6.5, 7], densities: [0, 1, 0, 0, 4, 0] };
    const { body: two } = await patch(moved, { redshiftUncertainty: table }).expect(200);
    expect(two.redshiftUncertaintyText).toBe('p(z), 2 peaks');
    const { body: kept } = await patch(two, {
      cells: { redshiftUncertainty: 'p(z), 2 peaks', notes: 'Two solutions.' },
    }).expect(200);
    expect(kept.redshiftUncertainty).toEqual(table);
    const { body: cleared } = await patch(kept, { cells: { redshiftUncertainty: '' } }).expect(200);
    expect(cleared.redshiftUncertainty).toBeNull();
  });

  it('cannot have percentiles that nothing can be drawn from', async () => {
    const target = await aTarget(draft);
    const percentiles = { kind: 'percentiles', p16: 0, p50: 1, p84: 2 };
    const { body } = await patch(target, { redshiftUncertainty: percentiles }).expect(422);
    expect(body.fieldErrors[0].path).toBe('redshiftUncertainty.p16');
  });

  it('gives a stale writer what is stored now, and stores nothing', async () => {
    const target = await aTarget(draft);
    await patch(target, { redshift: 4 }).expect(200);
    const { body } = await patch(target, { redshift: 5 }).expect(412);
    expect(body.code).toBe('stale-version');
    expect(body.current).toMatchObject({ targetId: target.targetId, redshift: 4, version: target.version + 1 });
  });

  it('needs the version it changes', async () => {
    const target = await aTarget(draft);
    await draft.pi.patch(`${draft.base}/targets/${target.targetId}`).send({ redshift: 4 }).expect(428);
  });

  it('cannot be a luminosity without a distance', async () => {
    const target = await aTarget(draft, { light: { kind: 'absoluteMagnitude', magnitude: -21 } });
    const { body } = await patch(target, { cells: { redshift: '0' } }).expect(422);
    expect(body.fieldErrors[0].path).toBe('cells.redshift');
  });

  it('is told to be a duplicate within 2″ only, and no longer once the other is gone', async () => {
    const own = await aDraft(app);
    const first = await aTarget(own, { name: 'First', rightAscensionDeg: 359.9999, declinationDeg: 0 });
    await aTarget(own, { name: 'Across 0h', rightAscensionDeg: 0.0003, declinationDeg: 0 });
    await aTarget(own, { name: 'Far', rightAscensionDeg: 0.01, declinationDeg: 0 });
    const list = async () =>
      (await own.pi.get(`${own.base}/targets`).expect(200)).body.rows.map(
        (row: { name: string; computed: { notices: { code: string }[] } }) => [
          row.name,
          row.computed.notices.some(({ code }) => code === 'duplicate'),
        ],
      );
    expect(await list()).toEqual([
      ['First', true],
      ['Across 0h', true],
      ['Far', false],
    ]);
    await own.pi
      .post(`${own.base}/targets/removal`)
      .send({ targetIds: [first.targetId] })
      .expect(200);
    expect(await list()).toEqual([
      ['Across 0h', false],
      ['Far', false],
    ]);
  });

  it.each([
    [{ light: null }, 'noBrightness'],
    [{ declinationDeg: 80 }, 'neverUp'],
    [{ redshift: 9, light: { kind: 'apparentMagnitude', magnitude: 26, bandId: 'r' } }, 'beyondLymanBreak'],
    [{ extent: { kind: 'sersic', halfLightRadius: 0.1, unit: 'arcsec' } }, 'smallerThanSeeing'],
  ])('with %j carries the notice %s', async (overrides, code) => {
    const own = await aDraft(app);
    const { computed } = (await aTarget(own, overrides)) as unknown as { computed: { notices: { code: string }[] } };
    expect(computed.notices.map((notice) => notice.code)).toContain(code);
    const { body } = await own.pi.get(`${own.base}/targets?withNotices=true`).expect(200);
    expect(body.rowCount).toBe(1);
  });
});

describe('the list of targets', () => {
  it('pages, sorts and searches on the server', async () => {
    const own = await aDraft(app);
    for (const [name, redshift] of [
      ['Alpha', 2],
      ['Beta', 9],
      ['100%_sure', 5],
    ] as const) {
      await aTarget(own, { name, redshift, light: null });
    }
    const names = async (query: string) =>
      (await own.pi.get(`${own.base}/targets?${query}`).expect(200)).body.rows.map(
        ({ name }: { name: string }) => name,
      );
    expect(await names('')).toEqual(['Alpha', 'Beta', '100%_sure']);
    expect(await names('sort=redshift&order=desc')).toEqual(['Beta', '100%_sure', 'Alpha']);
    expect(await names('sort=ageGyr&pageSize=2&page=2')).toEqual(['Alpha']);
    expect(await names(`search=${encodeURIComponent('%_')}`)).toEqual(['100%_sure']);
    await own.pi.get(`${own.base}/targets?sort=secret`).expect(422);
    await own.pi.get(`${own.base}/targets?pageSize=501`).expect(422);
  });

  it('has the ages of the proposal’s own cosmology on its axis of cosmic time', async () => {
    const own = await aDraft(app);
    await aTarget(own);
    const { body } = await own.pi.get(`${own.base}/targets/cosmic-time`).expect(200);
    // Age of the universe in the planck18 model (Planck 2018 results VI, table 2, last column: 13.787 ± 0.020 Gyr).
    expect(Math.abs(body.ageTodayGyr - 13.787)).toBeLessThan(0.02);
    expect(body.points).toHaveLength(1);
    expect(body.ticks[0]).toMatchObject({ redshift: 0, ageGyr: body.ageTodayGyr });
    // Of the same model: 1 Gyr lies between the redshifts 5 and 6, 10 Gyr between 0 and 0.5.
    expect(body.ageTicks.map(({ ageGyr }: { ageGyr: number }) => ageGyr)).toEqual([0.3, 0.5, 1, 2, 4, 6, 8, 10]);
    const redshiftAt = (age: number) =>
      body.ageTicks.find(({ ageGyr }: { ageGyr: number }) => ageGyr === age).redshift as number;
    const { body: distances } = await own.pi
      .post('/api/v1/distances')
      .send({ redshifts: [0.3, 1, 10].map(redshiftAt) })
      .expect(200);
    const ages = distances.rows.map(({ ageGyr }: { ageGyr: number }) => ageGyr);
    for (const [index, age] of [0.3, 1, 10].entries()) expect(ages[index] / age).toBeCloseTo(1, 8);
  });

  it('marks no age that a young universe has not reached', async () => {
    const own = await aDraft(app);
    await own.pi
      .patch(own.base)
      .set('If-Match', '"1"')
      // Einstein–de Sitter: two thirds of the Hubble time, 977.79 / 100 × 2 / 3 = 6.52 Gyr.
      .send({ cosmology: { hubbleConstantKmSMpc: 100, omegaMatter: 1, omegaDarkEnergy: 0, cmbTemperatureK: 0 } })
      .expect(200);
    const { body } = await own.pi.get(`${own.base}/targets/cosmic-time`).expect(200);
    expect(body.ageTicks.at(-1).ageGyr).toBe(6);
  });
});

describe('going around the screens', () => {
  const routes = (base: string, targetId: string) =>
    [
      ['get', `${base}/targets`],
      ['get', `${base}/targets/${targetId}`],
      ['get', `${base}/targets/cosmic-time`],
      ['get', `${base}/targets/export.csv`],
      ['post', `${base}/targets`, { name: 'N', rightAscensionDeg: 1, declinationDeg: 1, redshift: 1 }],
      ['patch', `${base}/targets/${targetId}`, { redshift: 9 }],
      ['post', `${base}/targets/removal`, { targetIds: [targetId] }],
      ['post', `${base}/targets/import-preview`, { text: 'name,ra,dec,z\nA,1,1,1' }],
      ['post', `${base}/targets/import`, { text: 'name,ra,dec,z\nA,1,1,1' }],
    ] as const;

  it.each([
    ['an outsider', {}],
    ['staff', { isStaff: true }],
    ['an administrator', { isAdministrator: true }],
  ])('%s gets the same answer for a draft as for an absent proposal, on every route', async (_, roles) => {
    const target = await aTarget(draft);
    const agent = await signedInAs(app, await aPerson(app, roles));
    const absent = '/api/v1/proposals/3f0d4c5e-8a35-4c1b-9d5c-0f1a2b3c4d5e';
    const real = routes(draft.base, target.targetId);
    const unreal = routes(absent, target.targetId);
    for (const [index, [method, path, body]] of real.entries()) {
      const answer = await agent[method](path).set('If-Match', '"1"').send(body);
      expect([path, answer.status]).toEqual([path, 404]);
      const other = unreal[index];
      if (other === undefined) throw new Error('The two lists differ.');
      const reference = await agent[method](other[1]).set('If-Match', '"1"').send(body);
      expect(answer.body.detail).toBe(reference.body.detail);
    }
    const { body: after } = await draft.pi.get(`${draft.base}/targets/${target.targetId}`).expect(200);
    expect(after.version).toBe(target.version);
  });

  it('a member who reads may not change targets; one who edits targets may', async () => {
    const target = await aTarget(draft);
    const reader = await aTeamMember(app, draft, 'reads');
    const editor = await aTeamMember(app, draft, 'editsTargets');
    const url = `${draft.base}/targets/${target.targetId}`;
    await reader.agent.get(url).expect(200);
    await reader.agent.patch(url).set('If-Match', '"1"').send({ redshift: 4 }).expect(403);
    await reader.agent
      .post(`${draft.base}/targets/removal`)
      .send({ targetIds: [target.targetId] })
      .expect(403);
    await editor.agent.patch(url).set('If-Match', '"1"').send({ redshift: 4 }).expect(200);
    await editor.agent.patch(draft.base).set('If-Match', '"1"').send({ title: 'Mine now' }).expect(403);
  });

  it('a target of another proposal is absent', async () => {
    const other = await aDraft(app);
    const target = await aTarget(other);
    await draft.pi.get(`${draft.base}/targets/${target.targetId}`).expect(404);
    await draft.pi
      .patch(`${draft.base}/targets/${target.targetId}`)
      .set('If-Match', '"1"')
      .send({ redshift: 4 })
      .expect(404);
    const { body } = await draft.pi
      .post(`${draft.base}/targets/removal`)
      .send({ targetIds: [target.targetId] })
      .expect(200);
    expect(body.removedCount).toBe(0);
  });
});
