import { normaliseMinus, parseDecimal } from './decimal-number.js';

/** What a column of a target list means. */
export type ColumnRole =
  | 'name'
  | 'rightAscension'
  | 'declination'
  | 'redshift'
  | 'redshiftUncertainty'
  | 'magnitude'
  | 'magnitudeSigma'
  | 'magnitudeBand'
  | 'sizeArcsec'
  | 'priority'
  | 'notes';

export interface ColumnGuess {
  /** From 0. */
  readonly columnIndex: number;
  readonly role: ColumnRole;
  /** 0 to 1. Above 0.8 the header says it; 0.5 to 0.8 the header hints and the cells agree; below 0.5 only the cells suggest it. */
  readonly confidence: number;
  /** Unit that the header states in brackets or at its end, as written there in lower case ("deg", "h", "mag"); absent if none is stated. */
  readonly unit?: string;
}

export interface ColumnRoleMapping {
  /** At most one guess for each role and each column, in the order of the columns. */
  readonly guesses: readonly ColumnGuess[];
  /** Columns that no role was found for, from 0. */
  readonly unassigned: readonly number[];
}

// Header words without units, separators and case, strongest first. Astronomical tables are not consistent: the lists hold what catalogues, papers and
// people usually write. `z` and `v` are handled by their cells too, since both may be photometric bands.
const headerWords: Readonly<Record<ColumnRole, readonly string[]>> = {
  name: [
    'name',
    'target',
    'targetname',
    'object',
    'objectname',
    'objname',
    'source',
    'sourcename',
    'designation',
    'id',
    'objid',
    'sourceid',
    'identifier',
    'mainid',
  ],
  rightAscension: [
    'rightascension',
    'ra',
    'raj2000',
    'raicrs',
    'rafk5',
    'ra2000',
    'alpha',
    'alphaj2000',
    'α',
    'rahms',
    'rasexagesimal',
    'radeg',
    'rah',
    'rahours',
    'posra',
    'coordra',
  ],
  declination: [
    'declination',
    'dec',
    'decj2000',
    'de',
    'dej2000',
    'deicrs',
    'decicrs',
    'defk5',
    'dec2000',
    'delta',
    'deltaj2000',
    'δ',
    'decdms',
    'decsexagesimal',
    'decdeg',
    'dedeg',
    'decl',
    'posdec',
    'coorddec',
  ],
  redshift: [
    'redshift',
    'z',
    'zspec',
    'specz',
    'zphot',
    'photz',
    'zbest',
    'zsys',
    'zem',
    'zhelio',
    'redshiftspec',
    'redshiftphot',
    'spectroscopicredshift',
    'photometricredshift',
  ],
  redshiftUncertainty: [
    'redshiftsigma',
    'redshifterror',
    'redshifterr',
    'redshiftuncertainty',
    'eredshift',
    'zerr',
    'zerror',
    'errz',
    'ez',
    'sigmaz',
    'zsigma',
    'dz',
    'σz',
    'ezspec',
    'zspecerr',
    'zphoterr',
    'ezphot',
  ],
  magnitude: [
    'magnitude',
    'mag',
    'appmag',
    'apparentmagnitude',
    'magab',
    'vmag',
    'rmag',
    'imag',
    'gmag',
    'zmag',
    'umag',
    'bmag',
    'jmag',
    'hmag',
    'kmag',
    'ksmag',
    'ymag',
    'magv',
    'magr',
    'magi',
    'magg',
    'magz',
    'magj',
    'magh',
    'magk',
    'mv',
    'mr',
    'mi',
    'mab',
    'f814w',
    'f160w',
  ],
  magnitudeSigma: [
    'magnitudesigma',
    'magnitudeerror',
    'magsigma',
    'magerr',
    'magerror',
    'errmag',
    'emag',
    'sigmamag',
    'evmag',
    'ermag',
    'eimag',
    'egmag',
    'ejmag',
    'ehmag',
    'ekmag',
    'dmag',
  ],
  magnitudeBand: ['band', 'magnitudeband', 'magband', 'filter', 'passband'],
  sizeArcsec: [
    'size',
    'sizearcsec',
    'angularsize',
    'diameter',
    're',
    'rhalf',
    'halflightradius',
    'effectiveradius',
    'radius',
    'fwhm',
  ],
  priority: ['priority', 'prio', 'rank', 'weight', 'importance'],
  notes: ['notes', 'note', 'comment', 'comments', 'remark', 'remarks', 'description'],
};

const units = [
  'degrees',
  'degree',
  'deg',
  'hours',
  'hour',
  'hms',
  'dms',
  'h',
  'arcsec',
  'arcmin',
  'mag',
  'abmag',
  'ab',
  'vega',
  '°',
  '"',
  '″',
];

const roles = Object.keys(headerWords) as ColumnRole[];

interface Candidate extends ColumnGuess {
  readonly rank: number;
}

/**
 * Which column means what, from the header and a sample of the cells.
 *
 * The header decides; cells can confirm it, lower the confidence, settle an ambiguous header (a column "z" full of 22s is a magnitude, not a redshift),
 * or, in a list without a header, suggest the name and the two coordinates. The result is a proposal for a person to confirm: nothing is converted.
 *
 * @param columns header texts, one per column
 * @param sampleRows some rows, each with one cell per column; a hundred are plenty
 */
export function guessColumnRoles(
  columns: readonly string[],
  sampleRows: readonly (readonly string[])[],
): ColumnRoleMapping {
  const candidates: Candidate[] = [];
  columns.forEach((column, columnIndex) => {
    const cells = cellsOf(sampleRows, columnIndex);
    for (const guess of guessesFromHeader(column, columnIndex, cells)) candidates.push(guess);
  });
  const chosen = pickBest(candidates);
  addGuessesFromCells(columns, sampleRows, chosen);

  const guesses = chosen
    .map(({ columnIndex, role, confidence, unit }) => ({
      columnIndex,
      role,
      confidence,
      ...(unit === undefined ? {} : { unit }),
    }))
    .sort((a, b) => a.columnIndex - b.columnIndex);
  const taken = new Set(guesses.map((guess) => guess.columnIndex));
  return { guesses, unassigned: columns.map((_, index) => index).filter((index) => !taken.has(index)) };
}

/** Index of the column that was guessed for a role, or undefined. */
export function columnOfRole(mapping: ColumnRoleMapping, role: ColumnRole): number | undefined {
  return mapping.guesses.find((guess) => guess.role === role)?.columnIndex;
}

/** Unit that a header states in brackets or at its end, in lower case: "h" of "RA [h]", "deg" of "dec_deg"; undefined if it states none. */
export function headerUnit(column: string): string | undefined {
  return splitHeader(column).unit;
}

/** Whether a header text belongs to the vocabulary of some role. */
export function isKnownHeader(column: string): boolean {
  const { word } = splitHeader(column);
  return roles.some((role) => headerWords[role].includes(word));
}

/** Whether a cell is written like a number or like a sexagesimal angle. */
export function isNumberLike(cell: string): boolean {
  return parseDecimal(cell).ok || isSexagesimal(cell);
}

function guessesFromHeader(column: string, columnIndex: number, cells: readonly string[]): Candidate[] {
  const { word, unit } = splitHeader(column);
  const found: Candidate[] = [];
  for (const role of roles) {
    const rank = headerWords[role].indexOf(word);
    if (rank === -1) continue;
    const fit = cellsFit(role, cells);
    // One letter may be a photometric band as well; a word is believed, and its odd cells are shown as errors later.
    const isAmbiguous = word === 'z';
    if (isAmbiguous && fit === 'contradicts') continue;
    const confidence = confidenceOf(fit, isAmbiguous);
    found.push({ columnIndex, role, rank, confidence, ...(unit === undefined ? {} : { unit }) });
  }
  // A bare photometric band letter as header, or "z" that holds magnitudes.
  if (found.length === 0 && /^(?:u|b|g|v|r|i|z|y|j|h|k|ks)$/.test(word) && cellsFit('magnitude', cells) === 'agrees') {
    found.push({ columnIndex, role: 'magnitude', rank: 90, confidence: 0.6, ...(unit === undefined ? {} : { unit }) });
  }
  return found;
}

function confidenceOf(fit: Fit, isAmbiguous: boolean): number {
  switch (fit) {
    case 'agrees':
      return isAmbiguous ? 0.9 : 1;
    case 'silent':
      return isAmbiguous ? 0.6 : 0.85;
    case 'contradicts':
      return 0.55;
  }
}

/** One column per role and one role per column, the most confident first; among equals the commoner word, then the earlier column. */
function pickBest(candidates: readonly Candidate[]): ColumnGuess[] {
  const ordered = [...candidates].sort(
    (a, b) => b.confidence - a.confidence || a.rank - b.rank || a.columnIndex - b.columnIndex,
  );
  const takenColumns = new Set<number>();
  const takenRoles = new Set<ColumnRole>();
  const chosen: ColumnGuess[] = [];
  for (const candidate of ordered) {
    if (takenColumns.has(candidate.columnIndex) || takenRoles.has(candidate.role)) continue;
    takenColumns.add(candidate.columnIndex);
    takenRoles.add(candidate.role);
    chosen.push(candidate);
  }
  return chosen;
}

/** Without helpful headers: two neighbouring columns of angles are the coordinates, and words before them the name. */
function addGuessesFromCells(
  columns: readonly string[],
  rows: readonly (readonly string[])[],
  chosen: ColumnGuess[],
): void {
  const taken = new Set(chosen.map((guess) => guess.columnIndex));
  const has = (role: ColumnRole): boolean => chosen.some((guess) => guess.role === role);
  const add = (columnIndex: number, role: ColumnRole, confidence: number): void => {
    taken.add(columnIndex);
    chosen.push({ columnIndex, role, confidence });
  };
  if (!has('rightAscension') && !has('declination')) {
    for (let index = 0; index + 1 < columns.length; index += 1) {
      if (taken.has(index) || taken.has(index + 1)) continue;
      const first = cellsOf(rows, index);
      const second = cellsOf(rows, index + 1);
      if (
        !mostly(first, isSexagesimal) ||
        !mostly(second, isSexagesimal) ||
        !second.some((cell) => /^[+-]/.test(normaliseMinus(cell)))
      )
        continue;
      add(index, 'rightAscension', 0.45);
      add(index + 1, 'declination', 0.45);
      break;
    }
  }
  if (!has('name') && has('rightAscension')) {
    const position = chosen.find((guess) => guess.role === 'rightAscension')?.columnIndex ?? 0;
    for (let index = 0; index < position; index += 1) {
      if (taken.has(index) || isKnownHeader(columns[index] ?? '')) continue;
      const cells = cellsOf(rows, index);
      if (cells.length > 0 && mostly(cells, (cell) => /\p{L}/u.test(cell) && !isSexagesimal(cell))) {
        add(index, 'name', 0.4);
        break;
      }
    }
  }
}

type Fit = 'agrees' | 'silent' | 'contradicts';

function cellsFit(role: ColumnRole, cells: readonly string[]): Fit {
  if (cells.length === 0) return 'silent';
  switch (role) {
    case 'name':
    case 'notes':
    case 'priority':
      return 'silent';
    case 'magnitudeBand':
      return mostly(cells, (cell) => !parseDecimal(cell).ok) ? 'agrees' : 'contradicts';
    case 'rightAscension':
      return agreement(cells, (cell) => isSexagesimal(cell) || numberBetween(cell, -360, 360));
    case 'declination':
      return agreement(cells, (cell) => isSexagesimal(cell) || numberBetween(cell, -90, 90));
    case 'redshift':
      return agreement(cells, (cell) => numberBetween(cell, -0.1, 15));
    case 'redshiftUncertainty':
      return agreement(cells, (cell) => numberBetween(cell, 0, 5));
    case 'magnitude':
      return agreement(cells, (cell) => numberBetween(cell, 8, 35));
    case 'magnitudeSigma':
      return agreement(cells, (cell) => numberBetween(cell, 0, 5));
    case 'sizeArcsec':
      return agreement(cells, (cell) => numberBetween(cell, 0, 10_000));
  }
}

/** Contradiction needs most cells against it: a few bad cells are what the import preview is for. */
function agreement(cells: readonly string[], fits: (cell: string) => boolean): Fit {
  const share = cells.filter(fits).length / cells.length;
  if (share >= 0.6) return 'agrees';
  // Cells that are not numbers at all are faulty cells, which must be shown as such, and no sign of another meaning.
  const numeric = cells.filter((cell) => isNumberLike(cell));
  return numeric.length > cells.length / 2 ? 'contradicts' : 'silent';
}

function mostly(cells: readonly string[], fits: (cell: string) => boolean): boolean {
  return cells.length > 0 && cells.filter(fits).length >= 0.6 * cells.length;
}

function numberBetween(cell: string, lowest: number, highest: number): boolean {
  const parsed = parseDecimal(cell);
  return parsed.ok && parsed.value >= lowest && parsed.value <= highest;
}

function isSexagesimal(cell: string): boolean {
  return /^[+-]?\d{1,3}\s*[:hd°\s]\s*\d{1,2}(?:\s*[:m'′\s]\s*\d{1,2}(?:\.\d*)?\s*(?:s|"|″|'')?|\s*[m'′]|\.\d*)?$/i.test(
    normaliseMinus(cell.trim()),
  );
}

function cellsOf(rows: readonly (readonly string[])[], columnIndex: number): string[] {
  return rows.map((row) => (row[columnIndex] ?? '').trim()).filter((cell) => cell !== '');
}

function splitHeader(column: string): { word: string; unit?: string } {
  const text = column.normalize('NFKC').trim().toLowerCase();
  const bracket = /^(.*?)\s*[([{]\s*([^)\]}]*?)\s*[)\]}]\s*$/.exec(text);
  if (bracket?.[1] !== undefined && bracket[1] !== '') {
    return { word: letters(bracket[1]), ...(bracket[2] ? { unit: bracket[2] } : {}) };
  }
  const parts = text.split(/[\s_.\-/]+/).filter((part) => part !== '');
  const last = parts.at(-1);
  // "v_mag" keeps its last part, since "mag" alone there is the quantity and not a unit.
  if (parts.length > 1 && last !== undefined && last !== 'mag' && units.includes(last)) {
    return { word: letters(parts.slice(0, -1).join('')), unit: last };
  }
  return { word: letters(text) };
}

function letters(text: string): string {
  return text.replace(/[^\p{L}\p{N}]/gu, '');
}
