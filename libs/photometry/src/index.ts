export {
  AB_CONSTANT,
  CM_PER_MPC,
  JANSKY_CGS,
  PARSEC,
  PLANCK_CONSTANT,
  SPEED_OF_LIGHT,
  SPEED_OF_LIGHT_KM_S,
  type Constant,
} from './constants.js';
export { OutOfDomainError } from './domain.js';
export {
  AB_ZERO_FLUX_DENSITY_JY,
  absoluteMagnitudeFromLuminosityDensity,
  abMagnitudeFromFluxDensityCgs,
  abMagnitudeFromFluxDensityJy,
  abMagnitudeFromFluxPerAngstrom,
  fluxDensityCgsFromAbMagnitude,
  fluxDensityJyFromAbMagnitude,
  fluxPerAngstromFromAbMagnitude,
  luminosityDensityFromAbsoluteMagnitude,
  magnitudeErrorFromSignalToNoise,
} from './magnitudes.js';
export {
  AB_ZERO_PHOTONS_PER_M2_S,
  logMiddleOfBoxNm,
  photonRateBoxBandPerM2,
  photonRateNarrowBandPerM2,
  photonRateOfLinePerM2,
  photonRatePerM2PerNm,
  photonRateThroughResponsePerM2,
  pivotWavelengthOfBoxNm,
  powerLawColourMag,
} from './photons.js';
export { BANDS, abFromVegaMagnitude, findBand, vegaFromAbMagnitude } from './bands.js';
export type { Band, BandId, Provenance } from './bands.js';
export {
  apparentMagnitudeAtRestWavelength,
  apparentMagnitudeInSameBand,
  frequencySlopeFromWavelengthSlope,
  powerLawKCorrectionMag,
  powerLawMagnitudeChange,
  redshiftBandwidthMag,
  wavelengthSlopeFromFrequencySlope,
} from './k-correction.js';
export { meanSurfaceBrightness, surfaceBrightnessDimmingMag } from './dimming.js';
export type { DimmingConvention } from './dimming.js';
export {
  LINES,
  LYMAN_ALPHA_NM,
  LYMAN_LIMIT_NM,
  findLine,
  lineFluxFromLuminosity,
  lineLuminosityFromFlux,
  observedEquivalentWidthNm,
} from './lines.js';
export type { LineId, SpectralLine } from './lines.js';
export {
  LYMAN_ALPHA_OVER_H_ALPHA,
  STAR_FORMATION_CALIBRATIONS,
  hydrogenAlphaFromStarFormation,
  starFormationFromHydrogenAlpha,
  starFormationFromUltraviolet,
  ultravioletFromStarFormation,
} from './star-formation.js';
export type { StarFormationCalibration, StarFormationCalibrationId } from './star-formation.js';
export {
  SHORTEST_AIR_WAVELENGTH_NM,
  airFromVacuumNm,
  gaussianSigmaFromFwhm,
  observedWavelengthNm,
  redshiftDifferenceOfVelocity,
  redshiftOfObservedWavelength,
  refractiveIndexOfAir,
  resolutionFwhmKmS,
  vacuumFromAirNm,
  velocityFractionOfDopplerRedshift,
} from './wavelengths.js';
export type { AirFormula } from './wavelengths.js';
export { arcsecFromKpc, kpcFromArcsec } from './sizes.js';
export {
  SERSIC_INDEX_RANGE,
  centralMinusEffectiveSurfaceBrightness,
  circularisedRadius,
  effectiveMinusMeanSurfaceBrightness,
  meanEffectiveSurfaceBrightness,
  sersicB,
  sersicEnclosedFraction,
} from './sersic.js';
export { lensingMag } from './lensing.js';
export { createInoue2014, createMadau1995, forestNodesNm } from './intergalactic.js';
export type { IntergalacticMedium, IntergalacticTable, NodeTransmission } from './intergalactic.js';
export {
  REST_GRID_HIGH_NM,
  REST_GRID_LOW_NM,
  REST_GRID_STEP,
  isBelow,
  limitAt,
  restGrid,
  sampleOn,
  type Side,
} from './rest-grid.js';
export {
  BOLTZMANN_CONSTANT,
  NARROW_LINE_WIDTH_KM_S,
  SOURCE_TEMPLATE_FILE_NAMES,
  restSpectrum,
  sourceTemplates,
  supernovaPhaseMag,
} from './source-spectra.js';
export type {
  ReferenceFile,
  RestLine,
  RestSpectrum,
  SourceKind,
  SourceTemplateFiles,
  SourceTemplates,
  SpectrumCaution,
} from './source-spectra.js';
