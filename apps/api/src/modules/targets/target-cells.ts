import type { FieldError } from '@faintward/contracts/errors';
import type { Light } from '@faintward/contracts/light';
import { type TargetCells, TargetInput } from '@faintward/contracts/targets';
import { parseDeclination, parsePosition, parseRightAscension } from '@faintward/astronomy';
import { parseDecimal } from '@faintward/tables';
import { type BrightnessDefaults, parseBrightness } from './brightness-text.js';

/** The fields of a target that cells can set. */
export interface CellValues {
  name?: string;
  rightAscensionDeg?: number;
  declinationDeg?: number;
  redshift?: number;
  redshiftSigma?: number | null;
  light?: Light | null;
  notes?: string;
}

export interface CellsReading {
  values: CellValues;
  errors: Partial<Record<keyof TargetCells, string>>;
  warnings: Partial<Record<keyof TargetCells, string>>;
}

const fields = TargetInput.shape;

/** Reads texts as typed. A cell that cannot be used gets an error that says what would be right, and sets nothing. */
export function readCells(cells: TargetCells, brightness: BrightnessDefaults): CellsReading {
  const reading: CellsReading = { values: {}, errors: {}, warnings: {} };
  const { values, errors, warnings } = reading;
  if (cells.name !== undefined) {
    const name = fields.name.safeParse(cells.name);
    if (name.success) values.name = name.data;
    else errors.name = messageOf(name.error, 'A name is needed.', cells.name);
  }
  readPosition(cells, reading);
  if (cells.redshift !== undefined) {
    const redshift = readNumber(cells.redshift, fields.redshift, 'A redshift is needed, such as 7.12.');
    if (typeof redshift === 'number') values.redshift = redshift;
    else errors.redshift = redshift.message;
  }
  if (cells.redshiftSigma !== undefined) {
    const text = cells.redshiftSigma.trim();
    const sigma = text === '' ? null : readNumber(text.replace(/^(?:±|\+\/-|\+-)\s*/u, ''), fields.redshiftSigma, '');
    if (sigma === null || typeof sigma === 'number') values.redshiftSigma = sigma;
    else errors.redshiftSigma = sigma.message;
  }
  if (cells.brightness !== undefined) {
    const parsed = parseBrightness(cells.brightness, brightness);
    if (parsed.ok) values.light = parsed.light;
    else errors.brightness = parsed.message;
    if (parsed.ok && parsed.warning !== undefined) warnings.brightness = parsed.warning;
  }
  if (cells.notes !== undefined) {
    const notes = fields.notes.safeParse(cells.notes);
    if (notes.success) values.notes = notes.data;
    else errors.notes = messageOf(notes.error, '', cells.notes);
  }
  return reading;
}

/** Errors of cells as field errors of a request. */
export function cellFaults(errors: CellsReading['errors']): FieldError[] {
  return Object.entries(errors).map(([cell, message]) => ({ path: `cells.${cell}`, message }));
}

/** A right ascension cell may hold both coordinates, as they come from a paper, when the other cell says nothing. */
function readPosition(cells: TargetCells, { values, errors }: CellsReading): void {
  const { rightAscension, declination } = cells;
  if (rightAscension !== undefined) {
    const parsed = parseRightAscension(rightAscension);
    const isAlone = declination === undefined || declination.trim() === '';
    const both = !parsed.ok && isAlone ? parsePosition(rightAscension) : undefined;
    if (parsed.ok) values.rightAscensionDeg = parsed.degrees;
    else if (both?.ok === true) {
      values.rightAscensionDeg = both.position.raDeg;
      values.declinationDeg = both.position.decDeg;
      return;
    } else errors.rightAscension = parsed.message;
  }
  if (declination !== undefined) {
    const parsed = parseDeclination(declination);
    if (parsed.ok) values.declinationDeg = parsed.degrees;
    else errors.declination = parsed.message;
  }
}

type NumberSchema = typeof fields.redshift | typeof fields.redshiftSigma;

function readNumber(text: string, schema: NumberSchema, emptyMessage: string): number | { message: string } {
  const parsed = parseDecimal(text);
  if (!parsed.ok) return { message: parsed.code === 'empty' && emptyMessage !== '' ? emptyMessage : parsed.message };
  const checked = schema.safeParse(parsed.value);
  if (checked.success) return checked.data ?? parsed.value;
  return { message: checked.error.issues[0]?.message ?? 'Out of range.' };
}

function messageOf(error: { issues: { message: string }[] }, emptyMessage: string, text: string): string {
  if (text.trim() === '' && emptyMessage !== '') return emptyMessage;
  return error.issues[0]?.message ?? 'This text cannot be used.';
}
