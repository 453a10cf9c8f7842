import type { BandId } from '@faintward/contracts/light';
import type { Target } from '@faintward/contracts/targets';
import type { CellValue } from '@faintward/tables';

type Column = readonly [header: string, value: (target: Target) => CellValue];

const EXPORTED_BANDS = ['g', 'r', 'i', 'z', 'Y', 'J', 'H', 'Ks'] as const satisfies readonly BandId[];

const COLUMNS: readonly Column[] = [
  // Those that an import takes back, with all digits.
  ['name', (target) => target.name],
  ['ra_deg', (target) => target.rightAscensionDeg],
  ['dec_deg', (target) => target.declinationDeg],
  ['redshift', (target) => target.redshift],
  ['redshift_uncertainty', (target) => target.redshiftUncertaintyText],
  ['brightness', (target) => target.brightnessText],
  ['notes', (target) => target.notes],
  // What the texts before leave out.
  ['redshift_kind', (target) => target.redshiftKind],
  ['light_kind', (target) => target.light?.kind ?? null],
  ['spectrum_kind', ({ light }) => (light !== null && 'spectrum' in light ? light.spectrum.kind : null)],
  ['magnification', (target) => target.light?.magnification ?? null],
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
  ...EXPORTED_BANDS.map(
    (bandId) => [`above_atmosphere_ab_mag_${bandId}`, bandMagnitude(bandId)] as const satisfies Column,
  ),
  ['line_observed_vacuum_nm', (target) => target.computed.lineObservedWavelengthNm],
  ['line_flux_erg_s_cm2', (target) => target.computed.lineFluxErgSCm2],
  ['half_light_radius_arcsec', (target) => target.computed.halfLightRadiusArcsec],
  ['surface_brightness_ab_mag_per_arcsec2', (target) => target.computed.surfaceBrightnessAbMagPerArcsec2],
  ['months_up', (target) => target.computed.upSummary],
  ['requested_seconds', (target) => target.requestedSeconds],
  ['cosmology', (target) => target.computed.cosmologyId],
  ['engine_version', (target) => target.computed.engineVersion],
  ['reference_data_version', (target) => target.computed.referenceDataVersion],
];

export const EXPORT_COLUMNS: readonly string[] = COLUMNS.map(([header]) => header);

export function exportRow(target: Target): CellValue[] {
  return COLUMNS.map(([, value]) => value(target));
}

/** Empty where a band has no light, and for a light that has no magnitudes. */
function bandMagnitude(bandId: BandId): Column[1] {
  return (target) => target.computed.bandMagnitudesAb[bandId] ?? null;
}
