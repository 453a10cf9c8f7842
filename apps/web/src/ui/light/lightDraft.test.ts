import { Extent, Light, RedshiftUncertainty } from '@faintward/contracts/light';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { emptyLightDraft, toLightDraft, usuallyContained } from './lightDraft';
import { lightFieldOf, readLightDraft } from './readLightDraft';
import { readRedshiftDraft, toRedshiftDraft } from './redshiftDraft';

// −0 is no number that JSON or a person could send.
const between = (min: number, max: number) =>
  fc.double({ min, max, noNaN: true, noDefaultInfinity: true }).map((value) => value + 0);
const above = (max: number) => between(1e-30, max);
const magnitude = between(-60, 60);
const band = fc.constantFrom('U', 'B', 'g', 'J', 'Ks');
const system = fc.constantFrom('AB', 'Vega');
const id = fc.uuid();

const spectrum = fc.oneof(
  fc.record({ kind: fc.constant('powerLaw'), slopeBeta: between(-10, 10), escapeFraction: between(0, 1) }),
  fc.record({
    kind: fc.constant('starForming'),
    slopeBeta: between(-10, 10),
    breakRatio: between(1, 4),
    lymanAlphaNm: between(0, 1000),
    oxygenIINm: between(0, 1000),
    oxygenIIIHydrogenBetaNm: between(0, 1000),
    hydrogenAlphaNm: between(0, 1000),
  }),
  fc.record({ kind: fc.constant('passive') }),
  fc.record({ kind: fc.constant('quasar'), template: fc.constantFrom('powerLaws', 'hewettWild2010') }),
  fc.record({ kind: fc.constant('supernovaIa'), phaseDays: between(-15, 60) }),
  fc.record({ kind: fc.constant('blackbody'), temperatureK: between(100, 1e6) }),
  fc.record({ kind: fc.constant('uploaded'), spectrumId: id }),
);
const derivedWith = fc.oneof(
  fc.constant(null),
  fc.constantFrom('planck18', 'conv70'),
  fc.record(
    {
      hubbleConstantKmSMpc: between(1, 1000),
      omegaMatter: between(0, 10),
      w0: between(-10, 10),
      neutrinoMassesEv: fc.array(between(0, 10), { maxLength: 3 }),
    },
    { requiredKeys: ['hubbleConstantKmSMpc', 'omegaMatter'] },
  ),
);
const onTheWay = {
  hostDust: fc.option(
    fc.record({
      law: fc.constantFrom('calzetti2000', 'ccm1989', 'fitzpatrick1999'),
      colourExcessMag: between(0, 10),
      totalToSelective: fc.option(between(2, 6)),
    }),
  ),
  galacticDust: fc.option(
    fc.record({
      colourExcessMag: between(0, 10),
      scale: fc.constantFrom('sfd', 'true'),
      law: fc.constantFrom('fitzpatrick1999', 'ccm1989'),
    }),
  ),
  magnification: above(1e4),
  sigmaLnMagnification: between(0, 3),
  intergalactic: fc.constantFrom('inoue2014', 'madau1995', 'none'),
  sigmaMag: between(0, 5),
  includes: fc.record({ hostDust: fc.boolean(), galacticDust: fc.boolean(), lensing: fc.boolean() }),
};
const line = {
  restWavelengthNm: between(1, 1e6),
  velocityWidthKmS: between(0, 30_000),
  continuum: fc.option(
    fc.oneof(
      fc.record({ kind: fc.constant('magnitude'), magnitudeAb: magnitude }),
      fc.record({ kind: fc.constant('equivalentWidth'), restEquivalentWidthNm: above(1e5) }),
    ),
  ),
};
const kinds: Record<Light['kind'], Record<string, fc.Arbitrary<unknown>>> = {
  apparentMagnitude: { magnitude, system, bandId: band, spectrum },
  absoluteMagnitude: {
    magnitude,
    system,
    restWavelengthNm: between(1, 1e6),
    restBandId: fc.option(band),
    derivedWith,
    spectrum,
  },
  lineFlux: { fluxErgSCm2: above(1), ...line },
  lineLuminosity: { luminosityErgS: above(1e60), ...line, derivedWith },
  starFormationRate: {
    solarMassesPerYear: above(1e6),
    calibration: fc.constantFrom('kennicutt1998', 'kennicuttEvans2012', 'madauDickinson2014'),
    tracer: fc.constantFrom('ultraviolet', 'hydrogenAlpha', 'lymanAlpha'),
    escapeFraction: fc.option(above(1)),
    velocityWidthKmS: between(0, 30_000),
    derivedWith,
    spectrum,
  },
  typical: { of: fc.constantFrom('starFormingGalaxy', 'supernovaIa'), spectrum },
};

function lights(kind: Light['kind']): fc.Arbitrary<Light> {
  const optional = new Set(['sigmaLnMagnification', 'sigmaMag']);
  const model = { kind: fc.constant(kind), ...kinds[kind], ...onTheWay };
  return fc
    .record(model, { requiredKeys: Object.keys(model).filter((key) => !optional.has(key)) as never[] })
    .map((input) => Light.parse(input));
}
const extents = fc
  .oneof(
    fc.record({ kind: fc.constantFrom('point', 'uniform') }),
    fc.record({
      kind: fc.constant('sersic'),
      halfLightRadius: above(10_000),
      unit: fc.constantFrom('kpc', 'arcsec'),
      sersicIndex: between(0.3, 8),
      axisRatio: above(1),
    }),
    fc.record({
      kind: fc.constant('typical'),
      relation: fc.constantFrom('shibuya2015', 'vanDerWel2014Late', 'vanDerWel2014Early'),
      stellarMassSolar: between(1e6, 1e13),
      sersicIndex: between(0.3, 8),
      axisRatio: above(1),
    }),
  )
  .map((input) => Extent.parse(input));

describe('a draft of light and size', () => {
  it.each(Object.keys(kinds) as Light['kind'][])('says the same %s after being drafted and read', (kind) => {
    fc.assert(
      fc.property(lights(kind), extents, (light, extent) => {
        expect(readLightDraft(toLightDraft(light, extent))).toEqual({ ok: true, light, extent });
      }),
      { numRuns: 200 },
    );
  });

  it('keeps what other kinds hold when a light of one kind is put over it', () => {
    const light = Light.parse({ kind: 'lineFlux', fluxErgSCm2: 2e-17, restWavelengthNm: 121.567 });
    const before = { ...emptyLightDraft, light: 'apparentMagnitude' as const, magnitude: '24.1' };
    const after = toLightDraft(light, { kind: 'point' }, before);
    expect(readLightDraft({ ...after, light: 'apparentMagnitude' })).toMatchObject({
      ok: true,
      light: { magnitude: 24.1 },
    });
  });

  it('has the contract’s defaults for what a value of each kind contains', () => {
    const least: Record<Light['kind'], object> = {
      apparentMagnitude: { magnitude: 20, bandId: 'V' },
      absoluteMagnitude: { magnitude: -20 },
      lineFlux: { fluxErgSCm2: 1e-17, restWavelengthNm: 121 },
      lineLuminosity: { luminosityErgS: 1e42, restWavelengthNm: 121 },
      starFormationRate: { solarMassesPerYear: 8 },
      typical: { of: 'supernovaIa' },
    };
    for (const [kind, input] of Object.entries(least)) {
      expect(Light.parse({ kind, ...input }).includes).toEqual(usuallyContained[kind as Light['kind']]);
    }
  });

  it('says which field lacks and which is wrong', () => {
    const read = readLightDraft({
      ...emptyLightDraft,
      light: 'absoluteMagnitude',
      absolute: '',
      rest: 'abc',
      derivedWith: 'own',
      derivedH0: '0',
      derivedOm: '',
      galacticDust: '-1',
    });
    expect(read).toMatchObject({ ok: false, errors: { absolute: 'Needed.', derivedOm: 'Needed.' } });
    if (read.ok) return;
    expect(read.errors.rest).toBe('A wavelength is a number.');
    expect(read.errors.galacticDust).toBe('A colour excess is 0 or more.');
    expect(read.errors.derivedH0).toBeDefined();
  });

  it('does not take a text with a unit for a value, nor lose it', () => {
    expect(readLightDraft({ ...emptyLightDraft, typed: '12 uJy' })).toMatchObject({
      ok: false,
      errors: { typed: /Enter/ },
    });
    expect(readLightDraft({ ...emptyLightDraft, light: 'lineFlux', flux: '2e-17 erg/s/cm^2' })).toMatchObject({
      ok: false,
      errors: { flux: /Enter/ },
    });
  });

  it('finds the field of every path that the contract can refuse', () => {
    const draft = { ...emptyLightDraft, light: 'absoluteMagnitude' as const };
    expect(lightFieldOf('light.magnitude', draft)).toBe('absolute');
    expect(lightFieldOf('light.spectrum.slopeBeta', draft)).toBe('slope');
    expect(lightFieldOf('light.hostDust.colourExcessMag', draft)).toBe('hostDust');
    expect(lightFieldOf('light.includes', draft)).toBe('light');
    expect(lightFieldOf('extent.sersicIndex', { ...draft, extent: 'typical' })).toBe('typicalSersic');
    expect(lightFieldOf('name', draft)).toBeUndefined();
  });
});

describe('a draft of a redshift', () => {
  const redshift = between(0, 30);
  const percentiles = fc
    .uniqueArray(redshift, { minLength: 3, maxLength: 3 })
    .map((values) => values.toSorted((a, b) => a - b))
    .map(([p16, p50, p84]) => ({ kind: 'percentiles', p16, p50, p84 }));
  const table = fc
    .uniqueArray(redshift, { minLength: 2, maxLength: 30 })
    .map((values) => values.toSorted((a, b) => a - b))
    .map((redshifts) => ({ kind: 'table', redshifts, densities: redshifts.map((_, index) => index) }));
  const uncertainty = fc
    .oneof(fc.record({ kind: fc.constant('gaussian'), sigma: above(10) }), percentiles, table)
    .map((input) => RedshiftUncertainty.parse(input));

  it('says the same after being drafted and read', () => {
    fc.assert(
      fc.property(
        redshift,
        fc.constantFrom('spectroscopic' as const, 'photometric' as const, 'assumed' as const),
        fc.option(uncertainty),
        (z, redshiftKind, one) => {
          expect(readRedshiftDraft(toRedshiftDraft(z, redshiftKind, one))).toEqual({
            ok: true,
            redshift: z,
            redshiftKind,
            uncertainty: one,
          });
        },
      ),
    );
  });

  it('says what is wrong under its field', () => {
    const draft = toRedshiftDraft(7, 'photometric', { kind: 'percentiles', p16: 6.8, p50: 7, p84: 7.4 });
    expect(readRedshiftDraft({ ...draft, p50: '8' })).toEqual({
      ok: false,
      errors: { p50: 'The three percentiles must ascend.' },
    });
    expect(readRedshiftDraft({ ...draft, redshift: '−1', uncertainty: 'gaussian' })).toMatchObject({
      ok: false,
      errors: { redshift: /blueshift/, sigmaZ: 'Needed.' },
    });
    expect(readRedshiftDraft({ ...draft, uncertainty: 'table' })).toMatchObject({
      ok: false,
      errors: { table: /Paste/ },
    });
  });
});
