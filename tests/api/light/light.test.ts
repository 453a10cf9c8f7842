import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { aPerson, signedInAs } from '../../factories/people.js';
import { aMode } from '../../factories/committee.js';
import { aDraft, aTarget, CONDITIONS, type Draft, GOAL } from '../../factories/proposals.js';
import { createTestApp, type TestApp } from '../support/app.js';

let app: TestApp;
let draft: Draft;
beforeAll(async () => {
  app = await createTestApp();
  draft = await aDraft(app);
});
afterAll(() => app.close());

const report = (body: object) => app.http().post('/api/v1/light').send(body);
const paths = (body: { fieldErrors: { path: string }[] }) => body.fieldErrors.map(({ path }) => path);
const GALAXY = { kind: 'absoluteMagnitude', magnitude: -21 };

describe('POST /light', () => {
  it('follows M = −21 at z = 7 to AB = 25.983 in J, step by step, without an account', async () => {
    const { body } = await report({ redshift: 7, light: GALAXY, bandId: 'J' }).expect(200);
    // M + DM − 2.5 log10 8 with DM = 49.2407 in this cosmology; a flat f_ν.
    expect(body.ledger.totalMagnitudeAb).toBeCloseTo(25.983, 3);
    const sum = body.ledger.steps.reduce((total: number, step: { deltaMag: number }) => total + step.deltaMag, 0);
    expect(sum).toBeCloseTo(body.ledger.totalMagnitudeAb, 9);
    expect(body.distances.distanceModulusMag).toBeCloseTo(49.2407, 4);
    const inJ = body.bands.find((band: { bandId: string }) => band.bandId === 'J');
    expect(inJ.magnitudeAb).toBe(body.ledger.totalMagnitudeAb);
    expect(body.referenceDataVersion).toMatch(/^[0-9a-f]{12}$/);
  });

  it('says where there is no light, and why', async () => {
    const { body } = await report({ redshift: 8.3, light: GALAXY, bandId: 'z' }).expect(200);
    expect(body.ledger.totalMagnitudeAb).toBeNull();
    expect(body.ledger.reason.message).toBe('No flux in this band: the Lyman break is at 1.13 µm.');
    const dark = body.bands.filter((band: { magnitudeAb: number | null }) => band.magnitudeAb === null);
    expect(dark.map((band: { bandId: string }) => band.bandId)).toEqual(expect.arrayContaining(['g', 'r', 'i', 'z']));
    expect(JSON.stringify(body)).not.toMatch(/Infinity|NaN/);
  });

  it('keeps intrinsic and observed apart under a lens, and converts a literature luminosity', async () => {
    const { body: plain } = await report({ redshift: 7, light: GALAXY, bandId: 'J' }).expect(200);
    const { body: lensed } = await report({
      redshift: 7,
      bandId: 'J',
      light: { ...GALAXY, magnification: 10, derivedWith: 'conv70' },
    }).expect(200);
    // −2.5 log10 10, and the modulus of the 70/0.3 model, 0.0458 mag less.
    expect(lensed.ledger.totalMagnitudeAb).toBeCloseTo(plain.ledger.totalMagnitudeAb - 2.5 - 0.0458, 3);
    expect(lensed.unlensedMagnitudeAb).toBeCloseTo(lensed.ledger.totalMagnitudeAb + 2.5, 9);
    const ladder = lensed.cosmologies.find((row: { cosmologyId: string }) => row.cosmologyId === 'ladder73');
    expect(ladder.skyLimitedTimeFactor).toBe(1);
  });

  it('asks 1.29 times the time of the distance ladder for a luminosity, and the same for a magnitude as seen', async () => {
    const factorOf = async (light: object) => {
      const { body } = await report({ redshift: 7, light, bandId: 'J' }).expect(200);
      return body.cosmologies.find((row: { cosmologyId: string }) => row.cosmologyId === 'ladder73')
        .skyLimitedTimeFactor;
    };
    expect(await factorOf(GALAXY)).toBeCloseTo(0.775, 3);
    expect(await factorOf({ kind: 'apparentMagnitude', magnitude: 26, bandId: 'J' })).toBe(1);
  });

  it('propagates a two-peaked redshift: half of the draws have Lyα in Y', async () => {
    const ask = () =>
      report({
        redshift: 7,
        redshiftUncertainty: {
          kind: 'table',
          redshifts: [1.4, 1.5, 1.6, 1.7, 6.9, 7.2, 7.3, 7.6],
          densities: [0, 6, 6, 0, 0, 2.4, 2.4, 0],
        },
        light: { kind: 'lineFlux', fluxErgSCm2: 1e-17, restWavelengthNm: 121.567, sigmaMag: 0.1 },
        bandId: 'Y',
        sampleCount: 4000,
      }).expect(200);
    const { body } = await ask();
    const { distribution, lines, probabilityError } = body.uncertainty;
    expect(distribution.peaks).toHaveLength(2);
    // Areas: 1.2 near 1.55 and 0.96 near 7.25.
    expect(lines[0].insideBandProbability).toBeGreaterThan(0.4444 - 0.05 - 3 * probabilityError);
    expect(lines[0].insideBandProbability).toBeLessThan(0.4444 + 3 * probabilityError);
    expect((await ask()).body.uncertainty).toEqual(body.uncertainty);
  });

  it.each([
    ['light.escapeFraction', { kind: 'starFormationRate', solarMassesPerYear: 10, tracer: 'lymanAlpha' }],
    [
      'light.calibration',
      { kind: 'starFormationRate', solarMassesPerYear: 10, tracer: 'hydrogenAlpha', calibration: 'madauDickinson2014' },
    ],
    ['light.system', { kind: 'apparentMagnitude', magnitude: 22, bandId: 'g', system: 'Vega' }],
    ['light.system', { kind: 'absoluteMagnitude', magnitude: -20, system: 'Vega' }],
    ['light.includes.galacticDust', { ...GALAXY, includes: { hostDust: true, galacticDust: true, lensing: false } }],
    [
      'light.spectrum.spectrumId',
      { ...GALAXY, spectrum: { kind: 'uploaded', spectrumId: '00000000-0000-4000-8000-000000000000' } },
    ],
  ])('refuses with the field: %s', async (path, light) => {
    expect(paths((await report({ redshift: 2, light }).expect(422)).body)).toContain(path);
  });

  it('refuses redshift 0 for a luminosity, and answers it for a magnitude as seen', async () => {
    expect(paths((await report({ redshift: 0, light: GALAXY }).expect(422)).body)).toEqual(['redshift']);
    const { body } = await report({
      redshift: 0,
      light: { kind: 'apparentMagnitude', magnitude: 18, bandId: 'V' },
    }).expect(200);
    expect(body.ledger.totalMagnitudeAb).toBeCloseTo(18, 9);
    expect(body.absoluteMagnitudeAb).toBeNull();
  });

  it('labels what is typical, with its source, and never leaves it unsaid', async () => {
    const { body } = await report({ redshift: 7, light: { kind: 'typical', of: 'starFormingGalaxy' } }).expect(200);
    expect(body.notices.map((notice: { code: string }) => notice.code)).toContain('typicalLight');
    expect(body.ledger.steps[0]).toMatchObject({ id: 'typical-magnitude', source: expect.stringContaining('Bouwens') });
    const sources = body.suggestions.map((suggestion: { source: string }) => suggestion.source);
    expect(sources.every((source: string) => source.length > 0)).toBe(true);
  });

  it('takes SFR = 10 to an Hα flux of 6.1e-17 at z = 2', async () => {
    const { body } = await report({
      redshift: 2,
      light: { kind: 'starFormationRate', solarMassesPerYear: 10, tracer: 'hydrogenAlpha' },
    }).expect(200);
    expect(body.ledger.lineFluxErgSCm2 / 6.137e-17).toBeCloseTo(1, 3);
    // 1.97 µm: in the gap between H and K, which no band holds.
    expect(body.ledger.bandId).toBeNull();
    expect(body.lines.find((line: { lineId: string }) => line.lineId === 'Ha').place).toBe('gap');
  });
});

describe('POST /light/reading', () => {
  const read = (text: string, rest: object = {}) =>
    app
      .http()
      .post('/api/v1/light/reading')
      .send({ text, ...rest });

  it.each([
    ['22.5 mag', { kind: 'apparentMagnitude', value: 22.5, system: 'AB' }],
    ['12 uJy', { kind: 'apparentMagnitude', system: 'AB' }],
    ['2e-17 erg/s/cm^2', { kind: 'lineFlux', value: 2e-17 }],
    ['1e42 erg/s', { kind: 'lineLuminosity', value: 1e42 }],
    ['8 Msun/yr', { kind: 'starFormationRate', value: 8 }],
    ['-21.3 mag absolute', { kind: 'absoluteMagnitude', value: -21.3 }],
  ])('%s', async (text, expected) => {
    expect((await read(text).expect(200)).body).toMatchObject(expected);
  });

  it.each(['12 m', '5 kg', 'bright', '', '-3 uJy', '23'])('refuses “%s” with a reason', async (text) => {
    const { body } = await read(text).expect(422);
    expect(body.fieldErrors[0].path).toBe('text');
    expect(body.fieldErrors[0].message.length).toBeGreaterThan(15);
  });

  it('takes a magnitude in the system of its field, unless it names one', async () => {
    const inVega = { bandId: 'J', system: 'Vega' };
    expect((await read('20 mag', inVega).expect(200)).body.system).toBe('Vega');
    expect((await read('20 mag AB', inVega).expect(200)).body.system).toBe('AB');
  });

  it('knows the band of a Vega magnitude', async () => {
    expect((await read('20 Vega', { bandId: 'J' }).expect(200)).body).toMatchObject({ system: 'Vega', value: 20 });
    await read('20 Vega', { bandId: 'g' }).expect(422);
  });
});

it('GET /light/suggestions offers typical values with source and validity', async () => {
  const { body } = await app.http().get('/api/v1/light/suggestions?redshift=6.8').expect(200);
  const uv = body.rows.find((row: { id: string }) => row.id === 'ultravioletMagnitude');
  // Bouwens et al. 2021, Table 5.
  expect(uv).toMatchObject({ value: -21.15, isExtrapolated: false, light: { kind: 'typical' } });
  const beyond = await app.http().get('/api/v1/light/suggestions?redshift=13').expect(200);
  expect(beyond.body.rows.find((row: { id: string }) => row.id === 'ultravioletMagnitude').isExtrapolated).toBe(true);
});

describe('the light of a stored target', () => {
  it('is that of its proposal’s cosmology, and only for its team', async () => {
    const target = await aTarget(draft, { redshift: 7, light: GALAXY });
    const url = `${draft.base}/targets/${target.targetId}/light`;
    const { body } = await draft.pi.get(`${url}?bandId=J`).expect(200);
    expect(body.ledger.totalMagnitudeAb).toBeCloseTo(25.983, 3);
    expect(target).toMatchObject({ computed: { bandMagnitudesAb: { J: body.ledger.totalMagnitudeAb } } });
    const stranger = await signedInAs(app, await aPerson(app));
    await stranger.get(url).expect(404);
    await app.http().get(url).expect(401);
  });

  it('changes with the cosmology only where a luminosity is given', async () => {
    const other = await aDraft(app);
    const { mode } = await aMode(app);
    await aTarget(other, { redshift: 3, light: { kind: 'apparentMagnitude', magnitude: 23, bandId: 'r' } });
    await aTarget(other, { redshift: 3, light: { ...GALAXY, magnitude: -22.5 } });
    await other.pi
      .post(`${other.base}/observations/apply`)
      .send({ targetIds: 'all', modeId: mode.id, goal: GOAL, conditions: CONDITIONS, repeatCount: 1 })
      .expect(200);
    const { body } = await other.pi.get(`${other.base}/cosmologies`).expect(200);
    expect(body).toMatchObject({ targetCount: 2, observationCount: 2, apparentCount: 1, intrinsicCount: 1 });
    const row = (id: string) => body.rows.find((each: { cosmologyId: string }) => each.cosmologyId === id);
    expect(row('planck18')).toMatchObject({ isChosen: true, changedObservationCount: 0, medianScaleRatio: 1 });
    expect(row('conv70').changedObservationCount).toBe(1);
    expect(row('conv70').medianDeltaDistanceModulusMag).toBeCloseTo(-0.0501, 3);
    expect(row('conv70').requestedSeconds).toBeLessThan(row('planck18').requestedSeconds);
  });
});

describe('what no number can be given for', () => {
  const narrow = { kind: 'percentiles', p16: 1, p50: 1 + 1e-12, p84: 1 + 2e-12 };
  it.each([
    ['a percentile at 0', { kind: 'percentiles', p16: 0, p50: 1, p84: 2 }, 'redshiftUncertainty.p16'],
    ['a percentile at 30', { kind: 'percentiles', p16: 28, p50: 29, p84: 30 }, 'redshiftUncertainty.p84'],
    ['percentiles that are nearly one', narrow, 'redshiftUncertainty'],
    ['percentiles of nothing', { kind: 'percentiles', p16: 1e-300, p50: 1e-9, p84: 2e-9 }, 'redshiftUncertainty'],
    ['a width of nothing', { kind: 'gaussian', sigma: 1e-300 }, 'redshiftUncertainty'],
    [
      'a table of nothing',
      { kind: 'table', redshifts: [1, 2], densities: [5e-324, 0] },
      'redshiftUncertainty.densities',
    ],
    [
      'a table of too much',
      { kind: 'table', redshifts: [0, 30], densities: [1e308, 1e308] },
      'redshiftUncertainty.densities',
    ],
    ['a table of no width', { kind: 'table', redshifts: [0, 1e-300], densities: [1, 1] }, 'redshiftUncertainty'],
  ])('refuses %s', async (_, redshiftUncertainty, path) => {
    const { body } = await report({ redshift: 7, light: GALAXY, redshiftUncertainty }).expect(422);
    expect(paths(body)).toEqual([path]);
  });

  it.each([
    [{ kind: 'lineFlux', fluxErgSCm2: 5e-324, restWavelengthNm: 121.567 }, 'light.fluxErgSCm2'],
    [{ kind: 'lineLuminosity', luminosityErgS: 1e-300, restWavelengthNm: 121.567 }, 'light.luminosityErgS'],
    [{ kind: 'starFormationRate', solarMassesPerYear: 5e-324 }, 'light.solarMassesPerYear'],
    [
      { kind: 'starFormationRate', solarMassesPerYear: 1, tracer: 'lymanAlpha', escapeFraction: 1e-300 },
      'light.escapeFraction',
    ],
    [{ ...GALAXY, magnification: 1e-300 }, 'light.magnification'],
  ])('refuses an amount that is next to nothing (case %#)', async (light, path) => {
    const { body } = await report({ redshift: 7, light }).expect(422);
    expect(paths(body)).toEqual([path]);
  });

  it('refuses a size that is next to nothing', async () => {
    const extent = { kind: 'sersic', halfLightRadius: 1e-300, unit: 'arcsec', axisRatio: 1e-300 };
    const { body } = await report({ redshift: 7, light: GALAXY, extent }).expect(422);
    expect(paths(body)).toEqual(['extent.halfLightRadius', 'extent.axisRatio']);
  });

  it('leaves out a circle that holds nothing, and says where dust leaves nothing', async () => {
    const { body: circle } = await report({ redshift: 7, light: GALAXY, apertureRadiusArcsec: 1e-300 }).expect(200);
    expect(circle.ledger.aperture).toBeNull();
    const dusty = {
      kind: 'absoluteMagnitude',
      magnitude: 60,
      restWavelengthNm: 1e6,
      spectrum: { kind: 'blackbody', temperatureK: 100 },
      hostDust: { law: 'ccm1989', colourExcessMag: 10, totalToSelective: 6 },
      galacticDust: { colourExcessMag: 10 },
      includes: { hostDust: false, galacticDust: false, lensing: false },
    };
    for (const redshift of [1e-9, 1, 7, 30]) {
      const { body } = await report({ redshift, light: dusty, bandId: 'U' }).expect(200);
      expect(JSON.stringify(body)).not.toMatch(/Infinity|NaN/);
      for (const band of body.bands) expect(band.magnitudeAb === null).toBe(band.reason !== null);
    }
  });
});

describe('twenty thousand draws', () => {
  it('leave others their turn', async () => {
    const light = {
      kind: 'typical',
      of: 'supernovaIa',
      spectrum: { kind: 'supernovaIa' },
      hostDust: { colourExcessMag: 0.2 },
      galacticDust: { colourExcessMag: 0.1 },
      includes: { hostDust: false, galacticDust: false, lensing: false },
    };
    let longestMs = 0;
    let last = performance.now();
    const clock = setInterval(() => {
      const now = performance.now();
      longestMs = Math.max(longestMs, now - last);
      last = now;
    }, 1);
    const { body } = await report({
      redshift: 1,
      redshiftUncertainty: { kind: 'gaussian', sigma: 0.1 },
      light,
      sampleCount: 20_000,
    }).expect(200);
    clearInterval(clock);
    expect(body.uncertainty.magnitudeHistogram.counts.reduce((sum: number, count: number) => sum + count)).toBe(20_000);
    // All at once they take seconds; in slices of tens of milliseconds, on a machine that is busy with other tests too.
    expect(longestMs).toBeLessThan(600);
  });
});

describe('a line', () => {
  it('has a size and no surface brightness, as in the columns of a target', async () => {
    const source = {
      redshift: 7,
      light: { kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567 },
      extent: { kind: 'sersic', halfLightRadius: 0.4, unit: 'arcsec' },
    };
    const target = await aTarget(draft, source);
    const { body } = await report(source).expect(200);
    expect(body.ledger.totalMagnitudeAb).not.toBeNull();
    expect(body.image.halfLightRadiusArcsec).toBe(0.4);
    expect(body.image.meanSurfaceBrightnessAbMagPerArcsec2).toBeNull();
    expect(target['computed']).toMatchObject({ halfLightRadiusArcsec: 0.4, surfaceBrightnessAbMagPerArcsec2: null });
  });
});
