import { createHash } from 'node:crypto';
import type { Notice } from '@faintward/contracts/common';
import { MAX_SPECTRUM_POINTS, type NewSpectrum } from '@faintward/contracts/light-report';
import { SHORTEST_AIR_WAVELENGTH_NM, vacuumFromAirNm } from '@faintward/photometry';
import { type DelimitedTable, headerUnit, parseDecimal, TableRefused } from '@faintward/tables';
import { mapInSlices } from '../../engine/slices.js';
import { invalidField } from '../../platform/domain-error.js';
import { readNumberTable } from '../../platform/number-tables.js';

export type WavelengthUnit = 'nm' | 'angstrom' | 'micron';

/** A spectrum as it is stored. */
export interface ReadSpectrum {
  /** In vacuum at rest, ascending. */
  wavelengthsNm: number[];
  /** f_λ on the scale given. */
  fluxPerNm: number[];
  contentHash: string;
  notices: Notice[];
}

export const MIN_SPECTRUM_POINTS = 10;

const NM_PER: Readonly<Record<WavelengthUnit, number>> = { nm: 1, angstrom: 0.1, micron: 1000 };
const UNIT_NAMES: Readonly<Record<WavelengthUnit, string>> = { nm: 'nm', angstrom: 'Å', micron: 'µm' };

interface Point {
  row: number;
  nm: number;
  flux: number;
}

/**
 * Reads two columns of text, wavelength and flux density, as a spectrum at rest in vacuum. Sorts by wavelength. A negative flux is
 * noise around nothing: it is set to 0, and counted in a notice.
 *
 * @throws {DomainError} `validation-failed` at `text`, naming the row that cannot be used
 */
export async function readSpectrumText({
  text,
  wavelengthUnit,
  fluxKind,
  isAirWavelength,
  observedAtRedshift,
}: Pick<
  NewSpectrum,
  'text' | 'wavelengthUnit' | 'fluxKind' | 'isAirWavelength' | 'observedAtRedshift'
>): Promise<ReadSpectrum> {
  const table = await readTable(text);
  const notices: Notice[] = [];
  const given = await pointsOf(table, notices);
  const unit = wavelengthUnit ?? guessUnit(headerOf(text, table), given, notices);
  const points = given
    .map(({ row, nm, flux }) => ({ row, nm: vacuumNm(nm * NM_PER[unit], isAirWavelength, row), flux }))
    .sort((a, b) => a.nm - b.nm);
  refuseDoubles(points);
  clipNegatives(points, notices);
  const scale = 1 + observedAtRedshift;
  const wavelengthsNm = points.map(({ nm }) => nm / scale);
  refuseOutside(wavelengthsNm, unit);
  // f_λ ∝ f_ν / λ². The scale does not matter, so that neither do the factors of c and of 1 + z.
  const fluxPerNm = points.map(({ nm, flux }) => (fluxKind === 'perFrequency' ? flux / (nm / 1000) ** 2 : flux));
  if (!fluxPerNm.some((flux) => flux > 0)) throw refusal('No flux of this spectrum is above 0.');
  return { wavelengthsNm, fluxPerNm, contentHash: hashOf(wavelengthsNm, fluxPerNm), notices };
}

async function readTable(text: string): Promise<DelimitedTable> {
  let table: DelimitedTable;
  try {
    table = await readNumberTable(text, MAX_SPECTRUM_POINTS);
  } catch (error) {
    if (error instanceof TableRefused) throw refusal(error.message);
    throw error;
  }
  if (table.columns.length < 2) {
    throw refusal('A spectrum has two columns, wavelength and flux density; this text has one.');
  }
  if (table.rows.length < MIN_SPECTRUM_POINTS) {
    throw refusal(`A spectrum needs at least ${MIN_SPECTRUM_POINTS} points; this one has ${table.rows.length}.`);
  }
  return table;
}

function pointsOf(table: DelimitedTable, notices: Notice[]): Promise<Point[]> {
  if (table.columns.length > 2) {
    notices.push(note('moreColumns', 'Only the first two columns are read: wavelength and flux density.'));
  }
  return mapInSlices(table.rows, ([wavelength = '', flux = ''], index): Point => {
    const row = table.rowNumbers[index] ?? index + 1;
    const point = {
      row,
      nm: numberOf(wavelength, row, 'The wavelength'),
      flux: numberOf(flux, row, 'The flux density'),
    };
    if (point.nm <= 0) throw refusal(`Row ${row}: a wavelength is above 0, not ${wavelength}.`);
    return point;
  });
}

function numberOf(cell: string, row: number, what: string): number {
  const parsed = parseDecimal(cell);
  if (parsed.ok) return parsed.value;
  throw refusal(`Row ${row}: ${what} cannot be read. ${parsed.message}`);
}

/** From the header where it says a unit, else from the size of the numbers: nobody has spectra from 0.1 to 100 nm or Å here. */
function guessUnit(header: string, points: readonly Point[], notices: Notice[]): WavelengthUnit {
  const stated = statedUnit(header);
  if (stated !== undefined) {
    notices.push(note('wavelengthUnit', `Wavelengths are taken in ${UNIT_NAMES[stated]}, as the header says.`));
    return stated;
  }
  const middle = [...points].sort((a, b) => a.nm - b.nm)[Math.floor(points.length / 2)]?.nm ?? 0;
  const unit = middle < 100 ? 'micron' : middle < 2000 ? 'nm' : 'angstrom';
  notices.push(
    note(
      'wavelengthUnit',
      `Wavelengths are taken in ${UNIT_NAMES[unit]}, judging by their size (the middle one is ${middle}). Choose the unit if it is another.`,
      'warning',
    ),
  );
  return unit;
}

/** What stands over the first column: the header, or the last of the comments before the numbers. */
function headerOf(text: string, { hasHeader, columns, delimiter }: DelimitedTable): string {
  if (hasHeader) return columns[0] ?? '';
  const comments =
    /^(?:\s*#.*(?:\r\n|\n|\r))+/
      .exec(text)?.[0]
      .trim()
      .split(/\r\n|\n|\r/) ?? [];
  const last = (comments.at(-1) ?? '').replace(/^\s*#+\s*/, '');
  if (delimiter !== 'spaces') return last.split(delimiter)[0]?.trim() ?? '';
  return /^\S+(?:\s*[([][^)\]]*[)\]])?/.exec(last)?.[0] ?? '';
}

function statedUnit(header: string): WavelengthUnit | undefined {
  const unit =
    headerUnit(header) ??
    header
      .trim()
      .toLowerCase()
      .split(/[\s_]+/)
      .at(-1) ??
    '';
  if (/^(?:nm|nanomet(?:er|re)s?)$/.test(unit)) return 'nm';
  if (/^(?:a|å|aa|ang|angstroms?|ångströms?)$/.test(unit)) return 'angstrom';
  if (/^(?:um|µm|μm|microns?|micromet(?:er|re)s?)$/.test(unit)) return 'micron';
  return undefined;
}

function vacuumNm(nm: number, isAir: boolean, row: number): number {
  if (!isAir) return nm;
  if (nm < SHORTEST_AIR_WAVELENGTH_NM) {
    throw refusal(
      `Row ${row}: air is not transparent below ${SHORTEST_AIR_WAVELENGTH_NM} nm, so that ${nm} nm cannot be a wavelength in air.`,
    );
  }
  return vacuumFromAirNm(nm);
}

function refuseDoubles(points: readonly Point[]): void {
  points.forEach((point, index) => {
    const before = points[index - 1];
    if (before === undefined || before.nm < point.nm) return;
    const [first, second] = [before.row, point.row].sort((a, b) => a - b);
    throw refusal(`Rows ${first} and ${second} have the same wavelength. Keep one of them.`);
  });
}

function clipNegatives(points: Point[], notices: Notice[]): void {
  const negative = points.filter(({ flux }) => flux < 0);
  if (negative.length === 0) return;
  for (const point of negative) point.flux = 0;
  notices.push(
    note(
      'negativeFlux',
      `${negative.length} of ${points.length} flux densities were below 0 and are taken as 0, as noise around no light.`,
      'warning',
    ),
  );
}

/** The contract's own range of rest wavelengths. */
function refuseOutside(wavelengthsNm: readonly number[], unit: WavelengthUnit): void {
  const low = wavelengthsNm[0] ?? 0;
  const high = wavelengthsNm.at(-1) ?? 0;
  if (low >= 1 && high <= 1e6) return;
  throw refusal(
    `In ${UNIT_NAMES[unit]} this spectrum runs from ${low.toPrecision(3)} nm to ${high.toPrecision(3)} nm at rest; 1 nm to 1 mm are used. Is the unit another one?`,
  );
}

function hashOf(wavelengthsNm: readonly number[], fluxPerNm: readonly number[]): string {
  return createHash('sha256')
    .update(JSON.stringify([wavelengthsNm, fluxPerNm]))
    .digest('hex');
}

function note(code: string, message: string, severity: Notice['severity'] = 'note'): Notice {
  return { code, message, severity, field: 'text' };
}

function refusal(message: string) {
  return invalidField('text', message);
}
