import { ArgumentOutOfRange, requireBetween } from './argument-out-of-range.js';
import {
  darknessOfNight,
  eveningDateOf,
  requireSite,
  semiArc,
  siderealDegreesOf,
  type Darkness,
  type ObservingSite,
} from './darkness.js';
import { precess, precessionFromJ2000, type PrecessionFromJ2000 } from './precession.js';
import { normaliseDegrees, toRadians, type SkyPosition } from './sky-position.js';
import { julianDateFromUnixMs, localSiderealTimeDeg } from './time.js';

export interface MonthsUpOptions {
  /** A target counts as up at this airless altitude and above, −5 to 90. */
  readonly altitudeLimitDeg: number;
  /** The semester holds the nights whose local mean noon lies in [startUtc, endUtc); at most ten years. */
  readonly startUtc: Date;
  readonly endUtc: Date;
  /** Darkness: the Sun below this altitude; default −18. */
  readonly sunAltitudeDeg?: number;
  /** A month is useful with at least this many hours in its middle night; default 2. */
  readonly usefulHours?: number;
}

export interface MonthUp {
  /** YYYY-MM */
  readonly month: string;
  /** The night that stands for the month: the middle one of its nights within the semester, YYYY-MM-DD. */
  readonly eveningDate: string;
  readonly darkHours: number;
  /** Hours of that night which are dark and in which the target is above the limit. */
  readonly hoursUp: number;
}

/**
 * - `never-up`: in no month's middle night is the target above the limit in darkness
 * - `briefly`: it is, but in no month for the useful hours
 * - `some-months`: useful in some months
 * - `all-semester`: useful in every month
 */
export type MonthsUpState = 'never-up' | 'briefly' | 'some-months' | 'all-semester';

export interface MonthSpan {
  readonly firstMonth: string;
  readonly lastMonth: string;
}

export interface MonthsUp {
  readonly state: MonthsUpState;
  readonly months: readonly MonthUp[];
  /** Unbroken runs of useful months, in time order; two of them when a target is lost behind the Sun in between. */
  readonly usefulSpans: readonly MonthSpan[];
  /** Month with the most hours up, the earliest of equals; absent if never up. */
  readonly bestMonth?: string;
  /** Highest altitude that the target ever reaches at the site, at any time of day. */
  readonly culminationAltitudeDeg: number;
}

interface PlannedMonth {
  readonly month: string;
  readonly night: Darkness;
  readonly siderealTimeAtStartDeg: number;
  readonly siderealLengthDeg: number;
  readonly precession: PrecessionFromJ2000;
}

/** What the months of a semester share for all targets: made once by {@link planMonthsUp}. */
export interface MonthsUpPlan {
  readonly site: ObservingSite;
  readonly altitudeLimitDeg: number;
  readonly usefulHours: number;
  readonly months: readonly PlannedMonth[];
}

const longestSemesterDays = 3660;

/**
 * The middle night of each month of a semester at a site, ready for {@link monthsUpWithPlan}: the Sun, the sidereal time and precession are computed here,
 * once for all targets.
 *
 * @throws {ArgumentOutOfRange} if a number is out of range, or the semester is empty or longer than ten years
 */
export function planMonthsUp(site: ObservingSite, options: MonthsUpOptions): MonthsUpPlan {
  requireSite(site);
  requireBetween('altitudeLimitDeg', options.altitudeLimitDeg, -5, 90);
  const { usefulHours = 2, sunAltitudeDeg } = options;
  requireBetween('usefulHours', usefulHours, 0, 24);
  const months = eveningsByMonth(site, options.startUtc, options.endUtc).map(([month, evenings]) => {
    const eveningDate = evenings[Math.floor((evenings.length - 1) / 2)] ?? '';
    const night = darknessOfNight(site, eveningDate, sunAltitudeDeg);
    return {
      month,
      night,
      siderealTimeAtStartDeg: localSiderealTimeDeg(night.startJulianDate, site.longitudeDegEast),
      siderealLengthDeg: siderealDegreesOf(night.endJulianDate - night.startJulianDate),
      precession: precessionFromJ2000(night.startJulianDate),
    };
  });
  return { site, altitudeLimitDeg: options.altitudeLimitDeg, usefulHours, months };
}

/**
 * In which months of a semester a target is up in darkness, and for how long in the middle night of each.
 *
 * Airless altitudes; the target's J2000 place is precessed to the night. Hours are within 1.5 minutes of a full apparent-place computation. The Moon, clouds and pointing
 * limits other than the altitude are not considered. A site's own rules for pointing near the zenith, the horizon and the Sun take precedence.
 *
 * @throws {ArgumentOutOfRange} as {@link planMonthsUp}, or if the declination is out of range
 */
export function monthsUp(position: SkyPosition, site: ObservingSite, options: MonthsUpOptions): MonthsUp {
  return monthsUpWithPlan(position, planMonthsUp(site, options));
}

/** {@link monthsUp} with the shared part prepared: about a microsecond per target and month. */
export function monthsUpWithPlan(position: SkyPosition, plan: MonthsUpPlan): MonthsUp {
  requireBetween('raDeg', position.raDeg, -Number.MAX_VALUE, Number.MAX_VALUE);
  requireBetween('decDeg', position.decDeg, -90, 90);
  const latitude = toRadians(plan.site.latitudeDeg);
  const sinLatitude = Math.sin(latitude);
  const cosLatitude = Math.cos(latitude);
  const sinLimit = Math.sin(toRadians(plan.altitudeLimitDeg));

  const months = plan.months.map((planned): MonthUp => {
    const { raDeg, decDeg } = precess(position, planned.precession);
    const dec = toRadians(decDeg);
    const arc = semiArc(sinLatitude, cosLatitude, Math.sin(dec), Math.cos(dec), sinLimit);
    const overlap = overlapDeg(planned.siderealTimeAtStartDeg, planned.siderealLengthDeg, raDeg - arc, 2 * arc);
    const hoursUp = planned.siderealLengthDeg === 0 ? 0 : (overlap / planned.siderealLengthDeg) * planned.night.hours;
    return { month: planned.month, eveningDate: planned.night.eveningDate, darkHours: planned.night.hours, hoursUp };
  });
  return summarise(months, plan, position);
}

/**
 * Length, in degrees, that an arc of sidereal time shares with the arc in which a target is up. Both arcs start anywhere and run eastwards; the first
 * may be slightly longer than a full turn (24 hours of solar time).
 */
function overlapDeg(start: number, length: number, upStart: number, upLength: number): number {
  const offset = normaliseDegrees(upStart - start);
  let shared = 0;
  for (const turn of [-360, 0, 360]) {
    const from = Math.max(0, offset + turn);
    const to = Math.min(length, offset + turn + upLength);
    if (to > from) shared += to - from;
  }
  return shared;
}

function summarise(months: readonly MonthUp[], plan: MonthsUpPlan, position: SkyPosition): MonthsUp {
  const spans: { firstMonth: string; lastMonth: string }[] = [];
  let best: MonthUp | undefined;
  let usefulCount = 0;
  let previousUseful = false;
  for (const month of months) {
    if (month.hoursUp > (best?.hoursUp ?? 0)) best = month;
    const isUseful = month.hoursUp > 0 && month.hoursUp >= plan.usefulHours;
    if (isUseful) {
      usefulCount += 1;
      const current = spans.at(-1);
      if (previousUseful && current) current.lastMonth = month.month;
      else spans.push({ firstMonth: month.month, lastMonth: month.month });
    }
    previousUseful = isUseful;
  }
  const state =
    best === undefined
      ? 'never-up'
      : usefulCount === 0
        ? 'briefly'
        : usefulCount === months.length
          ? 'all-semester'
          : 'some-months';
  return {
    state,
    months,
    usefulSpans: spans,
    ...(best === undefined ? {} : { bestMonth: best.month }),
    culminationAltitudeDeg: 90 - Math.abs(plan.site.latitudeDeg - position.decDeg),
  };
}

function eveningsByMonth(site: ObservingSite, startUtc: Date, endUtc: Date): [string, string[]][] {
  const start = julianDateFromUnixMs(startUtc.getTime());
  const end = julianDateFromUnixMs(endUtc.getTime());
  const days = end - start;
  if (!(days > 0 && days <= longestSemesterDays))
    throw new ArgumentOutOfRange('endUtc - startUtc (days)', days, `above 0, at most ${longestSemesterDays}`);
  // Julian dates are whole at noon UTC; at the site's longitude local mean noon comes earlier by its share of a day.
  const shift = site.longitudeDegEast / 360;
  const months = new Map<string, string[]>();
  for (let noon = Math.ceil(start + shift); noon < end + shift; noon += 1) {
    // A quarter of a day after noon: well inside the evening, away from the rounding at noon itself.
    const eveningDate = eveningDateOf(site, noon - shift + 0.25);
    const month = eveningDate.slice(0, 7);
    const evenings = months.get(month);
    if (evenings) evenings.push(eveningDate);
    else months.set(month, [eveningDate]);
  }
  if (months.size === 0)
    throw new ArgumentOutOfRange('endUtc - startUtc (days)', days, 'long enough to hold the local noon of one night');
  return [...months];
}
