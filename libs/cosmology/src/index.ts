export { createCosmology, Cosmology, distanceModulusFromMpc, MAX_REDSHIFT } from './cosmology.js';
export type { AngularDiameterDistanceMaximum } from './cosmology.js';
export { distanceRows, luminosityDistancesMpc } from './batch.js';
export type { DistanceRow } from './batch.js';
export { convertAbsoluteMagnitude, distanceModulusDifferenceMag } from './comparison.js';
export {
  BOLTZMANN,
  GIGAYEAR,
  GRAVITATIONAL_CONSTANT,
  MEGAPARSEC,
  NEUTRINO_DENSITY_RATIO,
  NEUTRINO_TEMPERATURE_RATIO,
  SPEED_OF_LIGHT,
  STEFAN_BOLTZMANN,
} from './constants.js';
export type { PhysicalConstant } from './constants.js';
export { AntipodeError, InvalidCosmologyError, NoBigBangError, NoSolutionError, OutOfDomainError } from './errors.js';
export type { AllowedRange } from './errors.js';
export { PARAMETER_RANGES } from './parameters.js';
export type { CompleteParameters, CosmologyParameters } from './parameters.js';
export { COSMOLOGY_PRESETS, isCosmologyPresetId } from './presets/index.js';
export type { CosmologyPreset, CosmologyPresetId } from './presets/index.js';
export {
  combineRedshifts,
  distanceModulusScatterMag,
  luminosityDistanceWithFramesMpc,
  removeRedshifts,
} from './redshift.js';
export { cosmologyWarnings, redshiftWarnings } from './warnings.js';
export type { CosmologyWarning } from './warnings.js';
