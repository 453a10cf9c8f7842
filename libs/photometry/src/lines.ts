import { CM_PER_MPC } from './constants.js';
import { OutOfDomainError, requirePositive } from './domain.js';
import type { Provenance } from './provenance.js';

/** Every line there is; the table of a file has each of them once. */
export const LINE_IDS = [
  'Lya',
  'NV_1238',
  'NV_1242',
  'CIV_1548',
  'CIV_1550',
  'HeII_1640',
  'CIII_1906',
  'CIII_1908',
  'MgII_2796',
  'MgII_2803',
  'OII_3727',
  'OII_3729',
  'Hb',
  'OIII_4960',
  'OIII_5008',
  'NII_6549',
  'Ha',
  'NII_6585',
  'SII_6718',
  'SII_6732',
  'CII_158um',
] as const;
export type LineId = (typeof LINE_IDS)[number];

/** An emission line commonly used at high redshift; a row of `lines.json`. */
export interface SpectralLine {
  readonly id: LineId;
  readonly label: string;
  /** Rest wavelength in vacuum. */
  readonly vacuumWavelengthNm: number;
  /** Scatter of the value among public line lists. */
  readonly spreadNm: number;
  readonly source: string;
  readonly provenance: Provenance;
}

/** `lines.json`. */
export interface LinesTable {
  readonly lines: readonly SpectralLine[];
}

/**
 * Lines from their file, by rest wavelength.
 *
 * @throws {OutOfDomainError} for a wavelength that is not positive, or a line that is missing or stands twice
 */
export function createLines({ data }: { readonly data: LinesTable }): readonly SpectralLine[] {
  const ids = new Set<LineId>();
  for (const line of data.lines) {
    requirePositive(`${line.id}.vacuumWavelengthNm`, line.vacuumWavelengthNm);
    if (ids.has(line.id)) throw new OutOfDomainError('lines', line.id, 'in the table once');
    ids.add(line.id);
  }
  const missing = LINE_IDS.filter((id) => !ids.has(id));
  if (missing.length > 0) throw new OutOfDomainError('lines', [...ids], `complete: ${missing.join(', ')} missing`);
  return [...data.lines].sort((a, b) => a.vacuumWavelengthNm - b.vacuumWavelengthNm);
}

/** Rest wavelength of Lyα, where neutral hydrogen on the way begins to take the light; that of `lines.json`. */
export const LYMAN_ALPHA_NM = 121.567;
/**
 * The Lyman limit: ionisation edge of hydrogen, 911.75 Å (c/R_H; the digits beyond 911.75 do not matter here). The models of the
 * medium between the galaxies have their own rounding of it, up to 0.03 % longer.
 */
export const LYMAN_LIMIT_NM = 91.175;

/**
 * Flux of a line in erg s⁻¹ cm⁻²: F = L / (4π D_L²).
 *
 * @param lineLuminosityErgS     erg s⁻¹
 * @param luminosityDistanceMpc  > 0
 * @throws {OutOfDomainError} if the distance is not positive and finite
 */
export function lineFluxFromLuminosity(lineLuminosityErgS: number, luminosityDistanceMpc: number): number {
  requirePositive('luminosityDistanceMpc', luminosityDistanceMpc);
  return lineLuminosityErgS / (4 * Math.PI * (luminosityDistanceMpc * CM_PER_MPC) ** 2);
}

/** Luminosity of a line in erg s⁻¹: L = 4π D_L² F. */
export function lineLuminosityFromFlux(lineFluxErgSCm2: number, luminosityDistanceMpc: number): number {
  requirePositive('luminosityDistanceMpc', luminosityDistanceMpc);
  return 4 * Math.PI * (luminosityDistanceMpc * CM_PER_MPC) ** 2 * lineFluxErgSCm2;
}

/** Observed equivalent width: W (1 + z). */
export function observedEquivalentWidthNm(restEquivalentWidthNm: number, redshift: number): number {
  return restEquivalentWidthNm * (1 + redshift);
}
