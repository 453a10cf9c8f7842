import { BandId, type MagnitudeSystem, type RedshiftKind } from '@faintward/contracts/light';
import type { ImportRole } from '@faintward/contracts/targets';
import { headerUnit } from '@faintward/tables';

/** What the header of a brightness column says of its bare numbers. */
export interface HeaderBrightness {
  bandId?: BandId;
  system?: MagnitudeSystem;
}

const HOURS = /^(?:h|hr|hrs|hour|hours|hourangle)$/;
const DEGREES = /^(?:d|deg|degs|degree|degrees|°)$/;
/** Units that a cell of the role is never written in; read without them its numbers would be other places and redshifts. */
const FOREIGN_UNITS: Readonly<Partial<Record<ImportRole, RegExp>>> = {
  rightAscension: /^(?:rad|radian|radians|arcmin|arcsec|amin|asec|mas|['"′″])$/,
  declination: /^(?:h|hr|hrs|hour|hours|hourangle|hms|rad|radian|radians|arcmin|arcsec|amin|asec|mas|['"′″])$/,
  redshift: /^(?:km ?s-1|km ?s\^-1|km\/s(?:ec)?|kms|m\/s|mpc|gyr|nm|angstrom|å)$/,
};
const WANTED_UNITS: Readonly<Partial<Record<ImportRole, string>>> = {
  rightAscension: 'hours or degrees',
  declination: 'degrees',
  redshift: 'no unit',
};

/** Why a column cannot be read in the unit that its header states; undefined when it can. */
export function foreignUnitError(header: string, role: ImportRole): string | undefined {
  const unit = headerUnit(header);
  if (unit === undefined || FOREIGN_UNITS[role]?.test(unit) !== true) return undefined;
  return `The column "${header.trim()}" is in ${unit}; it is read in ${WANTED_UNITS[role] ?? 'another unit'}. Convert it, or choose another column.`;
}

/**
 * A right ascension cell with the unit of its column written out: a bare number in a column of hours is hours. A cell that
 * says itself what it is keeps its word.
 */
export function withColumnUnit(cell: string, header: string): { text: string; warning?: string } {
  const unit = headerUnit(header);
  if (unit === undefined) return { text: cell };
  const isBareNumber = /^\s*[+]?(?:\d+\.?\d*|\.\d+)\s*$/.test(cell);
  if (HOURS.test(unit) && isBareNumber) return { text: `${cell.trim()}h` };
  if (DEGREES.test(unit) && /^\s*[+]?\d+[\s:]+\d/.test(cell)) {
    return {
      text: cell,
      warning: 'Read as hours, minutes and seconds, as right ascensions are written, though the header says degrees.',
    };
  }
  return { text: cell };
}

const BAND = 'U|B|V|R|I|u|g|r|i|z|Y|J|H|Ks|K';
const BAND_ALONE = new RegExp(`^(?:m(?:ag)?)?(${BAND})(?:mag)?$`);

/** Band and system that a header such as `J_vega`, `mag_J`, `Kmag (Vega)` or `i [AB]` names. Bands keep their case: r and R are two. */
export function headerBrightness(header: string): HeaderBrightness {
  const words = header
    .normalize('NFKC')
    .split(/[^\p{L}\p{N}]+/u)
    .filter((word) => word !== '');
  const said: HeaderBrightness = {};
  for (const word of words) {
    const system = /^(?:mag)?(ab|vega)(?:mag)?$/i.exec(word)?.[1]?.toLowerCase();
    if (system !== undefined) said.system = system === 'ab' ? 'AB' : 'Vega';
    const band = BAND_ALONE.exec(word)?.[1];
    if (band !== undefined) said.bandId ??= band === 'K' ? 'Ks' : BandId.parse(band);
  }
  return said;
}

/** Where the redshifts of a column come from, as its header says: `zphot`, `photo-z`, `redshift (photometric)`. */
export function headerRedshiftKind(header: string): RedshiftKind {
  return /phot/i.test(header) ? 'photometric' : 'spectroscopic';
}
