import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  designationFromPosition,
  formatDeclination,
  formatRightAscension,
  parseDeclination,
  parsePosition,
  parseRightAscension,
  type ParsedAngle,
} from './index.js';

interface CoordinateStrings {
  readonly parse: readonly {
    field: 'ra' | 'dec';
    text: string;
    expected_deg: number | null;
    valid: boolean;
    remark: string;
  }[];
  readonly format: readonly { kind: 'ra' | 'dec'; deg: number; hms_2?: string; dms_1?: string }[];
}

const reference = JSON.parse(
  readFileSync(new URL('../../../tests/reference/coordinate-strings.json', import.meta.url), 'utf8'),
) as CoordinateStrings;

function parseField(field: 'ra' | 'dec', text: string): ParsedAngle {
  return field === 'ra' ? parseRightAscension(text) : parseDeclination(text);
}

function degreesOf(parsed: ParsedAngle): number {
  if (!parsed.ok) throw new Error(parsed.message);
  return parsed.degrees;
}

function codeOf(parsed: { readonly ok: boolean; readonly code?: string }): string | undefined {
  return parsed.ok ? undefined : parsed.code;
}

describe('parsing one coordinate', () => {
  it.each(reference.parse.filter((entry) => entry.valid))(
    'reads $field "$text" ($remark)',
    ({ field, text, expected_deg }) => {
      expect(expected_deg).not.toBeNull();
      expect(Math.abs(degreesOf(parseField(field, text)) - (expected_deg ?? Number.NaN))).toBeLessThan(1e-10);
    },
  );

  it.each(reference.parse.filter((entry) => !entry.valid))('refuses $field "$text" ($remark)', ({ field, text }) => {
    const parsed = parseField(field, text);
    expect(parsed).toMatchObject({ ok: false, code: expect.any(String), message: expect.any(String) });
  });

  it.each([
    ['ra', '25:10:00', 'out-of-range'],
    ['ra', '24:00:00', 'out-of-range'],
    ['ra', '24.0h', 'out-of-range'],
    ['ra', '10:60:00', 'minutes-out-of-range'],
    ['ra', '10:59:60', 'seconds-out-of-range'],
    ['ra', '-10:00:00', 'negative-right-ascension'],
    ['ra', '−12.5', 'negative-right-ascension'],
    ['ra', '10:-5:00', 'sign-inside'],
    ['ra', '10 00 -5', 'sign-inside'],
    ['ra', '', 'empty'],
    ['ra', ' \t', 'empty'],
    ['ra', 'abc', 'not-a-coordinate'],
    ['ra', '10:00:28.6:3', 'too-many-fields'],
    ['ra', '1e999', 'out-of-range'],
    ['ra', '150,1192', 'decimal-comma'],
    ['ra', '10:00:28,6', 'decimal-comma'],
    ['ra', '10.5:30:00', 'fraction-not-last'],
    ['ra', '10:00 28.6', 'mixed-notation'],
    ['ra', '10::28', 'not-a-coordinate'],
    ['ra', '0x10', 'not-a-coordinate'],
    ['ra', '1'.repeat(5000), 'not-a-coordinate'],
    ['dec', '--12:30:00', 'sign-inside'],
    ['dec', '12h30m00s', 'hours-in-declination'],
    ['dec', '+90:00:00.001', 'out-of-range'],
    ['dec', '90.0000001', 'out-of-range'],
    ['dec', 'NaN', 'not-a-coordinate'],
    ['dec', '-', 'not-a-coordinate'],
  ] as const)('names the reason for refusing %s "%s": %s', (field, text, code) => {
    expect(codeOf(parseField(field, text))).toBe(code);
  });

  it.each([
    ['ra', '03h55m04.9s', (3 * 3600 + 55 * 60 + 4.9) / 240],
    ['ra', '10ʰ00ᵐ28ˢ.6', 150.11916666666667],
    ['ra', '10H 00M 28.6S', 150.11916666666667],
    ['ra', '10h00m28.6', 150.11916666666667],
    ['ra', '10.5h', 157.5],
    ['ra', '10:30.5', 157.625],
    ['ra', '150d07m09s', 150.11916666666667],
    ['ra', '150°07′09″', 150.11916666666667],
    ['ra', '150.1 deg', 150.1],
    ['ra', '+10 00 00', 150],
    ['dec', '-27°48\'18"', -27.805],
    ['dec', "-27° 48' 18.0''", -27.805],
    ['dec', '-27º48’18”', -27.805],
    ['dec', '–27:48:18', -27.805],
    ['dec', '-38d11m42s', -38.195],
    ['dec', '-27°48′18″.5', -(27 * 3600 + 48 * 60 + 18.5) / 3600],
    ['dec', '-.5', -0.5],
    ['dec', '-0.5', -0.5],
    ['dec', '+ 12 30 00', 12.5],
    ['dec', '-27\u00a048\u00a018', -27.805],
    ['dec', '5e-1', 0.5],
  ] as const)('reads the notation %s "%s"', (field, text, degrees) => {
    expect(degreesOf(parseField(field, text))).toBeCloseTo(degrees, 11);
  });

  it('never answers minus zero', () => {
    expect(Object.is(degreesOf(parseDeclination('-00:00:00')), 0)).toBe(true);
  });
});

describe('parsing a position', () => {
  const field = { raDeg: 150.11916666666667, decDeg: -2.2058333333333335 };
  it.each([
    '10:00:28.6 -02:12:21',
    '10 00 28.6 -02 12 21',
    '10h00m28.6s-02d12m21s',
    '10:00:28.6, -02:12:21',
    '10:00:28.6\t−02:12:21.0',
    'J2000 10:00:28.6 -02:12:21',
    '10ʰ00ᵐ28ˢ.6 −2°12′21″',
  ])('divides "%s"', (text) => {
    const parsed = parsePosition(text);
    if (!parsed.ok) throw new Error(parsed.message);
    expect(parsed.position.raDeg).toBeCloseTo(field.raDeg, 11);
    expect(parsed.position.decDeg).toBeCloseTo(field.decDeg, 11);
  });

  it('divides unsigned coordinates in the middle', () => {
    expect(parsePosition('150.5 2.25')).toEqual({ ok: true, position: { raDeg: 150.5, decDeg: 2.25 } });
    expect(parsePosition('10 00 00 02 30 00')).toEqual({ ok: true, position: { raDeg: 150, decDeg: 2.5 } });
    // The sign of an exponent is not that of the declination.
    expect(parsePosition('5e-1 -2e-3')).toEqual({ ok: true, position: { raDeg: 0.5, decDeg: -0.002 } });
    expect(parsePosition('5.e-1 +2')).toEqual({ ok: true, position: { raDeg: 0.5, decDeg: 2 } });
    expect(codeOf(parsePosition('-5 +2'))).toBe('negative-right-ascension');
  });

  it('refuses what is not two coordinates and passes on the reason of a bad half', () => {
    expect(codeOf(parsePosition('10:00:28.6'))).toBe('not-two-coordinates');
    expect(codeOf(parsePosition(''))).toBe('not-two-coordinates');
    expect(codeOf(parsePosition('1, 2, 3'))).toBe('not-two-coordinates');
    expect(codeOf(parsePosition('10:61:00 +02:00:00'))).toBe('minutes-out-of-range');
    expect(codeOf(parsePosition('10:00:00 +92:00:00'))).toBe('out-of-range');
  });
});

describe('formatting', () => {
  it.each(reference.format)('writes $kind $deg', ({ kind, deg, hms_2, dms_1 }) => {
    if (kind === 'ra') expect(formatRightAscension(deg)).toBe(hms_2);
    else expect(formatDeclination(deg)).toBe(dms_1);
  });

  it('carries a second that rounds up to 60 through minutes and hours', () => {
    expect(formatRightAscension((10 * 3600 + 59 * 60 + 59.9996) / 240)).toBe('11:00:00.00');
    expect(formatDeclination((10 * 3600 + 59 * 60 + 59.9996) / 3600, { secondsDecimals: 3 })).toBe('+11:00:00.000');
    expect(formatDeclination(-89.99999999, { secondsDecimals: 0 })).toBe('-90:00:00');
  });

  it('writes the styles', () => {
    expect(formatRightAscension(150.11917, { style: 'letters' })).toBe('10h00m28.60s');
    expect(formatDeclination(-0.5, { style: 'letters', secondsDecimals: 0 })).toBe('-00d30m00s');
    expect(formatDeclination(2.2058, { style: 'spaces', secondsDecimals: 2 })).toBe('+02 12 20.88');
  });

  it('gives a plus to what rounds to zero', () => {
    expect(formatDeclination(-1e-9)).toBe('+00:00:00.0');
  });

  it('refuses values and digits outside their range', () => {
    expect(() => formatDeclination(90.1)).toThrow(/decDeg is 90.1/);
    expect(() => formatRightAscension(Number.NaN)).toThrow(/raDeg/);
    expect(() => formatRightAscension(1, { secondsDecimals: 10 })).toThrow(/secondsDecimals/);
    expect(() => formatRightAscension(1, { secondsDecimals: 1.5 })).toThrow(/secondsDecimals/);
  });

  it('comes back from parsing to 1e-10 degrees in every style', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 360, maxExcluded: true, noNaN: true }),
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.constantFrom('colons' as const, 'spaces' as const, 'letters' as const),
        (raDeg, decDeg, style) => {
          const ra = degreesOf(parseRightAscension(formatRightAscension(raDeg, { secondsDecimals: 9, style })));
          const dec = degreesOf(parseDeclination(formatDeclination(decDeg, { secondsDecimals: 9, style })));
          const turned = Math.abs(ra - raDeg);
          expect(Math.min(turned, 360 - turned)).toBeLessThan(1e-10);
          expect(Math.abs(dec - decDeg)).toBeLessThan(1e-10);
        },
      ),
    );
  });

  it('comes back from parsing both coordinates in one text', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 359.9, noNaN: true }),
        fc.double({ min: -90, max: 90, noNaN: true }),
        (raDeg, decDeg) => {
          const text = `${formatRightAscension(raDeg, { secondsDecimals: 9, style: 'spaces' })} ${formatDeclination(decDeg, { secondsDecimals: 9, style: 'spaces' })}`;
          const parsed = parsePosition(text);
          if (!parsed.ok) throw new Error(parsed.message);
          expect(Math.abs(parsed.position.raDeg - raDeg)).toBeLessThan(1e-10);
          expect(Math.abs(parsed.position.decDeg - decDeg)).toBeLessThan(1e-10);
        },
      ),
    );
  });

  it('never shows a field of 60 and always parses, whatever the digits', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 360, noNaN: true }),
        fc.integer({ min: 0, max: 9 }),
        (raDeg, secondsDecimals) => {
          const text = formatRightAscension(raDeg, { secondsDecimals });
          expect(text).not.toMatch(/:60/);
          expect(parseRightAscension(text).ok).toBe(true);
        },
      ),
    );
  });
});

describe('designation', () => {
  it('truncates instead of rounding', () => {
    expect(designationFromPosition({ raDeg: 187.70593076, decDeg: 12.39112328 })).toBe('J123049.42+122328.0');
    expect(designationFromPosition({ raDeg: 14.9999999, decDeg: -29.9999999 })).toBe('J005959.99-295959.9');
    expect(
      designationFromPosition({ raDeg: 359.99999999, decDeg: 0 }, { raSecondsDecimals: 0, decSecondsDecimals: 0 }),
    ).toBe('J235959+000000');
  });

  it('puts an acronym in front', () => {
    expect(
      designationFromPosition(
        { raDeg: 0, decDeg: -0.001 },
        { acronym: 'ABC', raSecondsDecimals: 1, decSecondsDecimals: 0 },
      ),
    ).toBe('ABC J000000.0-000003');
  });

  it('keeps the digits of a sexagesimal coordinate that went through degrees', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 0, max: 8_639_999 }),
        fc.integer({ min: -3_239_999, max: 3_239_999 }),
        (raUnits, decUnits) => {
          const ra = formatRightAscension(raUnits / 24_000, { secondsDecimals: 2 });
          const dec = formatDeclination(decUnits / 36_000, { secondsDecimals: 1 });
          const raDeg = degreesOf(parseRightAscension(ra));
          const decDeg = degreesOf(parseDeclination(dec));
          expect(designationFromPosition({ raDeg, decDeg })).toBe(`J${ra}${dec}`.replaceAll(':', ''));
        },
      ),
    );
  });
});
