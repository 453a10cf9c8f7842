import { readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  altitudeDeg,
  ArgumentOutOfRange,
  darknessOfNight,
  eveningDateOf,
  julianDateFromUnixMs,
  localSiderealTimeDeg,
  monthsUp,
  monthsUpWithPlan,
  planMonthsUp,
  precess,
  precessionFromJ2000,
  twilightAltitudeDeg,
  type MonthsUpOptions,
  type ObservingSite,
} from './index.js';

function read<T>(name: string): T {
  return JSON.parse(readFileSync(new URL(`../../../tests/reference/sky/${name}`, import.meta.url), 'utf8')) as T;
}

interface SiteRow {
  readonly id: string;
  readonly latitude_deg: number;
  readonly longitude_east_deg: number;
}

interface NightRow {
  readonly site: string;
  readonly evening_date_local: string;
  readonly astronomical_night_minutes: number;
  readonly civil_dusk_utc: string | null;
  readonly civil_dawn_utc: string | null;
  readonly nautical_dusk_utc: string | null;
  readonly nautical_dawn_utc: string | null;
  readonly astronomical_dusk_utc: string | null;
  readonly astronomical_dawn_utc: string | null;
}

interface Meta {
  readonly sites: readonly SiteRow[];
  readonly edge_sites: readonly SiteRow[];
}

const nights = read<{ meta: Meta; rows: readonly NightRow[] }>('nights.json');
const nightTargets = read<{
  meta: Meta & { targets: readonly { id: string; ra_deg: number; dec_deg: number }[] };
  rows: readonly {
    site: string;
    evening_date_local: string;
    target: string;
    minutes_above_30deg_in_astronomical_night: number;
  }[];
}>('night-targets.json');

function siteOf(meta: Meta, id: string): ObservingSite {
  const row = [...meta.sites, ...meta.edge_sites].find((site) => site.id === id);
  if (!row) throw new Error(`no site ${id}`);
  return { latitudeDeg: row.latitude_deg, longitudeDegEast: row.longitude_east_deg };
}

function julianDate(utc: string): number {
  return julianDateFromUnixMs(Date.parse(utc));
}

/** Options whose semester is a single night. */
function oneNight(eveningDate: string, site: ObservingSite, altitudeLimitDeg: number): MonthsUpOptions {
  const localNoon = Date.parse(`${eveningDate}T12:00:00Z`) - (site.longitudeDegEast / 15) * 3_600_000;
  return { altitudeLimitDeg, startUtc: new Date(localNoon - 3_600_000), endUtc: new Date(localNoon + 3_600_000) };
}

const south: ObservingSite = { latitudeDeg: -29.26, longitudeDegEast: -70.74 };
const winterSemester = { startUtc: new Date('2027-10-01T16:00:00Z'), endUtc: new Date('2028-04-01T16:00:00Z') };

describe('darkness', () => {
  it('begins and ends within 20 s of the reference at three sites (120 s in the Arctic, where the Sun grazes)', () => {
    let compared = 0;
    for (const row of nights.rows) {
      const site = siteOf(nights.meta, row.site);
      const tolerance = (Math.abs(site.latitudeDeg) > 60 ? 120 : 20) / 86_400;
      const twilights = [
        [twilightAltitudeDeg.civil, row.civil_dusk_utc, row.civil_dawn_utc],
        [twilightAltitudeDeg.nautical, row.nautical_dusk_utc, row.nautical_dawn_utc],
        [twilightAltitudeDeg.astronomical, row.astronomical_dusk_utc, row.astronomical_dawn_utc],
      ] as const;
      for (const [altitude, dusk, dawn] of twilights) {
        const darkness = darknessOfNight(site, row.evening_date_local, altitude);
        if (dusk === null || dawn === null) {
          expect(darkness.kind).not.toBe('part');
          continue;
        }
        expect(darkness.kind).toBe('part');
        expect(Math.abs(darkness.startJulianDate - julianDate(dusk))).toBeLessThan(tolerance);
        expect(Math.abs(darkness.endJulianDate - julianDate(dawn))).toBeLessThan(tolerance);
        compared += 1;
      }
    }
    expect(compared).toBeGreaterThan(100);
  });

  it('lasts as long as the reference says, within 1.5 minutes', () => {
    for (const row of nights.rows) {
      const { hours } = darknessOfNight(siteOf(nights.meta, row.site), row.evening_date_local);
      expect(Math.abs(hours * 60 - row.astronomical_night_minutes)).toBeLessThan(1.5);
    }
  });

  it('is absent in the midnight sun and lasts all day in deep polar night', () => {
    expect(darknessOfNight({ latitudeDeg: 69.6, longitudeDegEast: 18.9 }, '2027-06-21')).toMatchObject({
      kind: 'none',
      hours: 0,
    });
    expect(darknessOfNight({ latitudeDeg: -90, longitudeDegEast: 0 }, '2027-06-21')).toMatchObject({
      kind: 'whole-day',
      hours: 24,
    });
    expect(darknessOfNight({ latitudeDeg: 90, longitudeDegEast: 0 }, '2027-06-21')).toMatchObject({
      kind: 'none',
      hours: 0,
    });
  });

  it('refuses dates that the calendar does not have', () => {
    expect(() => darknessOfNight(south, '2027-02-29')).toThrow(RangeError);
    expect(() => darknessOfNight(south, '2027-1-3')).toThrow(RangeError);
    expect(darknessOfNight(south, '2028-02-29').hours).toBeGreaterThan(7);
    expect(() => darknessOfNight({ latitudeDeg: 91, longitudeDegEast: 0 }, '2027-01-03')).toThrow(ArgumentOutOfRange);
  });

  it('belongs to the evening by local mean noon', () => {
    expect(eveningDateOf(south, julianDate('2027-10-02T03:00:00Z'))).toBe('2027-10-01');
    expect(eveningDateOf(south, julianDate('2027-10-01T16:00:00Z'))).toBe('2027-09-30');
    expect(eveningDateOf(south, julianDate('2027-10-01T17:00:00Z'))).toBe('2027-10-01');
  });
});

describe('months up', () => {
  it('has the minutes above 30 degrees in darkness of every reference night and target within 1.5 minutes', () => {
    const targets = new Map(nightTargets.meta.targets.map((target) => [target.id, target]));
    let compared = 0;
    for (const row of nightTargets.rows) {
      const target = targets.get(row.target);
      if (!target) throw new Error(`no target ${row.target}`);
      const site = siteOf(nightTargets.meta, row.site);
      const { months } = monthsUp(
        { raDeg: target.ra_deg, decDeg: target.dec_deg },
        site,
        oneNight(row.evening_date_local, site, 30),
      );
      expect(months.map((month) => month.eveningDate)).toEqual([row.evening_date_local]);
      expect(
        Math.abs((months[0]?.hoursUp ?? Number.NaN) * 60 - row.minutes_above_30deg_in_astronomical_night),
      ).toBeLessThan(1.5);
      compared += 1;
    }
    expect(compared).toBe(nightTargets.rows.length);
    expect(compared).toBeGreaterThan(600);
  });

  it('agrees with stepping through the night, wherever the target and the site', () => {
    const anywhere = fc.record({
      raDeg: fc.double({ min: 0, max: 359.99, noNaN: true }),
      decDeg: fc.double({ min: -90, max: 90, noNaN: true }),
      latitudeDeg: fc.double({ min: -70, max: 70, noNaN: true }),
      longitudeDegEast: fc.double({ min: -180, max: 180, noNaN: true }),
      limit: fc.double({ min: 0, max: 60, noNaN: true }),
    });
    fc.assert(
      fc.property(anywhere, ({ raDeg, decDeg, latitudeDeg, longitudeDegEast, limit }) => {
        const site = { latitudeDeg, longitudeDegEast };
        const [month] = monthsUp({ raDeg, decDeg }, site, oneNight('2027-11-15', site, limit)).months;
        const night = darknessOfNight(site, '2027-11-15');
        const ofDate = precess({ raDeg, decDeg }, precessionFromJ2000(night.startJulianDate));
        const steps = 1000;
        let up = 0;
        for (let step = 0; step < steps; step += 1) {
          const time = night.startJulianDate + ((step + 0.5) / steps) * (night.endJulianDate - night.startJulianDate);
          if (
            altitudeDeg(localSiderealTimeDeg(time, longitudeDegEast) - ofDate.raDeg, ofDate.decDeg, latitudeDeg) >=
            limit
          )
            up += 1;
        }
        // Each of at most four edges may fall anywhere within its step.
        expect(Math.abs((month?.hoursUp ?? Number.NaN) - (up / steps) * night.hours)).toBeLessThanOrEqual(
          (2.1 / steps) * night.hours + 1e-9,
        );
      }),
      { numRuns: 60 },
    );
  });

  it('calls a target that never rises never up, and says how high it gets', () => {
    const result = monthsUp({ raDeg: 100, decDeg: 75 }, south, { altitudeLimitDeg: 30, ...winterSemester });
    expect(result.state).toBe('never-up');
    expect(result.usefulSpans).toEqual([]);
    expect(result.bestMonth).toBeUndefined();
    expect(result.culminationAltitudeDeg).toBeCloseTo(-14.26, 10);
    expect(result.months.map((month) => month.month)).toEqual([
      '2027-10',
      '2027-11',
      '2027-12',
      '2028-01',
      '2028-02',
      '2028-03',
    ]);
  });

  it('calls a circumpolar target up all semester', () => {
    const result = monthsUp({ raDeg: 0, decDeg: -89 }, south, { altitudeLimitDeg: 20, ...winterSemester });
    expect(result.state).toBe('all-semester');
    expect(result.usefulSpans).toEqual([{ firstMonth: '2027-10', lastMonth: '2028-03' }]);
    for (const month of result.months) expect(month.hoursUp).toBeCloseTo(month.darkHours, 9);
  });

  it('gives first and last month of a target that transits at midnight in January', () => {
    const result = monthsUp({ raDeg: 112.5, decDeg: -20 }, south, { altitudeLimitDeg: 42, ...winterSemester });
    expect(result.state).toBe('some-months');
    expect(result.usefulSpans).toHaveLength(1);
    expect(result.usefulSpans[0]).toEqual({ firstMonth: '2027-11', lastMonth: '2028-03' });
    expect(['2028-01', '2028-02']).toContain(result.bestMonth);
  });

  it('gives two spans to a target that hides behind the Sun in between', () => {
    const result = monthsUp({ raDeg: 270, decDeg: -10 }, south, {
      altitudeLimitDeg: 30,
      startUtc: new Date('2027-08-01T16:00:00Z'),
      endUtc: new Date('2028-05-01T16:00:00Z'),
    });
    expect(result.state).toBe('some-months');
    // By hand: it is above 30° for 4.07 h either side of transit; in mid-October darkness begins at 20.6 h of sidereal time, when it is 2.6 h past, so 1.5 h remain.
    expect(result.usefulSpans).toEqual([
      { firstMonth: '2027-08', lastMonth: '2027-09' },
      { firstMonth: '2028-03', lastMonth: '2028-04' },
    ]);
  });

  it('calls less than the useful hours brief', () => {
    const brief = monthsUp({ raDeg: 112.5, decDeg: -20 }, south, {
      altitudeLimitDeg: 42,
      ...winterSemester,
      usefulHours: 23,
    });
    expect(brief.state).toBe('briefly');
    expect(brief.bestMonth).toBeDefined();
  });

  it('never has more hours at a higher limit', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 359, noNaN: true }),
        fc.double({ min: -90, max: 90, noNaN: true }),
        fc.double({ min: 0, max: 80, noNaN: true }),
        (raDeg, decDeg, limit) => {
          const low = monthsUp({ raDeg, decDeg }, south, { altitudeLimitDeg: limit, ...winterSemester });
          const high = monthsUp({ raDeg, decDeg }, south, { altitudeLimitDeg: limit + 5, ...winterSemester });
          low.months.forEach((month, index) => {
            expect(high.months[index]?.hoursUp).toBeLessThanOrEqual(month.hoursUp + 1e-9);
            expect(month.hoursUp).toBeLessThanOrEqual(month.darkHours + 1e-9);
          });
        },
      ),
    );
  });

  it('gives the same with a prepared plan', () => {
    const options = { altitudeLimitDeg: 30, ...winterSemester };
    const plan = planMonthsUp(south, options);
    expect(monthsUpWithPlan({ raDeg: 33, decDeg: -12 }, plan)).toEqual(
      monthsUp({ raDeg: 33, decDeg: -12 }, south, options),
    );
  });

  it('treats 24h as 0h', () => {
    const options = { altitudeLimitDeg: 30, ...winterSemester };
    const zero = monthsUp({ raDeg: 0, decDeg: -12 }, south, options);
    const full = monthsUp({ raDeg: 360, decDeg: -12 }, south, options);
    full.months.forEach((month, index) =>
      expect(month.hoursUp).toBeCloseTo(zero.months[index]?.hoursUp ?? Number.NaN, 9),
    );
  });

  it('refuses a semester without nights, one that ends before it starts, and one of centuries', () => {
    const at = (start: string, end: string): MonthsUpOptions => ({
      altitudeLimitDeg: 30,
      startUtc: new Date(start),
      endUtc: new Date(end),
    });
    expect(() => planMonthsUp(south, at('2027-10-01T20:00:00Z', '2027-10-01T22:00:00Z'))).toThrow(ArgumentOutOfRange);
    expect(() => planMonthsUp(south, at('2027-10-02T00:00:00Z', '2027-10-01T00:00:00Z'))).toThrow(ArgumentOutOfRange);
    expect(() => planMonthsUp(south, at('1900-01-01T00:00:00Z', '2100-01-01T00:00:00Z'))).toThrow(ArgumentOutOfRange);
    expect(() => planMonthsUp(south, at('never', '2027-10-01T00:00:00Z'))).toThrow(ArgumentOutOfRange);
  });
});

it('a month is stood for by the middle one of its nights', () => {
  const options = {
    altitudeLimitDeg: 30,
    startUtc: new Date('2027-02-01T00:00Z'),
    endUtc: new Date('2027-05-01T00:00Z'),
  };
  const { months } = monthsUp({ raDeg: 150, decDeg: 2 }, south, options);
  expect(months.map(({ eveningDate }) => eveningDate)).toEqual(['2027-02-14', '2027-03-16', '2027-04-15']);
});

it('what never sets is up through all of a polar night, also where 24 hours are more than a turn of the sky', () => {
  const pole: ObservingSite = { latitudeDeg: 90, longitudeDegEast: 0 };
  const plan = planMonthsUp(pole, oneNight('2026-12-21', pole, 10));
  for (let raDeg = 0; raDeg < 360; raDeg += 0.25) {
    const [month] = monthsUpWithPlan({ raDeg, decDeg: 60 }, plan).months;
    expect(month?.darkHours).toBe(24);
    expect(month?.hoursUp, `at ${raDeg}`).toBeCloseTo(24, 9);
  }
});
