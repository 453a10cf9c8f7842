import { requireBetween } from './argument-out-of-range.js';
import { normaliseDegrees, type SkyPosition } from './sky-position.js';

/** Why a text is not a coordinate. */
export type CoordinateRefusalCode =
  | 'empty'
  | 'not-a-coordinate'
  | 'decimal-comma'
  | 'negative-right-ascension'
  | 'out-of-range'
  | 'minutes-out-of-range'
  | 'seconds-out-of-range'
  | 'too-many-fields'
  | 'sign-inside'
  | 'fraction-not-last'
  | 'hours-in-declination'
  | 'mixed-notation'
  | 'not-two-coordinates';

export interface CoordinateRefusal {
  readonly ok: false;
  readonly code: CoordinateRefusalCode;
  /** Fit for the person who typed it: what is wrong and what would be right. */
  readonly message: string;
}

export type ParsedAngle = { readonly ok: true; readonly degrees: number } | CoordinateRefusal;
export type ParsedPosition = { readonly ok: true; readonly position: SkyPosition } | CoordinateRefusal;

/** How the fields of a sexagesimal angle are set apart. `letters`: 10h00m28.60s, +02d12m21.0s. */
export type SexagesimalStyle = 'colons' | 'spaces' | 'letters';

export interface FormatAngleOptions {
  /** Digits after the decimal point of the seconds, 0 to 9; by default 2 for right ascension and 1 for declination. */
  readonly secondsDecimals?: number;
  /** Default `colons`. */
  readonly style?: SexagesimalStyle;
}

type Unit = 'hours' | 'degrees' | 'unmarked';

interface Fields {
  readonly negative: boolean;
  readonly values: readonly number[];
  readonly unit: Unit;
}

// Marks are brought to one letter each before parsing. Superscript letters and typographic primes come with text copied from papers.
const markPatterns: readonly (readonly [RegExp, string])[] = [
  [/[\u2212\u2010-\u2013\ufe63\uff0d]/g, '-'],
  [/\uff0b/g, '+'],
  [/[\u00a0\u2000-\u200a\u202f\u3000\t]/g, ' '],
  [/ʰ|hours?|hrs?/gi, 'h'],
  [/ᵈ|°|º|˚|degrees?|deg/gi, 'd'],
  [/″|”|“|"|''|′′|’’|arcsec|ˢ/gi, 's'],
  [/′|’|‘|'|arcmin|ᵐ|min/gi, 'm'],
  [/sec/gi, 's'],
];

const longestText = 200;

const unsignedNumber = String.raw`\d+(?:\.\d*)?|\.\d+`;
const bareNumber = new RegExp(String.raw`^(${unsignedNumber})(?:e([+-]?\d+))?\s*(d|h)?$`);
const marked = new RegExp(
  String.raw`^(${unsignedNumber})\s*([hd])(?:\s*(${unsignedNumber})\s*m(?:\s*(${unsignedNumber})\s*s)?)?$`,
);
const markedWithoutLast = new RegExp(String.raw`^(\d+)\s*([hd])\s*(\d+)(?:\s*m\s*(${unsignedNumber}))?$`);

/**
 * Right ascension from text, in degrees, 0 ≤ α < 360.
 *
 * Fields set apart by colons or blanks, or marked with h, are hours; a bare number, and anything marked with ° or d, is degrees. The last field may have decimals.
 * Marks may be letters, primes or superscripts, and may stand before the decimal point of the seconds (28ˢ.6). 360° is 0°; 24 hours and more, a
 * minus sign, and minutes or seconds of 60 are refused. Exact to rounding (better than 1e-12 degrees).
 */
export function parseRightAscension(text: string): ParsedAngle {
  const fields = readFields(text, 'right ascension', '10:00:28.6, 10h00m28.6s or 150.1192');
  if ('code' in fields) return fields;
  if (fields.negative) {
    return refuse(
      'negative-right-ascension',
      `${quote(text)} is negative; a right ascension runs from 0 to 24 hours (0 to 360 degrees).`,
    );
  }
  const inHours = fields.unit === 'hours' || (fields.unit === 'unmarked' && fields.values.length > 1);
  const sexagesimal = combine(fields, text);
  if (typeof sexagesimal !== 'number') return sexagesimal;
  if (inHours) {
    if (sexagesimal >= 24 * 3600)
      return refuse('out-of-range', `${quote(text)} is 24 hours or more; a right ascension is below 24 hours.`);
    return { ok: true, degrees: sexagesimal / 240 };
  }
  if (sexagesimal > 360 * 3600)
    return refuse(
      'out-of-range',
      `${quote(text)} is above 360 degrees. Hours are written with separators, like 10:00:28.6.`,
    );
  return {
    ok: true,
    degrees: normaliseDegrees(fields.values.length === 1 ? (fields.values[0] ?? 0) : sexagesimal / 3600),
  };
}

/**
 * Declination from text, in degrees, −90 ≤ δ ≤ 90.
 *
 * Always degrees, minutes and seconds of arc, whatever sets the fields apart. The sign belongs to the whole value, so that -00:30:00 is −0.5°. The last field may have
 * decimals. Minutes or seconds of 60, hours, and anything beyond a pole are refused. Exact to rounding (better than 1e-13 degrees).
 */
export function parseDeclination(text: string): ParsedAngle {
  const fields = readFields(text, 'declination', '-27:48:18, -27d48m18s or -27.805');
  if ('code' in fields) return fields;
  if (fields.unit === 'hours')
    return refuse('hours-in-declination', `${quote(text)} is marked as hours; a declination is in degrees.`);
  const sexagesimal = combine(fields, text);
  if (typeof sexagesimal !== 'number') return sexagesimal;
  if (sexagesimal > 90 * 3600)
    return refuse('out-of-range', `${quote(text)} is beyond the pole; a declination runs from -90 to 90 degrees.`);
  const size = fields.values.length === 1 ? (fields.values[0] ?? 0) : sexagesimal / 3600;
  // Not -0: it would travel through JSON as 0 and compare unequal in a strict test of a round trip.
  return { ok: true, degrees: fields.negative && size !== 0 ? -size : size };
}

/**
 * Both coordinates from one text, as people paste them: "10:00:28.6 +02:12:21", "10 00 28.6 -02 12 21", "150.119, -2.2", "10h00m28.6s+02d12m21s". They are divided
 * at a comma or semicolon, else at the sign of the declination, else, when the number of words is even, in the middle. A leading equinox "J2000" is skipped.
 */
export function parsePosition(text: string): ParsedPosition {
  const plain = normaliseMarks(text.slice(0, longestText + 1)).replace(/^(?:j2000(?:\.0)?|icrs)\s+/i, '');
  const halves = divide(plain);
  if (halves === undefined) {
    return refuse(
      'not-two-coordinates',
      `${quote(text)} does not divide into a right ascension and a declination. Write them like 10:00:28.6 +02:12:21.`,
    );
  }
  const rightAscension = parseRightAscension(halves[0]);
  if (!rightAscension.ok) return rightAscension;
  const declination = parseDeclination(halves[1]);
  if (!declination.ok) return declination;
  return { ok: true, position: { raDeg: rightAscension.degrees, decDeg: declination.degrees } };
}

/**
 * Right ascension as hours, minutes and seconds, rounded to the nearest last digit; what rounds up to 24h is written as 00h.
 *
 * @param raDeg degrees; any finite value, taken modulo 360
 * @throws {ArgumentOutOfRange} if raDeg is not finite or the number of decimals is not a whole number from 0 to 9
 */
export function formatRightAscension(raDeg: number, options: FormatAngleOptions = {}): string {
  requireBetween('raDeg', raDeg, -Number.MAX_VALUE, Number.MAX_VALUE);
  const { secondsDecimals = 2, style = 'colons' } = options;
  const scale = decimalScale(secondsDecimals);
  const units = Math.round(normaliseDegrees(raDeg) * 240 * scale) % (86_400 * scale);
  return writeFields(units, secondsDecimals, style, 'h', '');
}

/**
 * Declination as signed degrees, minutes and seconds of arc, rounded to the nearest last digit. The sign is always written; what rounds to zero gets a plus.
 *
 * @param decDeg degrees, −90 to 90
 * @throws {ArgumentOutOfRange} if decDeg is outside, or the number of decimals is not a whole number from 0 to 9
 */
export function formatDeclination(decDeg: number, options: FormatAngleOptions = {}): string {
  requireBetween('decDeg', decDeg, -90, 90);
  const { secondsDecimals = 1, style = 'colons' } = options;
  const units = Math.round(Math.abs(decDeg) * 3600 * decimalScale(secondsDecimals));
  return writeFields(units, secondsDecimals, style, 'd', decDeg < 0 && units > 0 ? '-' : '+');
}

export interface DesignationOptions {
  /** Digits after the point of the seconds of right ascension; default 2. */
  readonly raSecondsDecimals?: number;
  /** Digits after the point of the seconds of declination; default 1. */
  readonly decSecondsDecimals?: number;
  /** Put before the J with a blank between. */
  readonly acronym?: string;
}

/**
 * Designation by position in the form JHHMMSS.ss±DDMMSS.s. By the IAU's recommendations the coordinates are truncated, never rounded, so that a name
 * stays that of the field it lies in, and the declination always has its sign.
 *
 * A coordinate that came from sexagesimal text of the same number of digits keeps exactly these digits: a value less than a millionth of the last digit below the next
 * one counts as reaching it, since that much is lost in converting to degrees.
 *
 * @throws {ArgumentOutOfRange} if a coordinate is out of range or a number of decimals is not a whole number from 0 to 5
 * @see Dickel, Lortet & de Boer 1987, A&AS 68, 75 (from memory), and the IAU's specifications for designations of radiation sources
 */
export function designationFromPosition(position: SkyPosition, options: DesignationOptions = {}): string {
  const { raSecondsDecimals = 2, decSecondsDecimals = 1, acronym } = options;
  requireBetween('raDeg', position.raDeg, 0, 360);
  requireBetween('decDeg', position.decDeg, -90, 90);
  requireBetween('raSecondsDecimals', raSecondsDecimals, 0, 5);
  requireBetween('decSecondsDecimals', decSecondsDecimals, 0, 5);
  const raScale = decimalScale(raSecondsDecimals);
  const raUnits = truncate(normaliseDegrees(position.raDeg) * 240 * raScale) % (86_400 * raScale);
  const decUnits = truncate(Math.abs(position.decDeg) * 3600 * decimalScale(decSecondsDecimals));
  const sign = position.decDeg < 0 ? '-' : '+';
  const name = `J${writeFields(raUnits, raSecondsDecimals, 'none', 'h', '')}${writeFields(decUnits, decSecondsDecimals, 'none', 'd', sign)}`;
  return acronym === undefined || acronym === '' ? name : `${acronym} ${name}`;
}

function truncate(units: number): number {
  return Math.floor(units + 1e-6);
}

function normaliseMarks(text: string): string {
  let plain = text;
  for (const [pattern, replacement] of markPatterns) plain = plain.replace(pattern, replacement);
  return plain.trim().toLowerCase();
}

function readFields(text: string, quantity: string, example: string): Fields | CoordinateRefusal {
  const shown = quote(text);
  if (text.length > longestText)
    return refuse('not-a-coordinate', `${shown} is too long for a ${quantity}. Write it like ${example}.`);
  let plain = normaliseMarks(text);
  if (plain === '') return refuse('empty', `The ${quantity} is empty. Write it like ${example}.`);
  // 28s.6 is the older way to write 28.6s.
  plain = plain.replace(/([hdms])\.(\d+)/g, '.$2$1');
  const negative = plain.startsWith('-');
  const signed = /^[+-]/.test(plain);
  const unsigned = signed ? plain.slice(1).trimStart() : plain;
  if (/^[+-]/.test(unsigned)) return refuse('sign-inside', `${shown} has two signs.`);

  const bare = bareNumber.exec(unsigned);
  if (bare?.[1] !== undefined) {
    const value = Number(`${bare[1]}e${bare[2] ?? '0'}`);
    if (!Number.isFinite(value)) return refuse('out-of-range', `${shown} is too large for a ${quantity}.`);
    return { negative, values: [value], unit: bare[3] === 'h' ? 'hours' : bare[3] === 'd' ? 'degrees' : 'unmarked' };
  }
  if (/\d,\d/.test(unsigned)) return refuse('decimal-comma', `${shown} has a comma. Write a decimal point instead.`);
  if (/[:\shdm]\s*[+-]/.test(unsigned))
    return refuse('sign-inside', `${shown} has a sign in the middle; only the first field may have one.`);

  if (/^[\d.:\s]+$/.test(unsigned)) {
    if (unsigned.includes(':') && /\d\s+\d/.test(unsigned))
      return refuse('mixed-notation', `${shown} mixes colons and blanks. Write it like ${example}.`);
    return fieldsFromWords(
      unsigned.split(unsigned.includes(':') ? /\s*:\s*/ : /\s+/),
      negative,
      shown,
      quantity,
      example,
    );
  }
  const match = marked.exec(unsigned) ?? markedWithoutLast.exec(unsigned);
  if (match) {
    const words = [match[1], match[3], match[4]].filter((word) => word !== undefined);
    const fields = fieldsFromWords(words, negative, shown, quantity, example);
    return 'code' in fields ? fields : { ...fields, unit: match[2] === 'h' ? 'hours' : 'degrees' };
  }
  return refuse('not-a-coordinate', `${shown} is not a ${quantity}. Write it like ${example}.`);
}

function fieldsFromWords(
  words: readonly string[],
  negative: boolean,
  shown: string,
  quantity: string,
  example: string,
): Fields | CoordinateRefusal {
  if (words.length > 3)
    return refuse('too-many-fields', `${shown} has ${words.length} fields; a ${quantity} has at most three.`);
  if (!words.every((word) => /^(?:\d+(?:\.\d*)?|\.\d+)$/.test(word))) {
    return refuse('not-a-coordinate', `${shown} is not a ${quantity}. Write it like ${example}.`);
  }
  if (words.slice(0, -1).some((word) => word.includes('.')))
    return refuse('fraction-not-last', `${shown} has decimals in a field that is not the last one.`);
  return { negative, values: words.map(Number), unit: 'unmarked' };
}

/** Size in seconds (of time or of arc), without the sign. */
function combine({ values }: Fields, text: string): number | CoordinateRefusal {
  const [whole = 0, minutes = 0, seconds = 0] = values;
  if (minutes >= 60)
    return refuse('minutes-out-of-range', `${quote(text)} has ${minutes} minutes; they run from 0 to below 60.`);
  if (seconds >= 60)
    return refuse('seconds-out-of-range', `${quote(text)} has ${seconds} seconds; they run from 0 to below 60.`);
  return whole * 3600 + minutes * 60 + seconds;
}

function divide(plain: string): [string, string] | undefined {
  const parts = plain.split(/\s*[,;]\s*/);
  if (parts.length === 2) return [parts[0] ?? '', parts[1] ?? ''];
  if (parts.length > 2) return undefined;
  // Neither the sign of the right ascension, which is refused later, nor that of an exponent.
  const sign = plain.search(/(?<!^|[\d.]e)[+-]/);
  if (sign !== -1) return [plain.slice(0, sign).trim(), plain.slice(sign).trim()];
  const words = plain.split(/\s+/);
  if (words.length % 2 !== 0 || words.length === 0) return undefined;
  const middle = words.length / 2;
  return [words.slice(0, middle).join(' '), words.slice(middle).join(' ')];
}

function decimalScale(decimals: number): number {
  requireBetween('secondsDecimals', decimals, 0, 9);
  if (!Number.isInteger(decimals)) requireBetween('secondsDecimals', Number.NaN, 0, 9);
  return 10 ** decimals;
}

/** Fields of an angle that is given as a whole number of its last digits: whole numbers carry correctly by construction. */
function writeFields(
  units: number,
  decimals: number,
  style: SexagesimalStyle | 'none',
  first: 'h' | 'd',
  sign: string,
): string {
  const scale = 10 ** decimals;
  const fraction = units % scale;
  const wholeSeconds = (units - fraction) / scale;
  const seconds = wholeSeconds % 60;
  const wholeMinutes = (wholeSeconds - seconds) / 60;
  const minutes = wholeMinutes % 60;
  const whole = (wholeMinutes - minutes) / 60;
  const two = (value: number): string => String(value).padStart(2, '0');
  const lastField = decimals === 0 ? two(seconds) : `${two(seconds)}.${String(fraction).padStart(decimals, '0')}`;
  if (style === 'letters') return `${sign}${two(whole)}${first}${two(minutes)}m${lastField}s`;
  const separator = style === 'colons' ? ':' : style === 'spaces' ? ' ' : '';
  return `${sign}${[two(whole), two(minutes), lastField].join(separator)}`;
}

function quote(text: string): string {
  const shown = text.trim();
  return `"${shown.length > 40 ? `${shown.slice(0, 39)}…` : shown}"`;
}

function refuse(code: CoordinateRefusalCode, message: string): CoordinateRefusal {
  return { ok: false, code, message };
}
