import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  angularSeparationDeg,
  ephemerisDateFromJulianDate,
  greenwichApparentSiderealTimeDeg,
  greenwichMeanSiderealTimeDeg,
  julianDateFromModified,
  julianDateFromUnixMs,
  localSiderealTimeDeg,
  modifiedJulianDateFromJulianDate,
  normaliseDegrees,
  precess,
  precessionFromJ2000,
  sunPosition,
  unixMsFromJulianDate,
} from './index.js';

function read<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(`../../../tests/reference/sky/${name}`, import.meta.url), 'utf8')) as T;
}

interface Instant {
  readonly utc: string;
  readonly jd_utc: number;
  readonly mjd_utc: number;
  readonly gmst_deg: number;
  readonly gast_deg: number;
  readonly sun_ra_of_date_deg: number;
  readonly sun_dec_of_date_deg: number;
  readonly sites: Readonly<Record<string, { readonly last_deg: number }>>;
}

const instants = read<{
  meta: { sites: readonly { id: string; longitude_east_deg: number }[] };
  rows: readonly Instant[];
}>('instants.json');
const frames = read<{
  rows: readonly {
    target: string;
    ra_deg: number;
    dec_deg: number;
    mean_place: readonly { equinox_jyear: number; ra_deg: number; dec_deg: number }[];
  }[];
}>('frames.json');

/** Difference of two angles in seconds of arc, the short way round. */
function differenceArcsec(a: number, b: number): number {
  return Math.abs(((a - b + 540) % 360) - 180) * 3600;
}

describe('time', () => {
  it('has the Julian date of the reference instants', () => {
    expect(instants.rows.length).toBeGreaterThan(30);
    for (const row of instants.rows) {
      const jd = julianDateFromUnixMs(Date.parse(row.utc));
      expect(Math.abs(jd - row.jd_utc)).toBeLessThan(1e-9);
      expect(Math.abs(modifiedJulianDateFromJulianDate(jd) - row.mjd_utc)).toBeLessThan(1e-9);
    }
  });

  it('comes back from a Julian date to the millisecond', () => {
    fc.assert(
      fc.property(fc.integer({ min: -2_000_000_000_000, max: 4_000_000_000_000 }), (unixMs) => {
        const jd = julianDateFromUnixMs(unixMs);
        expect(unixMsFromJulianDate(jd)).toBe(unixMs);
        expect(julianDateFromModified(modifiedJulianDateFromJulianDate(jd))).toBe(jd);
      }),
    );
  });

  it('has sidereal time within an arcsecond of ERFA', () => {
    for (const row of instants.rows) {
      expect(differenceArcsec(greenwichMeanSiderealTimeDeg(row.jd_utc), row.gmst_deg)).toBeLessThan(1);
      expect(differenceArcsec(greenwichApparentSiderealTimeDeg(row.jd_utc), row.gast_deg)).toBeLessThan(1);
      for (const site of instants.meta.sites) {
        const expected = row.sites[site.id]?.last_deg;
        if (expected === undefined) throw new Error(`no local sidereal time for ${site.id} at ${row.utc}`);
        expect(differenceArcsec(localSiderealTimeDeg(row.jd_utc, site.longitude_east_deg), expected)).toBeLessThan(1);
      }
    }
  });
});

describe('Sun', () => {
  it('is within 0.01 degrees of ERFA and so of DE405', () => {
    for (const row of instants.rows) {
      const expected = { raDeg: row.sun_ra_of_date_deg, decDeg: row.sun_dec_of_date_deg };
      expect(angularSeparationDeg(sunPosition(row.jd_utc), expected)).toBeLessThan(0.01);
    }
  });
});

describe('precession', () => {
  it('gives the mean places of 1950 to 2050 within an arcsecond', () => {
    let compared = 0;
    for (const row of frames.rows) {
      for (const place of row.mean_place) {
        const julianDate = 2_451_545 + (place.equinox_jyear - 2000) * 365.25;
        const found = precess({ raDeg: row.ra_deg, decDeg: row.dec_deg }, precessionFromJ2000(julianDate));
        expect(angularSeparationDeg(found, { raDeg: place.ra_deg, decDeg: place.dec_deg }) * 3600).toBeLessThan(1);
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(50);
  });

  it('leaves places alone at J2000 itself', () => {
    expect(precess({ raDeg: 200, decDeg: -80 }, precessionFromJ2000(2_451_545)).raDeg).toBeCloseTo(200, 10);
  });
});

describe('angles', () => {
  it('are brought into [0, 360), once and for all', () => {
    fc.assert(
      fc.property(fc.double({ min: -1e6, max: 1e6, noNaN: true }), (degrees) => {
        const normal = normaliseDegrees(degrees);
        expect(normal).toBeGreaterThanOrEqual(0);
        expect(normal).toBeLessThan(360);
        expect(normaliseDegrees(normal)).toBe(normal);
      }),
    );
    expect(normaliseDegrees(-1e-20)).toBe(0);
    expect(Object.is(normaliseDegrees(-360), 0)).toBe(true);
  });
});

it('terrestrial time is 37 leap seconds and 32.184 s ahead of UTC', () => {
  // IERS Bulletin C 52 (TAI − UTC = 37 s since 2017) and the definition of TT.
  expect((ephemerisDateFromJulianDate(2_461_041.5) - 2_461_041.5) * 86_400).toBeCloseTo(37 + 32.184, 3);
});
