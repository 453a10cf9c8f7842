import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aMode, IMAGING } from '../../factories/committee.js';
import { CONDITIONS, GOAL } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

const SETUP = {
  telescope: { diameterM: 4, obstructionDiameterM: 1 },
  site: { zenithSeeingArcsec: 0.8 },
  mode: IMAGING,
};
const TARGET = { redshift: 3, light: { kind: 'apparentMagnitude', magnitude: 22, bandId: 'r' } };

let app: TestApp;
beforeAll(async () => {
  app = await createTestApp();
});
afterAll(() => app.close());

const ask = (body: object) =>
  app
    .http()
    .post('/api/v1/estimates')
    .send({ target: TARGET, setup: SETUP, goal: GOAL, conditions: CONDITIONS, ...body });
const paths = (body: { fieldErrors: { path: string }[] }) => body.fieldErrors.map(({ path }) => path);

describe('POST /estimates', () => {
  it('works without an account and shows every step, whose magnitudes add up', async () => {
    const { body } = await ask({}).expect(200);
    expect(body.outcome).toBe('feasible');
    expect(body.signalToNoise).toBeGreaterThanOrEqual(20);
    const total = body.steps.reduce((sum: number, { deltaMag }: { deltaMag: number }) => sum + deltaMag, 0);
    expect(total).toBeCloseTo(body.steps.at(-1).totalMag, 9);
    expect(body).toMatchObject({ cosmologyId: 'planck18' });
    expect(body.inputHash).toMatch(/^[0-9a-f]{64}$/);
  });

  it('gives the same for an instrument’s mode as for the same setup typed in full', async () => {
    const { mode } = await aMode(app);
    const { body: stored } = await ask({ setup: { modeId: mode.id } }).expect(200);
    const { body: typed } = await ask({}).expect(200);
    expect(stored).toEqual(typed);
    expect(paths((await ask({ setup: { modeId: mode.id, configurationVersion: 9 } }).expect(422)).body)).toEqual([
      'setup.configurationVersion',
    ]);
  });

  it('has one hash for one set of inputs and another for any other', async () => {
    const { body: first } = await ask({}).expect(200);
    const { body: same } = await ask({}).expect(200);
    const { body: other } = await ask({ cosmology: 'conv70' }).expect(200);
    expect(same.inputHash).toBe(first.inputHash);
    expect(other.inputHash).not.toBe(first.inputHash);
  });

  it('takes a Vega magnitude as the AB magnitude of the band’s offset', async () => {
    const light = { kind: 'apparentMagnitude', magnitude: 20, bandId: 'J' };
    const { body: vega } = await ask({ target: { ...TARGET, light: { ...light, system: 'Vega' } } }).expect(200);
    // m_AB − m_Vega of J is 0.91 (Blanton & Roweis 2007, AJ 133, 734).
    const { body: ab } = await ask({ target: { ...TARGET, light: { ...light, magnitude: 20.91 } } }).expect(200);
    expect(vega.apparentMagnitudeAb).toBeCloseTo(ab.apparentMagnitudeAb, 10);
    const refused = await ask({ target: { ...TARGET, light: { ...light, bandId: 'g', system: 'Vega' } } }).expect(422);
    expect(paths(refused.body)).toEqual(['target.light.system']);
  });

  it.each([
    [{ goal: { kind: 'signalToNoise', value: 1e300, per: 'aperture' } }, 'goal.value'],
    [{ goal: { kind: 'signalToNoise', value: 5, per: 'resolutionElement' } }, 'goal.per'],
    [{ goal: { kind: 'signalToNoise', value: 5, per: 'arcsec2' } }, 'goal.per'],
    [{ goal: { kind: 'lineSignificance', sigma: 5 } }, 'goal.kind'],
    [{ goal: { kind: 'exposureTime', exposureSeconds: 9999, exposureCount: 1 } }, 'goal.exposureSeconds'],
    [{ target: { ...TARGET, redshift: -1 } }, 'target.redshift'],
    [{ target: { redshift: 0, light: { kind: 'absoluteMagnitude', magnitude: -21 } } }, 'target.redshift'],
    [
      { target: { redshift: 3, light: { kind: 'absoluteMagnitude', magnitude: -21 }, extent: { kind: 'uniform' } } },
      'target.light.kind',
    ],
    [
      { target: { ...TARGET, extent: { kind: 'sersic', halfLightRadius: 5000, unit: 'kpc' } } },
      'target.extent.halfLightRadius',
    ],
    [{ conditions: { ...CONDITIONS, airmass: 0.5 } }, 'conditions.airmass'],
  ])('refuses %j at its place', async (change, path) => {
    const { body } = await ask(change).expect(422);
    expect(body.code).toBe('validation-failed');
    expect(paths(body)).toEqual([path]);
  });

  it('answers what cannot be reached with a reason, not with a huge number', async () => {
    const { body } = await ask({
      target: { redshift: 12, light: { kind: 'absoluteMagnitude', magnitude: -21 } },
    }).expect(200);
    expect(body).toMatchObject({ outcome: 'infeasible', reason: { code: 'noFluxInBand' } });
  });

  it('takes the magnitude of a uniform surface per square arcsecond', async () => {
    const { body } = await ask({
      target: { ...TARGET, extent: { kind: 'uniform' } },
      goal: { kind: 'signalToNoise', value: 10, per: 'arcsec2' },
    }).expect(200);
    expect(body.surfaceBrightnessAbMagPerArcsec2).toBeCloseTo(22, 9);
    expect(body.aperture.kind).toBe('patch');
  });
});
