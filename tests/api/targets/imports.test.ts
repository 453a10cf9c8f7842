import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aDraft, type Draft } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const QUASARS = readFileSync(new URL('../../reference/sources/quasars-z2.csv', import.meta.url), 'utf8');

const preview = (draft: Draft, text: string, options: object = {}) =>
  draft.pi.post(`${draft.base}/targets/import-preview`).send({ text, options });
const load = (draft: Draft, text: string, options: object = {}, key?: string) => {
  const request = draft.pi.post(`${draft.base}/targets/import`);
  if (key !== undefined) void request.set('Idempotency-Key', key);
  return request.send({ text, options });
};
const list = async (draft: Draft, query = '') =>
  (await draft.pi.get(`${draft.base}/targets?${query}`).expect(200)).body;

/** A list of distinct, invented places. */
function manyRows(count: number): string {
  const lines = ['name,ra,dec,z,magnitude'];
  for (let index = 0; index < count; index += 1) {
    const ra = ((index * 137.508) % 360).toFixed(6);
    const dec = (-80 + ((index * 7.31) % 140)).toFixed(6);
    lines.push(`T${index},${ra},${dec},${((index % 140) / 10).toFixed(2)},${(18 + (index % 90) / 10).toFixed(2)}`);
  }
  return lines.join('\n');
}

describe('the preview of an import', () => {
  it('guesses the roles of a published list and finds every row ready', async () => {
    const draft = await aDraft(app);
    const { body } = await preview(draft, QUASARS).expect(200);
    expect(body.columns.map(({ role }: { role: string }) => role)).toEqual([
      'name',
      'rightAscension',
      'declination',
      'redshift',
      'brightness',
      'ignore',
    ]);
    expect(body.tableErrors).toEqual([]);
    expect(body.readyCount).toBe(body.rowCount);
    expect(body.rowCount).toBe(QUASARS.trim().split('\n').length - 1);
  });

  it('says at each bad cell what would be right, and which row of the text it is', async () => {
    const draft = await aDraft(app);
    const text = 'name,ra,dec,z,mag\nA,10:00:00,+10:00:00,abc,20\n\nB,400,+95,1e9,bright\nC,10,10,2,21';
    const { body } = await preview(draft, text).expect(200);
    expect(body).toMatchObject({ rowCount: 3, readyCount: 1, faultyCount: 2 });
    const [a, b, c] = body.rows;
    expect(a.lineNumber).toBe(2);
    expect(a.cells[3].error).toMatch(/not a number/);
    expect(b.lineNumber).toBe(4);
    expect(b.cells.map((cell: { error?: string }) => cell.error !== undefined)).toEqual([
      false,
      true,
      true,
      true,
      true,
    ]);
    expect(c.isReady).toBe(true);
  });

  it('tells which role no column has, and which two columns share', async () => {
    const draft = await aDraft(app);
    const { body } = await preview(draft, 'a,b,c\n1,2,3', { roles: ['redshift', 'redshift', 'ignore'] }).expect(200);
    expect(body.tableErrors).toHaveLength(3);
    expect(body.readyCount).toBe(0);
    const refused = await load(draft, 'a,b,c\n1,2,3', { roles: ['redshift', 'redshift', 'ignore'] }).expect(422);
    expect(refused.body.fieldErrors[0].path).toBe('options.roles');
  });

  it('shows at most five hundred rows, the faulty ones among them', async () => {
    const draft = await aDraft(app);
    const rows = manyRows(2000).split('\n');
    rows[1500] = 'Bad,x,y,z,m';
    const { body } = await preview(draft, rows.join('\n')).expect(200);
    expect(body.rowCount).toBe(2000);
    expect(body.faultyCount).toBe(1);
    expect(body.rows.length).toBeLessThanOrEqual(500);
    expect(body.rows.at(-1)).toMatchObject({ lineNumber: 1501, isReady: false });
  });
});

describe('what the header of a column states', () => {
  const columnOf = async (draft: Draft, text: string, options: object = {}) => {
    await load(draft, text, options).expect(200);
    return (await list(draft)).rows as { rightAscensionDeg: number; declinationDeg: number; brightnessText: string }[];
  };

  it.each([
    ['RA [h]', '10.5', 157.5],
    ['ra_hours', '10.5', 157.5],
    ['RA (h)', '10:30:00', 157.5],
    ['RA [deg]', '10.5', 10.5],
    ['ra', '10.5', 10.5],
    ['RA [h]', '157.5d', 157.5],
  ])('reads under "%s" a right ascension of %s as %d degrees', async (header, cell, degrees) => {
    const draft = await aDraft(app);
    const [row] = await columnOf(draft, `name,${header},dec,z\nA,${cell},-20,2`);
    expect(row?.rightAscensionDeg).toBeCloseTo(degrees, 10);
  });

  it('refuses 25 hours at the cell, and warns where degrees are written like hours', async () => {
    const draft = await aDraft(app);
    const hours = await preview(draft, 'name,RA [h],dec,z\nA,25,-20,2').expect(200);
    expect(hours.body.rows[0].cells[1].error).toMatch(/24 hours/);
    const degrees = await preview(draft, 'name,RA (deg),dec,z\nA,10:30:00,-20,2').expect(200);
    expect(degrees.body.rows[0].cells[1].warning).toMatch(/hours, minutes and seconds/);
  });

  it.each([
    ['name,RA (rad),dec,z', 'rad'],
    ['name,ra,Dec (arcmin),z', 'arcmin'],
    ['name,ra,dec [h],z', 'h'],
    ['name,ra,dec,z [km/s]', 'km/s'],
  ])('refuses a table "%s" whose unit cannot be kept to', async (header, unit) => {
    const draft = await aDraft(app);
    const roles = ['name', 'rightAscension', 'declination', 'redshift'];
    const { body } = await load(draft, `${header}\nA,1.5,0.3,2`, { roles }).expect(422);
    expect(body.fieldErrors[0]).toMatchObject({ path: 'options.roles', message: expect.stringContaining(` ${unit};`) });
    expect((await list(draft)).rowCount).toBe(0);
  });

  it.each([
    ['J (Vega)', '23.00 Vega (J)'],
    ['J_vega', '23.00 Vega (J)'],
    ['mag_J', '23.00 AB (J)'],
    ['Kmag', '23.00 AB (Ks)'],
    ['mag', '23.00 AB (V)'],
    ['R', '23.00 AB (R)'],
    ['r', '23.00 AB (r)'],
  ])('takes the bare number under "%s" for %s, and says so where it was not asked for', async (header, text) => {
    const draft = await aDraft(app);
    const table = `name,ra,dec,z,${header}\nA,10,-20,2,23\nB,11,-20,2,22 AB (H)`;
    const roles = ['name', 'rightAscension', 'declination', 'redshift', 'brightness'];
    const { body } = await preview(draft, table, { roles }).expect(200);
    expect(body.rows[0].cells[4].warning !== undefined).toBe(header !== 'mag');
    expect(body.rows[1].cells[4].warning).toBeUndefined();
    const [bare, full] = await columnOf(draft, table, { roles });
    expect(bare?.brightnessText).toBe(text);
    expect(full?.brightnessText).toBe('22.00 AB (H)');
  });
});

describe('an import', () => {
  it('takes the ready rows, says how many it left out, and is one entry of the history', async () => {
    const draft = await aDraft(app);
    const { body } = await load(draft, 'name,ra,dec,z\nA,10,10,2\nB,10,10,-2\nC,11,10,3').expect(200);
    expect(body).toEqual({ importedCount: 2, skippedFaultyCount: 1, skippedDuplicateCount: 0, targetCount: 2 });
    const { body: history } = await draft.pi.get(`${draft.base}/history`).expect(200);
    expect(history.rows[0]).toMatchObject({ action: 'imported', subject: 'target', subjectName: '2 targets' });
  });

  it('repeated with its key does its work once and answers the same', async () => {
    const draft = await aDraft(app);
    const first = await load(draft, QUASARS, {}, 'import-key-1').expect(200);
    const again = await load(draft, QUASARS, {}, 'import-key-1').expect(200);
    expect(again.body).toEqual(first.body);
    expect((await list(draft)).rowCount).toBe(first.body.importedCount);
    await load(draft, 'name,ra,dec,z\nA,10,10,2', {}, 'import-key-1').expect(409);
  });

  it('leaves targets of the same name and place alone when asked to', async () => {
    const draft = await aDraft(app);
    await load(draft, 'name,ra,dec,z\nA,10,10,2').expect(200);
    const text = 'name,ra,dec,z\na,10.0001,10,2\nA,10.01,10,2\nNew,20,10,2\nNew,20,10,2';
    const { body: shown } = await preview(draft, text).expect(200);
    expect(shown.duplicateCount).toBe(2);
    const { body } = await load(draft, text, { skipDuplicates: true }).expect(200);
    expect(body).toMatchObject({ importedCount: 2, skippedDuplicateCount: 2, targetCount: 3 });
  });

  it('reads bare numbers in the band and system it is told', async () => {
    const draft = await aDraft(app);
    await load(draft, 'name,ra,dec,z,mag\nA,10,10,2,18.5', { brightnessBandId: 'J', brightnessSystem: 'Vega' }).expect(
      200,
    );
    expect((await list(draft)).rows[0].brightnessText).toBe('18.50 Vega (J)');
  });

  it('of five thousand targets stores all with all their columns, equal to those computed one by one', async () => {
    const draft = await aDraft(app);
    const { body } = await load(draft, manyRows(5000)).expect(200);
    expect(body.importedCount).toBe(5000);
    let seen = 0;
    for (let page = 1; page <= 10; page += 1) {
      const { rows, rowCount } = await list(draft, `page=${page}&pageSize=500`);
      expect(rowCount).toBe(5000);
      for (const row of rows) {
        expect(row.computed.luminosityDistanceMpc).not.toBeNull();
        expect(row.computed.ageGyr).not.toBeNull();
        // Far enough away nothing of a source arrives in V, and its notice says so.
        const isDark = row.computed.notices.some(({ code }: { code: string }) => code === 'beyondLymanBreak');
        expect(row.computed.apparentMagnitudeAb === null).toBe(isDark);
        if (row.redshift < 3 || row.redshift > 10) expect(isDark).toBe(row.redshift > 10);
        expect(row.computed.upSummary).not.toBeNull();
        expect(row.computed.inputHash).toMatch(/^[0-9a-f]{64}$/);
        seen += 1;
      }
    }
    expect(seen).toBe(5000);
    const { rows } = await list(draft, 'page=7&pageSize=20');
    const single = await aDraft(app, { semesterId: draft.semesterId });
    for (const row of rows) {
      const { name, rightAscensionDeg, declinationDeg, redshift, light, extent } = row;
      const { body: one } = await single.pi
        .post(`${single.base}/targets`)
        .send({ name, rightAscensionDeg, declinationDeg, redshift, light, extent })
        .expect(201);
      expect(one.computed).toEqual(row.computed);
    }
  });

  it('comes back from the export as it was, to 1e-9', async () => {
    const draft = await aDraft(app);
    await load(draft, QUASARS).expect(200);
    await draft.pi
      .post(`${draft.base}/targets`)
      .send({
        name: '=cmd|x',
        rightAscensionDeg: 12.345678901234,
        declinationDeg: -0.000123456789,
        redshift: 7.1234567891,
        notes: '+1 "quoted", yes',
        redshiftUncertainty: { kind: 'percentiles', p16: 7.07, p50: 7.1234567891, p84: 7.15 },
        light: { kind: 'starFormationRate', solarMassesPerYear: 8.12345678901, tracer: 'hydrogenAlpha' },
      })
      .expect(201);
    const exported = await draft.pi.get(`${draft.base}/targets/export.csv`).expect(200);
    expect(exported.headers['content-type']).toMatch(/text\/csv/);
    expect(exported.text).toContain("'=cmd|x");
    const copy = await aDraft(app);
    const { body } = await load(copy, exported.text).expect(200);
    expect(body.skippedFaultyCount).toBe(0);
    const before = (await list(draft)).rows;
    const after = (await list(copy)).rows;
    expect(after).toHaveLength(before.length);
    for (const [index, row] of after.entries()) {
      expect(row.name).toBe(before[index].name);
      expect(row.notes).toBe(before[index].notes);
      expect(row.light).toEqual(before[index].light);
      expect(row.redshiftUncertainty).toEqual(before[index].redshiftUncertainty);
      for (const field of ['rightAscensionDeg', 'declinationDeg', 'redshift']) {
        expect(Math.abs(row[field] - before[index][field])).toBeLessThan(1e-9);
      }
    }
  });
});

describe('redshifts in a table', () => {
  const rowsOf = async (draft: Draft, text: string) => {
    await load(draft, text).expect(200);
    return (await list(draft)).rows;
  };

  it('have their uncertainty in a column, however it is written', async () => {
    const draft = await aDraft(app);
    const text = [
      'name,ra,dec,z,z_err',
      'A,10,-20,2,0.02',
      'B,11,-20,2,±0.03',
      'C,12,-20,2,+0.05 -0.03',
      'D,13,-20,2,',
    ];
    const rows = await rowsOf(draft, text.join('\n'));
    expect(rows.map((row: { redshiftUncertainty: unknown }) => row.redshiftUncertainty)).toEqual([
      { kind: 'gaussian', sigma: 0.02 },
      { kind: 'gaussian', sigma: 0.03 },
      { kind: 'percentiles', p16: 1.97, p50: 2, p84: 2.05 },
      null,
    ]);
    expect(rows[0].redshiftKind).toBe('spectroscopic');
  });

  it('under a header of photometric ones are photometric', async () => {
    const draft = await aDraft(app);
    const rows = await rowsOf(draft, 'name,ra,dec,zphot\nA,10,-20,2');
    expect(rows[0].redshiftKind).toBe('photometric');
  });

  it('with a distribution, of which a table only holds the number of peaks, are imported without it, and say so', async () => {
    const draft = await aDraft(app);
    const text = 'name,ra,dec,z,redshift_uncertainty\nA,10,-20,2,"p(z), 2 peaks"';
    const { body } = await preview(draft, text).expect(200);
    expect(body.rows[0]).toMatchObject({ isReady: true });
    expect(body.rows[0].cells[4].warning).toMatch(/without it/);
    expect((await rowsOf(draft, text))[0].redshiftUncertainty).toBeNull();
  });
});

describe('the exported table', () => {
  it('says of each light what kind it is, and what arrives in each band or of its line', async () => {
    const draft = await aDraft(app);
    const target = { rightAscensionDeg: 10, declinationDeg: -20, redshift: 6 };
    await draft.pi
      .post(`${draft.base}/targets`)
      .send({
        ...target,
        name: 'Arc',
        redshiftKind: 'photometric',
        light: { kind: 'absoluteMagnitude', magnitude: -21, spectrum: { kind: 'starForming' }, magnification: 8 },
      })
      .expect(201);
    await draft.pi
      .post(`${draft.base}/targets`)
      .send({ ...target, name: 'Line', light: { kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567 } })
      .expect(201);
    const { text } = await draft.pi.get(`${draft.base}/targets/export.csv`).expect(200);
    const [header = '', arc = '', line = ''] = text.split(/\r?\n/);
    const names = header.split(',');
    const cell = (row: string, name: string) => row.split(',')[names.indexOf(name)];
    const [stored] = (await list(draft)).rows;
    expect([cell(arc, 'redshift_kind'), cell(arc, 'light_kind'), cell(arc, 'spectrum_kind')]).toEqual([
      'photometric',
      'absoluteMagnitude',
      'starForming',
    ]);
    expect(cell(arc, 'magnification')).toBe('8');
    expect(Number(cell(arc, 'above_atmosphere_ab_mag_J'))).toBe(stored.computed.bandMagnitudesAb.J);
    expect(cell(arc, 'above_atmosphere_ab_mag_g')).toBe('');
    expect(Number(cell(line, 'line_observed_vacuum_nm'))).toBeCloseTo(7 * 121.567, 9);
    expect(cell(line, 'line_flux_erg_s_cm2')).not.toBe('');
    expect(cell(line, 'spectrum_kind')).toBe('');
    expect(names.filter((name) => name.startsWith('above_atmosphere'))).toHaveLength(8);
  });
});

describe('a hostile table', () => {
  it.each([
    ['binary', `PK\u0003\u0004${'\u0001\u0002'.repeat(3000)}`],
    ['NUL characters', 'name,ra\u0000,dec,z\nA,1,1,1'],
    ['a line of twenty million characters', 'x'.repeat(20_000_000)],
    ['a million columns', ','.repeat(1_000_000)],
    ['a quote that is never closed', `name,ra,dec,z\n"A,1,1,1\n${'B,1,1,1\n'.repeat(1000)}`],
    ['nothing', '   \n\n'],
    ['more rows than a proposal may hold', 'z\n'.repeat(30_000)],
  ])('of %s is refused in bounded time', async (_, text) => {
    const draft = await aDraft(app);
    const startedAt = performance.now();
    const { body } = await preview(draft, text).expect(422);
    expect(body.code).toBe('unreadable-table');
    expect(body.detail.length).toBeGreaterThan(20);
    expect(performance.now() - startedAt).toBeLessThan(10_000);
    expect((await load(draft, text).expect(422)).body.code).toBe('unreadable-table');
  });

  it('beyond the size of a request is refused as too large', async () => {
    const draft = await aDraft(app);
    const { body } = await preview(draft, 'x'.repeat(27_000_000)).expect(413);
    expect(body.code).toBe('too-large');
  });

  it('of twenty thousand equal rows is told as duplicates in bounded time', async () => {
    const draft = await aDraft(app);
    const startedAt = performance.now();
    const { body } = await preview(draft, `name,ra,dec,z\n${'A,1,1,1\n'.repeat(20_000)}`).expect(200);
    expect(body.duplicateCount).toBe(19_999);
    expect(performance.now() - startedAt).toBeLessThan(20_000);
  });
});
