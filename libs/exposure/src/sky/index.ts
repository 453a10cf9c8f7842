export {
  EXTINCTION_HIGH_NM,
  EXTINCTION_LOW_NM,
  createExtinctionCurves,
  extinctionAt,
  extinctionCurveOf,
  extinctionMag,
} from './extinction.js';
export type { ExtinctionCurve, ExtinctionValue } from './extinction.js';
export {
  darkNanolamberts,
  illuminatedFractionOfPhase,
  moonIlluminance,
  moonlitSkyMag,
  moonScattering,
  nanolambertsOfVMag,
  phaseOfIlluminatedFraction,
  vMagOfNanolamberts,
} from './moonlight.js';
export type { MoonGeometry, MoonlitSky, MoonlitSkyInput } from './moonlight.js';
export { moonlightAb } from './moonlight-bands.js';
export type { MoonlightBandInput, VisualBand } from './moonlight-bands.js';
export { USUAL_MOON_CLASS_THRESHOLDS, moonClassOf } from './moon-class.js';
export type { MoonClassification, MoonClassThresholds } from './moon-class.js';
export { darkSkyAirmassFactor, darkSkyPartsS10, darkZeniths, vMagOfS10 } from './dark-sky.js';
export type { DarkSkyParts, DarkZenith } from './dark-sky.js';
export { createSkyModel } from './sky-brightness.js';
export type { SkyBrightness, SkyBrightnessInput, SkyFiles, SkyModel, SkyPart, SkyPartId } from './sky-brightness.js';
export { HIGHEST_SUN_ALTITUDE_DEG, NIGHT_SUN_ALTITUDE_DEG, createTwilight, darkEnoughSunAltitude } from './twilight.js';
export type { Twilight } from './twilight.js';
export { createSunlight } from './sunlight.js';
export type { Sunlight } from './sunlight.js';
export { OH_LINES_HIGH_NM, OH_LINES_LOW_NM, betweenLines, createOhLines } from './oh-lines.js';
export type { BetweenLines, BetweenLinesOptions, OhLine } from './oh-lines.js';
export { J_TO_H_NM, USUAL_LINE_SHARE, createInfraredSky } from './infrared-sky.js';
export type { BroadBandSky, InfraredSky, SkyLine } from './infrared-sky.js';
export { USUAL_EMISSIVITY, thermalAbMag, thermalPhotonRate } from './thermal-emission.js';
export type { ThermalSource } from './thermal-emission.js';
export { dispersionArcsec, refractivityPpm, waterVapourHpa } from './atmospheric-dispersion.js';
export type { AirState } from './atmospheric-dispersion.js';
export {
  ALIGNMENT_NEEDED_OVER_SLIT,
  angleToVerticalDeg,
  parallacticAdvice,
  parallacticAngleDeg,
  slitLightAt,
} from './dispersion-slit.js';
export type { DispersedSlit, ParallacticAdvice, SlitLight } from './dispersion-slit.js';
