export { ArgumentOutOfRange } from './argument-out-of-range.js';
export { normaliseDegrees, toDegrees, toRadians, type SkyPosition } from './sky-position.js';
export {
  designationFromPosition,
  formatDeclination,
  formatRightAscension,
  parseDeclination,
  parsePosition,
  parseRightAscension,
  type CoordinateRefusal,
  type CoordinateRefusalCode,
  type DesignationOptions,
  type FormatAngleOptions,
  type ParsedAngle,
  type ParsedPosition,
  type SexagesimalStyle,
} from './coordinate-text.js';
export { angularSeparationArcsec, angularSeparationDeg, positionAngleDeg } from './separation.js';
export { findCloseDuplicates, matchToCatalogue, type CloseNeighbour } from './neighbours.js';
export {
  airmass,
  airmassBy,
  airmassHardie,
  airmassKastenYoung,
  airmassKrisciunasSchaefer,
  airmassPickering,
  airmassRozenberg,
  airmassSecant,
  airmassYoung,
  altitudeAtAirmassDeg,
  type AirmassFormula,
} from './airmass.js';
export { refractionFromApparentArcmin, refractionFromTrueArcmin, type AirConditions } from './refraction.js';
export {
  ephemerisDateFromJulianDate,
  greenwichApparentSiderealTimeDeg,
  greenwichMeanSiderealTimeDeg,
  julianDateFromModified,
  julianDateFromUnixMs,
  localSiderealTimeDeg,
  modifiedJulianDateFromJulianDate,
  terrestrialMinusUtcSeconds,
  unixMsFromJulianDate,
} from './time.js';
export { sunPosition } from './sun.js';
export {
  altitudeDeg,
  darknessOfNight,
  eveningDateOf,
  localMeanMidnight,
  semiArcDeg,
  twilightAltitudeDeg,
  type Darkness,
  type ObservingSite,
} from './darkness.js';
export { precess, precessionFromJ2000, type PrecessionFromJ2000 } from './precession.js';
export {
  monthsUp,
  monthsUpWithPlan,
  planMonthsUp,
  type MonthSpan,
  type MonthUp,
  type MonthsUp,
  type MonthsUpOptions,
  type MonthsUpPlan,
  type MonthsUpState,
} from './months-up.js';
