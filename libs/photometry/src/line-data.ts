import type { Provenance } from './bands.js';
import { OutOfDomainError, requirePositive } from './domain.js';
import type { LineId, SpectralLine } from './lines.js';

/** A line with what its wavelength rests on; a row of `lines.json`. */
export interface ReferenceLine extends SpectralLine {
  readonly provenance: Provenance;
}

export interface LinesTable {
  readonly lines: readonly ReferenceLine[];
}

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
] as const satisfies LineId[];

/**
 * Lines from their file, by rest wavelength.
 *
 * @throws {OutOfDomainError} for a wavelength that is not positive, or a line that is missing or stands twice
 */
export function createLines({ data }: { readonly data: LinesTable }): readonly ReferenceLine[] {
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
