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
export { BAND_IDS, createBands } from './bands.js';
export type { Band, BandId, Bands, BandsTable } from './bands.js';
export type { Provenance } from './provenance.js';
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
  LINE_IDS,
  LYMAN_ALPHA_NM,
  LYMAN_LIMIT_NM,
  createLines,
  lineFluxFromLuminosity,
  lineLuminosityFromFlux,
  observedEquivalentWidthNm,
} from './lines.js';
export type { LineId, LinesTable, SpectralLine } from './lines.js';
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
  powerLawSpectrum,
  restSpectrum,
  sourceTemplates,
  supernovaPhaseMag,
} from './source-spectra.js';
export type {
  ReferenceFile,
  RestLine,
  RestSpectrum,
  SampledSource,
  SourceKind,
  SourceTemplateFiles,
  SourceTemplates,
  SpectrumCaution,
} from './source-spectra.js';

export { boxCurve, curveValueAt, sampledCurve } from './sampled-curve.js';
export type { SampledCurve } from './sampled-curve.js';
export {
  abMagnitudeAt,
  abMagnitudeOfPhotons,
  fluxPerNmOfAbMagnitude,
  halfPowerEdgesNm,
  janskyOfFrequency,
  linePhotonIntegral,
  photonIntegral,
  photonsOfAbMagnitude,
  pointWeights,
  responseOf,
  responseShare,
  syntheticAbMagnitude,
} from './synthetic.js';
export type { PointWeights, Response } from './synthetic.js';
export { Ledger, ledgerInput } from './ledger.js';
export type { LedgerInput, LedgerStage, LedgerStep, StepText } from './ledger.js';
export type * from './source-light.js';
export { LIGHT_STEPS } from './light-steps.js';
export type { LightStepId } from './light-steps.js';
export { arrivingLight } from './arriving-light.js';
export type { ArrivingLight } from './arriving-light.js';
export { ArrivingContinuum } from './arriving-continuum.js';
export { DARK_TRANSMISSION } from './no-light.js';
export type { LightCaution } from './arriving-continuum.js';
export { ArrivingLine } from './arriving-line.js';
export { drawnSpectrum } from './arriving-spectrum.js';
export type { DrawnSpectrum } from './arriving-spectrum.js';
export { quantileOf, sampleLight } from './light-uncertainty.js';
export type { LightSamples, LightSampling } from './light-uncertainty.js';
export {
  DUST_LAWS,
  TOTAL_TO_SELECTIVE_RANGE,
  TRUE_PER_SFD_COLOUR_EXCESS,
  attenuationMag,
  attenuationOnNodes,
  attenuationPerVisual,
  defaultTotalToSelective,
  galacticAttenuationMag,
  isDustLawValidAt,
  trueColourExcess,
} from './dust.js';
export type { ColourExcessScale, DustLaw, DustLawDescription } from './dust.js';
export { HIGHEST_REDSHIFT, redshiftDistribution } from './redshift-distribution.js';
export type { RedshiftDistribution, RedshiftPeak, RedshiftUncertainty } from './redshift-distribution.js';
export { typicalValuesAt } from './suggestions.js';
export type { SuggestionOptions, TypicalValue, TypicalValueId } from './suggestions.js';
export {
  TYPICAL_VALUES_FILE_NAME,
  brighterThanPerMpc3,
  supernovaIaPeakMagnitude,
  typicalSizeKpc,
  typicalUvMagnitude,
  typicalUvSlope,
} from './typical-values.js';
export type {
  DerivedWith,
  SizeDependence,
  SizeRelationId,
  TypicalUvMagnitude,
  TypicalValues,
  TypicalValuesFile,
} from './typical-values.js';
export { halfLightRadiusAfterSeeing, imageRegime } from './seeing-size.js';
export type { ImageRegime } from './seeing-size.js';
export { ATMOSPHERE_HIGH_NM, ATMOSPHERE_LOW_NM, atmosphericRangeAt, createAtmosphere } from './atmosphere-data.js';
export type { AtmosphereTable, AtmosphericRange } from './atmosphere-data.js';
