import type { Target } from '@faintward/contracts/targets';
import type { CellValue } from '@faintward/tables';

const COLUMNS: readonly (readonly [header: string, value: (target: Target) => CellValue])[] = [
  // Those that an import takes back, with all digits.
  ['name', (target) => target.name],
  ['ra_deg', (target) => target.rightAscensionDeg],
  ['dec_deg', (target) => target.declinationDeg],
  ['redshift', (target) => target.redshift],
  ['redshift_sigma', (target) => target.redshiftSigma],
  ['brightness', (target) => target.brightnessText],
  ['notes', (target) => target.notes],
  // Those that the server works out.
  ['ra_sexagesimal_j2000', (target) => target.rightAscensionText],
  ['dec_sexagesimal_j2000', (target) => target.declinationText],
  ['luminosity_distance_mpc', (target) => target.computed.luminosityDistanceMpc],
  ['angular_diameter_distance_mpc', (target) => target.computed.angularDiameterDistanceMpc],
  ['distance_modulus_mag', (target) => target.computed.distanceModulusMag],
  ['kpc_per_arcsec', (target) => target.computed.kpcPerArcsec],
  ['age_gyr', (target) => target.computed.ageGyr],
  ['lookback_time_gyr', (target) => target.computed.lookbackTimeGyr],
  ['apparent_ab_mag', (target) => target.computed.apparentMagnitudeAb],
  ['apparent_ab_mag_at', (target) => target.computed.magnitudeLabel],
  ['absolute_ab_mag', (target) => target.computed.absoluteMagnitudeAb],
  ['half_light_radius_arcsec', (target) => target.computed.halfLightRadiusArcsec],
  ['surface_brightness_ab_mag_per_arcsec2', (target) => target.computed.surfaceBrightnessAbMagPerArcsec2],
  ['months_up', (target) => target.computed.upSummary],
  ['requested_seconds', (target) => target.requestedSeconds],
  ['cosmology', (target) => target.computed.cosmologyId],
  ['engine_version', (target) => target.computed.engineVersion],
];

export const EXPORT_COLUMNS: readonly string[] = COLUMNS.map(([header]) => header);

export function exportRow(target: Target): CellValue[] {
  return COLUMNS.map(([, value]) => value(target));
}
