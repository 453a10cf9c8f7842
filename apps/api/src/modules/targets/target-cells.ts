import type { FieldError } from '@faintward/contracts/errors';
import type { Light, RedshiftUncertainty } from '@faintward/contracts/light';
import { type TargetCells, TargetInput } from '@faintward/contracts/targets';
import { parseDeclination, parsePosition, parseRightAscension } from '@faintward/astronomy';
import { parseDecimal } from '@faintward/tables';
import { type BrightnessDefaults, parseBrightness } from './brightness-text.js';
import { parseRedshiftUncertainty } from './redshift-uncertainty-text.js';

/** The fields of a target that cells can set. */
export interface CellValues {
  name?: string;
  rightAscensionDeg?: number;
  declinationDeg?: number;
  redshift?: number;
  redshiftUncertainty?: RedshiftUncertainty | null;
  light?: Light | null;
  notes?: string;
}

export interface CellsReading {
  values: CellValues;
  errors: Partial<Record<keyof TargetCells, string>>;
  warnings: Partial<Record<keyof TargetCells, string>>;
}

/** What cells are read against. */
export interface CellDefaults {
  brightness: BrightnessDefaults;
  /** The redshift given beside the cells, or stored: what an uncertainty is measured from when no cell says another. */
  redshift?: number | undefined;
  /** What an uncertainty cell replaces; absent for a new target. */
  present?: { redshift: number; uncertainty: RedshiftUncertainty | null } | undefined;
}

const fields = TargetInput.shape;

/** Reads texts as typed. A cell that cannot be used gets an error that says what would be right, and sets nothing. */
export function readCells(cells: TargetCells, { brightness, redshift: given, present }: CellDefaults): CellsReading {
  const reading: CellsReading = { values: {}, errors: {}, warnings: {} };
  const { values, errors, warnings } = reading;
  if (cells.name !== undefined) {
    const name = fields.name.safeParse(cells.name);
    if (name.success) values.name = name.data;
    else errors.name = messageOf(name.error, 'A name is needed.', cells.name);
  }
  readPosition(cells, reading);
  if (cells.redshift !== undefined) {
    const redshift = readRedshift(cells.redshift);
    if (typeof redshift === 'number') values.redshift = redshift;
    else errors.redshift = redshift.message;
  }
  if (cells.redshiftUncertainty !== undefined) {
    const redshift = cells.redshift === undefined ? given : values.redshift;
    const parsed = parseRedshiftUncertainty(cells.redshiftUncertainty, { redshift, present });
    if (!parsed.ok) errors.redshiftUncertainty = parsed.message;
    else if (parsed.uncertainty !== undefined) {
      values.redshiftUncertainty = parsed.uncertainty;
      if (parsed.warning !== undefined) warnings.redshiftUncertainty = parsed.warning;
    }
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

function readRedshift(text: string): number | { message: string } {
  const parsed = parseDecimal(text);
  if (!parsed.ok) {
    return { message: parsed.code === 'empty' ? 'A redshift is needed, such as 7.12.' : parsed.message };
  }
  const checked = fields.redshift.safeParse(parsed.value);
  return checked.success ? checked.data : { message: checked.error.issues[0]?.message ?? 'Out of range.' };
}

function messageOf(error: { issues: { message: string }[] }, emptyMessage: string, text: string): string {
  if (text.trim() === '' && emptyMessage !== '') return emptyMessage;
  return error.issues[0]?.message ?? 'This text cannot be used.';
}
