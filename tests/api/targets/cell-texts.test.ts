import { type BandId, Light, RedshiftUncertainty } from '@faintward/contracts/light';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { uncertaintyFaults } from '../../../apps/api/src/engine/redshift-faults.js';
import { addDecimals, subtractDecimals } from '../../../apps/api/src/modules/targets/exact-decimals.js';
import { formatBrightness } from '../../../apps/api/src/modules/targets/brightness-format.js';
import { parseBrightness } from '../../../apps/api/src/modules/targets/brightness-text.js';
import {
  formatRedshiftUncertainty,
  movedWithRedshift,
  parseRedshiftUncertainty,
} from '../../../apps/api/src/modules/targets/redshift-uncertainty-text.js';

// −0 is no number that JSON or a person could send.
const between = (min: number, max: number) =>
  fc.double({ min, max, noNaN: true, noDefaultInfinity: true }).map((value) => value + 0);
const above = (max: number) => between(1e-300, max);

const read = (text: string, present: Light | null = null) =>
  parseBrightness(text, { present, bandId: 'V', system: 'AB' });
const lightOf = (text: string, present: Light | null = null): Light | null => {
  const parsed = read(text, present);
  if (!parsed.ok) throw new Error(parsed.message);
  return parsed.light;
};

describe('a brightness in a cell', () => {
  const way = {
    hostDust: fc.option(fc.record({ colourExcessMag: between(0, 10) })),
    galacticDust: fc.option(fc.record({ colourExcessMag: between(0, 10), scale: fc.constantFrom('sfd', 'true') })),
    magnification: above(1e4),
    intergalactic: fc.constantFrom('inoue2014', 'madau1995', 'none'),
    sigmaMag: between(0, 5),
  };
  const spectrum = fc.oneof(
    fc.record({ kind: fc.constant('powerLaw'), slopeBeta: between(-10, 10) }),
    fc.record({ kind: fc.constant('supernovaIa'), phaseDays: between(-15, 60) }),
    fc.record({ kind: fc.constant('uploaded'), spectrumId: fc.uuid() }),
  );
  const vegaBand = fc.constantFrom<BandId>('U', 'B', 'V', 'R', 'I', 'J', 'H', 'Ks');
  const anyBand = fc.constantFrom<BandId>('B', 'u', 'g', 'r', 'i', 'z', 'Y', 'J', 'Ks');
  const nm = between(1, 1e6);
  const magnitude = between(-60, 60);
  const kinds: Record<string, Record<string, fc.Arbitrary<unknown>>> = {
    'apparentMagnitude in AB': { magnitude, bandId: anyBand, spectrum },
    'apparentMagnitude in Vega': { magnitude, bandId: vegaBand, system: fc.constant('Vega'), spectrum },
    'absoluteMagnitude at a wavelength': { magnitude, restWavelengthNm: nm, spectrum },
    'absoluteMagnitude in a band': {
      magnitude,
      restBandId: vegaBand,
      system: fc.constantFrom('AB', 'Vega'),
      spectrum,
    },
    lineFlux: { fluxErgSCm2: above(1), restWavelengthNm: nm, velocityWidthKmS: between(0, 30_000) },
    lineLuminosity: { luminosityErgS: above(1e60), restWavelengthNm: nm },
    starFormationRate: {
      solarMassesPerYear: above(1e6),
      tracer: fc.constantFrom('ultraviolet', 'hydrogenAlpha', 'lymanAlpha'),
      escapeFraction: between(0.01, 1),
    },
    typical: { of: fc.constantFrom('starFormingGalaxy', 'supernovaIa'), spectrum },
  };

  it.each(Object.keys(kinds))('as %s is the same light after it was shown and read', (name) => {
    const lights = fc
      .record({ kind: fc.constant(name.split(' ')[0]), ...kinds[name], ...way })
      .map((input) => Light.parse(input));
    fc.assert(
      fc.property(lights, (light) => {
        expect(lightOf(formatBrightness(light), light)).toEqual(light);
      }),
      { numRuns: 300 },
    );
  });

  it.each(Object.keys(kinds))('as %s has a value of which the text alone says every digit', (name) => {
    const { spectrum: _shape, velocityWidthKmS: _width, escapeFraction: _escape, ...said } = kinds[name] ?? {};
    const lights = fc.record({ kind: fc.constant(name.split(' ')[0]), ...said }).map((input) => Light.parse(input));
    fc.assert(
      fc.property(lights, (light) => {
        const again = lightOf(formatBrightness(light));
        const unshaped = light.kind === 'typical' ? { ...again, spectrum: light.spectrum } : again;
        expect(unshaped).toEqual(light);
      }),
      { numRuns: 300 },
    );
  });

  it.each([
    ['8 Msun/yr', { kind: 'starFormationRate', solarMassesPerYear: 8, tracer: 'ultraviolet' }, '8 Msun/yr'],
    ['8 M_sun yr-1 (Ha)', { solarMassesPerYear: 8, tracer: 'hydrogenAlpha' }, '8 Msun/yr (Hα)'],
    ['SFR = 12.5 M☉/yr', { solarMassesPerYear: 12.5 }, '12.5 Msun/yr'],
    ['M -21.3 Vega (B)', { kind: 'absoluteMagnitude', magnitude: -21.3, system: 'Vega', restBandId: 'B' }, null],
    ['M −21.3 Vega (B)', { magnitude: -21.3, system: 'Vega', restBandId: 'B' }, 'M -21.30 Vega (B)'],
    ['M_B = -19.3 Vega', { magnitude: -19.3, system: 'Vega', restBandId: 'B' }, 'M -19.30 Vega (B)'],
    ['M_UV -21.5', { magnitude: -21.5, system: 'AB', restBandId: null, restWavelengthNm: 150 }, 'M -21.50 (150 nm)'],
    ['M -21.3', { magnitude: -21.3, system: 'AB', restBandId: null, restWavelengthNm: 150 }, 'M -21.30 (150 nm)'],
    ['M -21.3 (J)', { magnitude: -21.3, system: 'AB', restBandId: 'J' }, 'M -21.30 AB (J)'],
    ['typical galaxy', { kind: 'typical', of: 'starFormingGalaxy' }, 'typical galaxy'],
    ['Typical SN Ia', { kind: 'typical', of: 'supernovaIa', spectrum: { kind: 'supernovaIa' } }, null],
    ['24.1 J', { kind: 'apparentMagnitude', magnitude: 24.1, bandId: 'J' }, '24.10 AB (J)'],
    ['-21.3 mag absolute', { kind: 'absoluteMagnitude', magnitude: -21.3, system: 'AB', restWavelengthNm: 150 }, null],
    ['m = 22.1 Vega', { kind: 'apparentMagnitude', magnitude: 22.1, system: 'Vega', bandId: 'V' }, '22.10 Vega (V)'],
    ['22.5 mag Vega', { kind: 'apparentMagnitude', magnitude: 22.5, system: 'Vega', bandId: 'V' }, null],
    ['12 Msun yr^-1', { kind: 'starFormationRate', solarMassesPerYear: 12, tracer: 'ultraviolet' }, '12 Msun/yr'],
    ['1e42 erg/s (656.46 nm)', { kind: 'lineLuminosity', luminosityErgS: 1e42, restWavelengthNm: 656.46 }, null],
  ])('is read from %s', (text, light, shown) => {
    const parsed = lightOf(text);
    expect(parsed).toMatchObject(light);
    if (shown !== null) expect(formatBrightness(parsed)).toBe(shown);
  });

  it('keeps what a cell cannot say, also when the light becomes one of another kind', () => {
    const present = Light.parse({
      kind: 'apparentMagnitude',
      magnitude: 24,
      bandId: 'J',
      spectrum: { kind: 'quasar' },
      includes: { hostDust: false, galacticDust: false, lensing: false },
      hostDust: { colourExcessMag: 0.2 },
      magnification: 12,
      sigmaMag: 0.1,
    });
    expect(lightOf('23.5', present)).toEqual({ ...present, magnitude: 23.5 });
    const absolute = lightOf('M -21.5', present);
    expect(absolute).toMatchObject({
      kind: 'absoluteMagnitude',
      restWavelengthNm: 150,
      spectrum: { kind: 'quasar', template: 'powerLaws' },
      hostDust: { colourExcessMag: 0.2 },
      magnification: 12,
      // Of an amount at the source, which holds neither the Galaxy's dust nor a lens.
      includes: { hostDust: true, galacticDust: false, lensing: false },
    });
    expect(absolute).not.toHaveProperty('sigmaMag');
    const line = Light.parse({
      kind: 'lineFlux',
      fluxErgSCm2: 1e-17,
      restWavelengthNm: 656.46,
      velocityWidthKmS: 400,
      continuum: { kind: 'magnitude', magnitudeAb: 25 },
    });
    expect(lightOf('3e-17 erg/s/cm^2', line)).toEqual({ ...line, fluxErgSCm2: 3e-17 });
    expect(lightOf('2e42 erg/s', line)).toMatchObject({
      restWavelengthNm: 656.46,
      velocityWidthKmS: 400,
      continuum: { magnitudeAb: 25 },
    });
  });

  it.each([
    ['24.1', 'absoluteMagnitude', { magnitude: -21 }, /apparent or an absolute/],
    ['24.1', 'starFormationRate', { solarMassesPerYear: 3 }, /24.1 Msun\/yr/],
    ['-8 Msun/yr', null, {}, /solarMassesPerYear/],
    ['0 Msun/yr', null, {}, /solarMassesPerYear/],
    ['22 Vega (g)', null, {}, /only used with AB/],
    ['m = 22 Vega (g)', null, {}, /only used with AB/],
    ['typical star', null, {}, /Write it like/],
    ['2e-17 erg/s/cm^2 (J)', null, {}, /rest wavelength/],
  ])('%s over %s is refused', (text, kind, value, message) => {
    const parsed = read(text, kind === null ? null : Light.parse({ kind, ...value }));
    expect(parsed.ok ? '' : parsed.message).toMatch(message);
  });
});

describe('decimal sums', () => {
  it.each([
    [addDecimals(7, 0.05), '7.05'],
    [subtractDecimals(7.05, 7), '0.05'],
    [subtractDecimals('7', '.03'), '6.97'],
    [addDecimals(1e-7, 1), '1.0000001'],
    [addDecimals(1e21, 1), '1000000000000000000001'],
    [subtractDecimals(0.1, 0.1), '0'],
    [subtractDecimals(1, '1.25'), '-0.25'],
  ])('%s is %s', (sum, text) => {
    expect(sum).toBe(text);
  });

  it('undo each other to the last digit', () => {
    fc.assert(
      fc.property(between(0, 30), between(0, 30), (a, b) => {
        expect(Number(subtractDecimals(addDecimals(a, b), b))).toBe(a);
        // The exact sum, rounded once: the sum of doubles.
        expect(Math.abs(Number(addDecimals(a, b)) - (a + b))).toBeLessThan(1e-14);
      }),
    );
  });
});

describe('the uncertainty of a redshift in a cell', () => {
  const parse = (text: string, redshift: number | undefined = 7.1, uncertainty: RedshiftUncertainty | null = null) =>
    parseRedshiftUncertainty(text, { redshift, present: { redshift: 7.1, uncertainty } });

  it.each([
    ['0.02', { kind: 'gaussian', sigma: 0.02 }],
    ['±0.02', { kind: 'gaussian', sigma: 0.02 }],
    ['+/- 0.02', { kind: 'gaussian', sigma: 0.02 }],
    ['+0.05 -0.03', { kind: 'percentiles', p16: 7.07, p50: 7.1, p84: 7.15 }],
    ['+0.05/−0.03', { kind: 'percentiles', p16: 7.07, p50: 7.1, p84: 7.15 }],
    ['-0.03 +0.05', { kind: 'percentiles', p16: 7.07, p50: 7.1, p84: 7.15 }],
    ['6.9 +0.05 -0.03', { kind: 'percentiles', p16: 6.87, p50: 6.9, p84: 6.95 }],
    ['', null],
    ['0', null],
  ])('is read from "%s"', (text, uncertainty) => {
    expect(parse(text)).toMatchObject({ ok: true, uncertainty });
  });

  it.each([
    'abc',
    '0.02, 0.03',
    '-0.02',
    '+0.05 +0.03',
    'p(z), 2 peaks',
    '+1 -8',
    '11',
    '+25 -1',
    '+0 -1',
    '+1e999999999 -1',
    '+1e-999999999 -1',
  ])('refuses "%s" and says what would be right', (text) => {
    const parsed = parse(text);
    expect(parsed.ok ? '' : parsed.message).toMatch(/Write it like|upload|below the redshift/);
  });

  it('says nothing while the redshift that it is measured from cannot be read', () => {
    expect(parseRedshiftUncertainty('+0.05 -0.03', { redshift: undefined, present: undefined })).toEqual({
      ok: true,
      uncertainty: undefined,
    });
  });

  it('comes back as it was shown, with every digit', () => {
    const percentiles = fc
      .tuple(between(1e-6, 29.9), between(1e-6, 29.9), between(1e-6, 29.9))
      .map((values) => values.toSorted((a, b) => a - b))
      .filter(([a = 0, b = 0, c = 0]) => a < b && b < c)
      .map(([p16 = 0, p50 = 0, p84 = 0]) => ({ kind: 'percentiles' as const, p16, p50, p84 }));
    const gaussians = above(10).map((sigma) => ({ kind: 'gaussian' as const, sigma }));
    fc.assert(
      fc.property(fc.oneof(percentiles, gaussians), fc.boolean(), (uncertainty, isAround) => {
        const redshift = isAround && uncertainty.kind === 'percentiles' ? uncertainty.p50 : 3;
        const text = formatRedshiftUncertainty(uncertainty, redshift);
        // Of a new target there is nothing to keep: the text alone has to say it.
        expect(parseRedshiftUncertainty(text, { redshift, present: undefined })).toEqual({ ok: true, uncertainty });
      }),
      { numRuns: 500 },
    );
  });

  it('of a distribution is its peaks, and keeps it when it comes back unchanged', () => {
    const table: RedshiftUncertainty = {
      kind: 'table',
      redshifts: [0.5, 1, 1.5, 6, 7, 8],
      densities: [0, 1, 0, 0, 3, 0],
    };
    expect(formatRedshiftUncertainty(table, 7)).toBe('p(z), 2 peaks');
    expect(parse('p(z), 2 peaks', 7.1, table)).toEqual({ ok: true, uncertainty: table });
    expect(parse('', 7.1, table)).toEqual({ ok: true, uncertainty: null });
    expect(parse('p(z), 1 peak', 7.1, table).ok).toBe(false);
    const single: RedshiftUncertainty = { ...table, densities: [0, 0, 0, 0, 3, 0] };
    expect(formatRedshiftUncertainty(single, 7)).toBe('p(z), 1 peak');
  });

  it('stays around a redshift that is corrected', () => {
    const around: RedshiftUncertainty = { kind: 'percentiles', p16: 7.07, p50: 7.1, p84: 7.15 };
    const moved = { kind: 'percentiles', p16: 6.47, p50: 6.5, p84: 6.55 };
    expect(movedWithRedshift(around, 7.1, 6.5)).toEqual(moved);
    expect(parse('+0.05 −0.03', 6.5, around)).toEqual({ ok: true, uncertainty: moved });
    const apart: RedshiftUncertainty = { ...around, p50: 7.11 };
    expect(movedWithRedshift(apart, 7.1, 6.5)).toEqual(apart);
  });

  it('that has the form of percentiles but cannot be drawn from is told', () => {
    expect(
      uncertaintyFaults({ redshift: 1, redshiftUncertainty: { kind: 'percentiles', p16: 0, p50: 1, p84: 2 } }),
    ).toEqual([{ path: 'redshiftUncertainty.p16', message: expect.stringContaining('above 0') }]);
  });
});
