import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { createTestApp, type TestApp } from '../support/app.js';

interface ReferenceModel {
  parameters: Record<string, unknown>;
  rows: Record<string, number>[];
}

function reference(name: string): ReferenceModel {
  const url = new URL(`../../reference/cosmology/${name}.json`, import.meta.url);
  return JSON.parse(readFileSync(url, 'utf8')) as ReferenceModel;
}

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const ask = (body: object) => app.http().post('/api/v1/distances').send(body);

describe('POST /distances', () => {
  it.each(['planck18', 'planck15', 'wmap9'])('agrees with the reference rows of %s to 1e-9', async (name) => {
    const { rows } = reference(name);
    const { body } = await ask({ cosmology: name, redshifts: rows.map((row) => row['z']) }).expect(200);
    expect(body.rows).toHaveLength(rows.length);
    expect(rows.length).toBeGreaterThan(50);
    rows.forEach((row, index) => {
      const answer = body.rows[index];
      expect(answer.redshift).toBe(row['z']);
      for (const [ours, theirs] of [
        ['comovingDistanceMpc', 'comoving_distance_Mpc'],
        ['angularDiameterDistanceMpc', 'angular_diameter_distance_Mpc'],
        ['luminosityDistanceMpc', 'luminosity_distance_Mpc'],
        ['lookbackTimeGyr', 'lookback_time_Gyr'],
      ] as const) {
        const expected = row[theirs];
        if (expected === undefined) throw new Error(`${name} has no ${theirs}.`);
        expect(Math.abs(answer[ours] / expected - 1)).toBeLessThan(1e-9);
      }
    });
  });

  it('takes own parameters and leaves the model flat without dark energy', async () => {
    const own = { hubbleConstantKmSMpc: 70, omegaMatter: 0.3 };
    const { body } = await ask({ cosmology: own, redshifts: [1] }).expect(200);
    // Flat ΛCDM 70/0.3 without radiation: computed with astropy, in the reference file.
    const row = reference('flat-70-0.3-no-radiation').rows.find(({ z }) => z === 1);
    expect(Math.abs(body.rows[0].luminosityDistanceMpc / (row?.['luminosity_distance_Mpc'] ?? NaN) - 1)).toBeLessThan(
      1e-9,
    );
    expect(body.cosmology.id).toMatch(/^own-/);
  });

  it('keeps the order of the redshifts', async () => {
    const redshifts = [7, 0.1, 0, 3, 0.1];
    const { body } = await ask({ redshifts }).expect(200);
    expect(body.rows.map(({ redshift }: { redshift: number }) => redshift)).toEqual(redshifts);
    expect(body.cosmology.id).toBe('planck18');
  });

  it('has no modulus at redshift 0, where an arcsecond spans nothing', async () => {
    const { body } = await ask({ redshifts: [0] }).expect(200);
    expect(body.rows[0]).toMatchObject({
      luminosityDistanceMpc: 0,
      distanceModulusMag: null,
      kpcPerArcsec: 0,
      perFrequencyDimmingMag: 0,
    });
  });

  it('dims in four conventions', async () => {
    const { body } = await ask({ redshifts: [9] }).expect(200);
    expect(body.rows[0]).toMatchObject({
      bolometricDimmingMag: 10,
      perFrequencyDimmingMag: 7.5,
      perWavelengthDimmingMag: 12.5,
      photonRateDimmingMag: 7.5,
    });
  });

  it.each([
    ['negative', -1],
    ['beyond the limit', 1e9],
    ['a text', 'abc'],
    ['null, as JSON writes NaN', null],
  ])('names a redshift that is %s', async (_, bad) => {
    const { body } = await ask({ redshifts: [1, 2, 3, bad, 5] }).expect(422);
    expect(body.code).toBe('validation-failed');
    expect(body.fieldErrors.map(({ path }: { path: string }) => path)).toEqual(['redshifts.3']);
  });

  it.each([
    [{ hubbleConstantKmSMpc: 70, omegaMatter: 0.1, omegaDarkEnergy: 3 }, 'cosmology.omegaDarkEnergy'],
    [{ hubbleConstantKmSMpc: -70, omegaMatter: 0.3 }, 'cosmology.hubbleConstantKmSMpc'],
    [{ hubbleConstantKmSMpc: 0.5, omegaMatter: 0.3 }, 'cosmology.hubbleConstantKmSMpc'],
    [{ hubbleConstantKmSMpc: 70, omegaMatter: 0.3, w0: 5 }, 'cosmology.w0'],
  ])('refuses the parameters %j at %s', async (cosmology, path) => {
    const { body } = await ask({ cosmology, redshifts: [1] }).expect(422);
    expect(body.fieldErrors.map((error: { path: string }) => error.path)).toEqual([path]);
  });

  it('refuses redshifts beyond the antipode of a closed universe, each by name', async () => {
    const cosmology = { hubbleConstantKmSMpc: 70, omegaMatter: 0.2, omegaDarkEnergy: 1.5 };
    const { body } = await ask({ cosmology, redshifts: [0.1, 9000, 1, 8000] }).expect(422);
    expect(body.fieldErrors.map(({ path }: { path: string }) => path)).toEqual(['redshifts.1', 'redshifts.3']);
    await ask({ cosmology, redshifts: [0.1, 1] }).expect(200);
  });

  it('answers a hundred thousand redshifts', async () => {
    const redshifts = Array.from({ length: 100_000 }, (_, index) => index / 10_000);
    const { body } = await ask({ redshifts }).expect(200);
    expect(body.rows).toHaveLength(100_000);
    expect(body.rows[70_000].redshift).toBe(7);
  });

  it('says how many redshifts are too many', async () => {
    const { body } = await ask({ redshifts: new Array(100_001).fill(1) }).expect(422);
    expect(body.fieldErrors[0].path).toBe('redshifts');
  });
});

describe('GET /cosmologies', () => {
  it('lists the presets with parameters and sources', async () => {
    const { body } = await app.http().get('/api/v1/cosmologies').expect(200);
    expect(body.rows.map(({ id }: { id: string }) => id)).toEqual([
      'planck18',
      'planck15',
      'wmap9',
      'conv70',
      'ladder73',
    ]);
    for (const row of body.rows) expect(row.source).not.toBe('');
  });
});
