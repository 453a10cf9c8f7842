import { type BrightnessDefaults } from './brightness-text.js';
import {
  type ImportPreview,
  type ImportRequest,
  type ImportRole,
  MAX_IMPORT_CHARACTERS,
  MAX_TARGET_COUNT,
  type TargetCells,
  type TargetInput,
} from '@faintward/contracts/targets';
import type { RedshiftKind } from '@faintward/contracts/light';
import { designationFromPosition } from '@faintward/astronomy';
import {
  type ColumnRole,
  type DelimitedTable,
  guessColumnRoles,
  readDelimitedText,
  TableRefused,
} from '@faintward/tables';
import { lightFaults } from '../../engine/light-faults.js';
import { DomainError } from '../../platform/domain-error.js';
import { refuseMoreLinesThan } from '../../platform/number-tables.js';
import { uncertaintyFaults } from '../../engine/redshift-faults.js';
import { mapInSlices } from '../../engine/slices.js';
import { foreignUnitError, headerBrightness, headerRedshiftKind, withColumnUnit } from './column-units.js';
import { readCells } from './target-cells.js';

type TargetRole = Exclude<ImportRole, 'ignore'>;
type PreviewRow = ImportPreview['rows'][number];

export interface TableRow {
  lineNumber: number;
  cells: PreviewRow['cells'];
  rowErrors: string[];
  /** Undefined when the row has errors. */
  target: TargetInput | undefined;
}

/** A table read as targets, without regard to what is stored. */
export interface TargetTable {
  columns: { header: string; role: ImportRole }[];
  delimiter: string;
  hasHeader: boolean;
  rows: TableRow[];
  tableErrors: string[];
}

const SAMPLE_ROW_COUNT = 100;
/** Rows, comments and blank lines, and the line breaks within notes. */
const MAX_IMPORT_LINES = 4 * MAX_TARGET_COUNT;

const ROLE_NAMES: Readonly<Record<TargetRole, string>> = {
  name: 'the name',
  rightAscension: 'the right ascension',
  declination: 'the declination',
  redshift: 'the redshift',
  redshiftUncertainty: 'the uncertainty of the redshift',
  brightness: 'the brightness',
  notes: 'notes',
};

const REQUIRED_ROLES: readonly TargetRole[] = ['rightAscension', 'declination', 'redshift'];

/** How the cells of a table are to be read. */
interface Reading {
  columnOf: ReadonlyMap<TargetRole, number>;
  headers: readonly string[];
  brightness: BrightnessDefaults;
  /** Said at each brightness when the header and the person differ. */
  brightnessWarning: string | undefined;
  redshiftKind: RedshiftKind;
}

/**
 * Reads a pasted or uploaded table as targets, cell by cell, letting others have their turn meanwhile. Bounded in time for any
 * text: the table reader refuses what is not a table before it builds cells. Units that a header states are kept to.
 *
 * @throws {DomainError} `unreadable-table` with what would be right
 */
export async function readTargetTable({ text, options }: ImportRequest): Promise<TargetTable> {
  const table = readTable(text, options.hasHeader);
  const roles = rolesOf(table, options.roles);
  // Without a header line the columns are named by their numbers.
  const headers = table.hasHeader ? table.columns : table.columns.map(() => '');
  const tableErrors = [...roleErrors(roles), ...unitErrors(headers, roles)];
  const columnOf = new Map<TargetRole, number>();
  roles.forEach((role, column) => {
    if (role !== 'ignore' && !columnOf.has(role)) columnOf.set(role, column);
  });
  const brightnessColumn = columnOf.get('brightness');
  const said = brightnessColumn === undefined ? {} : headerBrightness(headers[brightnessColumn] ?? '');
  const brightness: BrightnessDefaults = {
    present: null,
    bandId: said.bandId ?? options.brightnessBandId,
    system: said.system ?? options.brightnessSystem,
  };
  const differs = brightness.bandId !== options.brightnessBandId || brightness.system !== options.brightnessSystem;
  const reading: Reading = {
    columnOf,
    headers,
    brightness,
    brightnessWarning: differs
      ? `Taken as ${brightness.bandId}, ${brightness.system}, as the header of the column says.`
      : undefined,
    redshiftKind: headerRedshiftKind(headers[columnOf.get('redshift') ?? -1] ?? ''),
  };
  const cutRows = new Map(
    table.issues.filter(({ code }) => code === 'long-row').map(({ row, message }) => [row, message]),
  );
  return {
    columns: table.columns.map((header, column) => ({ header, role: roles[column] ?? 'ignore' })),
    delimiter: table.delimiter,
    hasHeader: table.hasHeader,
    rows: await mapInSlices(table.rows, (cells, index) => {
      const lineNumber = table.rowNumbers[index] ?? 0;
      return readRow(cells, lineNumber, reading, cutRows.get(lineNumber));
    }),
    tableErrors,
  };
}

function readTable(text: string, hasHeader: boolean | undefined): DelimitedTable {
  try {
    refuseMoreLinesThan(MAX_IMPORT_LINES, text);
    return readDelimitedText(text, {
      header: hasHeader === undefined ? 'auto' : hasHeader ? 'present' : 'absent',
      maxCharacters: MAX_IMPORT_CHARACTERS,
      maxRows: MAX_TARGET_COUNT,
    });
  } catch (error) {
    if (error instanceof TableRefused) throw new DomainError('unreadable-table', error.message);
    throw error;
  }
}

const ROLE_OF_GUESS: Readonly<Partial<Record<ColumnRole, TargetRole>>> = {
  name: 'name',
  rightAscension: 'rightAscension',
  declination: 'declination',
  redshift: 'redshift',
  redshiftUncertainty: 'redshiftUncertainty',
  magnitude: 'brightness',
  notes: 'notes',
};

function rolesOf(table: DelimitedTable, given: readonly ImportRole[] | undefined): ImportRole[] {
  if (given !== undefined) return table.columns.map((_, column) => given[column] ?? 'ignore');
  const roles: ImportRole[] = table.columns.map(() => 'ignore');
  for (const { columnIndex, role } of guessColumnRoles(table.columns, table.rows.slice(0, SAMPLE_ROW_COUNT)).guesses) {
    roles[columnIndex] = ROLE_OF_GUESS[role] ?? 'ignore';
  }
  // A column "z" of strange numbers is still more likely the redshift, with errors to be shown, than a list has none.
  const z = table.columns.findIndex((header, column) => roles[column] === 'ignore' && /^z$/i.test(header.trim()));
  if (z !== -1 && !roles.includes('redshift')) roles[z] = 'redshift';
  // Our own word for what others call by its band or unit; it counts before a guessed magnitude.
  const own = table.columns.findIndex((header) => /^(?:brightness|light)$/i.test(header.trim()));
  if (own !== -1) {
    const guessed = roles.indexOf('brightness');
    if (guessed !== -1) roles[guessed] = 'ignore';
    roles[own] = 'brightness';
  }
  return roles;
}

function roleErrors(roles: readonly ImportRole[]): string[] {
  const count = (role: ImportRole) => roles.filter((each) => each === role).length;
  return [
    ...REQUIRED_ROLES.filter((role) => count(role) === 0).map(
      (role) => `No column holds ${ROLE_NAMES[role]}. Choose the column that does.`,
    ),
    ...(Object.keys(ROLE_NAMES) as TargetRole[])
      .filter((role) => count(role) > 1)
      .map((role) => `${count(role)} columns are set to hold ${ROLE_NAMES[role]}. Keep one of them.`),
  ];
}

function unitErrors(headers: readonly string[], roles: readonly ImportRole[]): string[] {
  return headers.flatMap((header, column) => foreignUnitError(header, roles[column] ?? 'ignore') ?? []);
}

function readRow(
  texts: readonly string[],
  lineNumber: number,
  { columnOf, headers, brightness, brightnessWarning, redshiftKind }: Reading,
  cutMessage: string | undefined,
): TableRow {
  const cells: PreviewRow['cells'] = texts.map((text) => ({ text: shortened(text) }));
  const rowErrors = cutMessage === undefined ? [] : [cutMessage];
  const given: TargetCells = {};
  for (const [role, column] of columnOf) given[role] = texts[column] ?? '';
  const rightAscension = withColumnUnit(
    given.rightAscension ?? '',
    headers[columnOf.get('rightAscension') ?? -1] ?? '',
  );
  if (given.rightAscension !== undefined) given.rightAscension = rightAscension.text;
  const isDistribution = /^\s*p\(z\)/i.test(given.redshiftUncertainty ?? '');
  if (isDistribution) given.redshiftUncertainty = '';
  const { values, errors, warnings } = readCells(given, { brightness });
  if (isDistribution) {
    warnings.redshiftUncertainty = 'A distribution does not fit into a cell: the target is imported without it.';
  }
  if (rightAscension.warning !== undefined) warnings.rightAscension ??= rightAscension.warning;
  if (brightnessWarning !== undefined && isBareNumber(given.brightness)) warnings.brightness ??= brightnessWarning;
  for (const [role, message] of Object.entries(errors) as [TargetRole, string][]) mark(role, 'error', message);
  for (const [role, message] of Object.entries(warnings) as [TargetRole, string][]) mark(role, 'warning', message);

  const { rightAscensionDeg, declinationDeg, redshift } = values;
  if (
    Object.keys(errors).length > 0 ||
    rightAscensionDeg === undefined ||
    declinationDeg === undefined ||
    redshift === undefined
  ) {
    return { lineNumber, cells, rowErrors, target: undefined };
  }
  const target: TargetInput = {
    // A list without names gets the usual designations by position.
    name: values.name ?? designationFromPosition({ raDeg: rightAscensionDeg, decDeg: declinationDeg }),
    rightAscensionDeg,
    declinationDeg,
    redshift,
    redshiftUncertainty: values.redshiftUncertainty ?? null,
    redshiftKind,
    light: values.light ?? null,
    extent: { kind: 'point' },
    notes: values.notes ?? '',
  };
  for (const { path, message } of [...lightFaults(target), ...uncertaintyFaults(target)]) {
    const role = path === 'redshift' ? path : path.startsWith('light') ? 'brightness' : 'redshiftUncertainty';
    mark(role, 'error', message);
    return { lineNumber, cells, rowErrors, target: undefined };
  }
  return { lineNumber, cells, rowErrors, target: rowErrors.length === 0 ? target : undefined };

  function mark(role: TargetRole, kind: 'error' | 'warning', message: string): void {
    const column = columnOf.get(role);
    const cell = column === undefined ? undefined : cells[column];
    if (cell === undefined) rowErrors.push(message);
    else cell[kind] = message;
  }
}

/** Only a bare number leaves its band and system to the column. */
function isBareNumber(text: string | undefined): boolean {
  return text !== undefined && /^\s*[+-]?[\d.]+\s*$/.test(text);
}

function shortened(text: string): string {
  return text.length > 200 ? `${text.slice(0, 199)}…` : text;
}
