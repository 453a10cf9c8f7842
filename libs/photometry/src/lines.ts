import { CM_PER_MPC } from './constants.js';
import { requirePositive } from './domain.js';

export type LineId =
  | 'Lya'
  | 'NV_1238'
  | 'NV_1242'
  | 'CIV_1548'
  | 'CIV_1550'
  | 'HeII_1640'
  | 'CIII_1906'
  | 'CIII_1908'
  | 'MgII_2796'
  | 'MgII_2803'
  | 'OII_3727'
  | 'OII_3729'
  | 'Hb'
  | 'OIII_4960'
  | 'OIII_5008'
  | 'NII_6549'
  | 'Ha'
  | 'NII_6585'
  | 'SII_6718'
  | 'SII_6732'
  | 'CII_158um';

export interface SpectralLine {
  readonly id: LineId;
  readonly label: string;
  /** Rest wavelength in vacuum. */
  readonly vacuumWavelengthNm: number;
  /** Scatter of the value among public line lists. */
  readonly spreadNm: number;
  readonly source: string;
}

const PUBLIC_LISTS = 'value common to several public vacuum line lists';

/** Emission lines commonly used at high redshift, by rest wavelength. A wavelength without `air` in its name is in vacuum. */
export const LINES: readonly SpectralLine[] = [
  line('Lya', 'Lyα', 121.567, 0.0003, 'Morton 1991, ApJS 77, 119: 1215.6701 Å, weighted mean of the doublet'),
  line('NV_1238', 'N V 1239', 123.8821, 0.002, 'Morton 1991, ApJS 77, 119'),
  line('NV_1242', 'N V 1243', 124.2804, 0.001, 'Morton 1991, ApJS 77, 119'),
  line('CIV_1548', 'C IV 1548', 154.8195, 0.002, 'Morton 1991, ApJS 77, 119 (1548.204 Å in Morton 2003)'),
  line('CIV_1550', 'C IV 1551', 155.077, 0.002, 'Morton 1991, ApJS 77, 119 (1550.781 Å in Morton 2003)'),
  line('HeII_1640', 'He II 1640', 164.042, 0.003, `mean of the components; ${PUBLIC_LISTS}`),
  line('CIII_1906', '[C III] 1907', 190.6683, 0.001, PUBLIC_LISTS),
  line('CIII_1908', 'C III] 1909', 190.8734, 0.001, PUBLIC_LISTS),
  line('MgII_2796', 'Mg II 2796', 279.6352, 0.001, 'Morton 1991, ApJS 77, 119'),
  line('MgII_2803', 'Mg II 2804', 280.3531, 0.001, 'Morton 1991, ApJS 77, 119'),
  line('OII_3727', '[O II] 3727', 372.7092, 0.002, PUBLIC_LISTS),
  line('OII_3729', '[O II] 3730', 372.9875, 0.002, PUBLIC_LISTS),
  line('Hb', 'Hβ', 486.2683, 0.004, PUBLIC_LISTS),
  line('OIII_4960', '[O III] 4960', 496.0295, 0.001, PUBLIC_LISTS),
  line('OIII_5008', '[O III] 5008', 500.824, 0.001, PUBLIC_LISTS),
  line('NII_6549', '[N II] 6550', 654.986, 0.001, PUBLIC_LISTS),
  line('Ha', 'Hα', 656.4614, 0.001, PUBLIC_LISTS),
  line('NII_6585', '[N II] 6585', 658.527, 0.001, PUBLIC_LISTS),
  line('SII_6718', '[S II] 6718', 671.8294, 0.001, PUBLIC_LISTS),
  line('SII_6732', '[S II] 6733', 673.2674, 0.001, PUBLIC_LISTS),
  line('CII_158um', '[C II] 158 µm', 157_740.93, 6, 'fine-structure line at 1900.5369 GHz (cited from memory)'),
];

function line(id: LineId, label: string, vacuumWavelengthNm: number, spreadNm: number, source: string): SpectralLine {
  return { id, label, vacuumWavelengthNm, spreadNm, source };
}

const LINE_BY_ID = new Map(LINES.map((each) => [each.id, each]));

/** The line of an id, or undefined. */
export function findLine(id: string): SpectralLine | undefined {
  return LINE_BY_ID.get(id as LineId);
}

/** Rest wavelength of Lyα and of the Lyman limit: where neutral hydrogen on the way begins to take the light. */
export const LYMAN_ALPHA_NM = 121.567;
/** The Lyman limit: ionisation edge of hydrogen, 911.75 Å (c/R_H; the digits beyond 911.75 do not matter here). */
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
