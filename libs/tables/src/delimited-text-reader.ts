import { CsvError, parse } from 'csv-parse/sync';
import { isKnownHeader, isNumberLike } from './column-roles.js';
import { detectDelimiter, splitAtSpaces, type Delimiter } from './delimiter-detection.js';
import { TableRefused } from './table-refused.js';

export interface ReadDelimitedTextOptions {
  /** How cells are set apart; by default found from the text. */
  readonly delimiter?: Delimiter;
  /** Whether the first row names the columns; by default judged from the text. */
  readonly header?: 'auto' | 'present' | 'absent';
  /** Default 20,000,000 characters. */
  readonly maxCharacters?: number;
  /** Rows of data, without the header. Default 20,000. */
  readonly maxRows?: number;
  /** Default 200. */
  readonly maxColumns?: number;
  /** Characters in one cell. Default 10,000. */
  readonly maxCellLength?: number;
}

export type RowIssueCode = 'short-row' | 'long-row' | 'comment-row' | 'duplicate-column' | 'unnamed-column';

/** Something about a row or a column that a person should know. Nothing is left out of the table without one. */
export interface RowIssue {
  /** Row as a spreadsheet counts it, from 1: header, blank and comment rows count. */
  readonly row: number;
  /** From 1; absent if the whole row is meant. */
  readonly column?: number;
  readonly code: RowIssueCode;
  readonly message: string;
}

export interface DelimitedTable {
  /** Header texts, or "Column 1"... if the text has no header. Unique and never empty. */
  readonly columns: readonly string[];
  /** Cells without outer blanks; every row has exactly one cell per column. Blank rows are left out. */
  readonly rows: readonly (readonly string[])[];
  /** Same length as `rows`: the row number of each as a spreadsheet counts it, from 1. */
  readonly rowNumbers: readonly number[];
  readonly issues: readonly RowIssue[];
  readonly delimiter: Delimiter;
  readonly hasHeader: boolean;
}

interface SourceRecord {
  readonly row: number;
  /** Without empty cells at the end. */
  readonly cells: string[];
  /** With them: what the row was written with. */
  readonly writtenCellCount: number;
}

/**
 * A table from text: CSV, tab- or semicolon-separated, or columns set apart by blanks, saved by a program or pasted from a spreadsheet.
 *
 * Accepts a byte order mark, any line ends, quoted cells (with line breaks and doubled quotes), and quotes inside unquoted cells (seconds of arc). Lines at
 * the top that begin with `#` are comments; the last of them is taken as the header if it divides like the rows. Rows that are too short or too long are kept,
 * filled or cut, and reported in `issues`. Cells that `writeDelimitedText` defused come back as they were.
 *
 * @throws {TableRefused} if the text is empty, binary, has a quote that is never closed, or exceeds a limit of the options
 */
export function readDelimitedText(text: string, options: ReadDelimitedTextOptions = {}): DelimitedTable {
  const limits = {
    characters: options.maxCharacters ?? 20_000_000,
    rows: options.maxRows ?? 20_000,
    columns: options.maxColumns ?? 200,
    cellLength: options.maxCellLength ?? 10_000,
  };
  if (text.length > limits.characters) {
    throw new TableRefused(
      'too-large',
      `The text has ${text.length} characters; at most ${limits.characters} are read.`,
      { limit: limits.characters },
    );
  }
  refuseBinary(text);
  const { comments, body } = splitLeadingComments(text.replace(/^\ufeff/, ''));
  if (body.trim() === '')
    throw new TableRefused('empty', 'There is no table in this text: it is empty or holds only comments.');

  const delimiter = options.delimiter ?? detectDelimiter(body);
  const issues: RowIssue[] = [];
  const records = readRecords(body, delimiter, comments.length, limits, issues);
  if (records.length === 0)
    throw new TableRefused('empty', 'There is no table in this text: all of its cells are empty.');
  const commentHeader = headerFromComment(comments, delimiter, records);
  const hasHeader = commentHeader !== undefined || firstRecordIsHeader(records, options.header ?? 'auto');
  const header = commentHeader ?? (hasHeader ? records.shift() : undefined);
  if (records.length > limits.rows) {
    throw new TableRefused(
      'too-many-rows',
      `The table has ${records.length} rows or more; at most ${limits.rows} are read at once.`,
      { limit: limits.rows },
    );
  }

  const columnCount = header ? columnCountOf(header, records) : widest(records);
  const columns = nameColumns(header, columnCount, issues);
  const rows = records.map((record) => fitToColumns(record, columnCount, issues));
  issues.sort((a, b) => a.row - b.row || (a.column ?? 0) - (b.column ?? 0));
  return { columns, rows, rowNumbers: records.map((record) => record.row), issues, delimiter, hasHeader };
}

interface Limits {
  readonly rows: number;
  readonly columns: number;
  readonly cellLength: number;
}

const lineFeed = 0x0a;
const carriageReturn = 0x0d;

function refuseBinary(text: string): void {
  const nul = text.indexOf('\0');
  if (nul !== -1) {
    throw new TableRefused(
      'binary',
      'The text contains NUL characters, so it is not plain text. If it comes from a spreadsheet, save it as CSV or copy the cells.',
    );
  }
  // eslint-disable-next-line no-control-regex -- control characters are what is being looked for
  const controls = text.slice(0, 4096).match(/[\u0001-\u0008\u000e-\u001f]/g)?.length ?? 0;
  if (controls > 0.01 * Math.min(text.length, 4096)) {
    throw new TableRefused('binary', 'The text is full of control characters, so it is not a table of plain text.');
  }
}

function splitLeadingComments(text: string): { comments: string[]; body: string } {
  const comments: string[] = [];
  let body = text;
  while (body.startsWith('#')) {
    const end = body.search(/[\r\n]/);
    comments.push(end === -1 ? body : body.slice(0, end));
    if (end === -1) return { comments, body: '' };
    body = body.slice(body.startsWith('\r\n', end) ? end + 2 : end + 1);
  }
  return { comments, body };
}

function readRecords(
  body: string,
  delimiter: Delimiter,
  precedingRows: number,
  limits: Limits,
  issues: RowIssue[],
): SourceRecord[] {
  refuseLongLines(body, limits, precedingRows);
  const records: SourceRecord[] = [];
  let row = precedingRows;
  const take = (rawCells: readonly string[]): void => {
    row += 1;
    const cells = rawCells.map((cell) => cell.trim());
    while (cells.at(-1) === '') cells.pop();
    if (cells.length === 0) return;
    if (cells.length > limits.columns) {
      throw new TableRefused(
        'too-many-columns',
        `Row ${row} has ${cells.length} cells; at most ${limits.columns} columns are read.`,
        { row, limit: limits.columns },
      );
    }
    const tooLong = cells.findIndex((cell) => cell.length > limits.cellLength);
    if (tooLong !== -1) {
      throw new TableRefused(
        'cell-too-long',
        `Row ${row}, column ${tooLong + 1} holds ${cells[tooLong]?.length} characters; at most ${limits.cellLength} are read.`,
        {
          row,
          column: tooLong + 1,
          limit: limits.cellLength,
        },
      );
    }
    if (cells[0]?.startsWith('#')) {
      issues.push({ row, code: 'comment-row', message: `Row ${row} begins with # and is taken as a comment.` });
      return;
    }
    records.push({ row, cells: cells.map(restoreDefused), writtenCellCount: rawCells.length });
    // One more than allowed, since the first may turn out to be the header.
    if (records.length > limits.rows + 1) {
      throw new TableRefused(
        'too-many-rows',
        `The table has more than ${limits.rows} rows, the most that is read at once.`,
        { row, limit: limits.rows },
      );
    }
  };

  if (delimiter === 'spaces') {
    for (const line of body.split(/\r\n|\n|\r/)) take(splitAtSpaces(line));
    return records;
  }
  try {
    parse(body, {
      delimiter,
      record_delimiter: ['\r\n', '\n', '\r'],
      relax_column_count: true,
      relax_quotes: true,
      max_record_size: maxRowCharacters(limits),
      on_record: (record: string[]) => {
        take(record);
        return null;
      },
    });
  } catch (error) {
    throw error instanceof CsvError ? refusalFrom(error, row, limits) : error;
  }
  return records;
}

function maxRowCharacters(limits: Limits): number {
  return Math.max(1000, Math.min(limits.columns * limits.cellLength, 1_000_000));
}

/** A line far beyond the limits is refused before any cell of it is built. */
function refuseLongLines(body: string, limits: Limits, precedingRows: number): void {
  const longest = maxRowCharacters(limits);
  let start = 0;
  let line = precedingRows + 1;
  for (let index = 0; index < body.length; index += 1) {
    const character = body.charCodeAt(index);
    if (character === lineFeed || character === carriageReturn) {
      if (character === lineFeed && body.charCodeAt(index - 1) !== carriageReturn) line += 1;
      if (character === carriageReturn) line += 1;
      start = index + 1;
    } else if (index - start >= longest) {
      throw new TableRefused(
        'row-too-long',
        `Line ${line} has more than ${longest} characters, the most that is read in a row.`,
        {
          row: line,
          limit: longest,
        },
      );
    }
  }
}

function refusalFrom(error: CsvError, rowsRead: number, limits: Limits): TableRefused {
  const row = rowsRead + 1;
  if (error.code === 'CSV_QUOTE_NOT_CLOSED') {
    return new TableRefused(
      'unclosed-quote',
      `A cell of row ${row} opens with a quote (") that is never closed. Close it, or remove the quote.`,
      { row },
      { cause: error },
    );
  }
  if (error.code === 'CSV_MAX_RECORD_SIZE') {
    const limit = maxRowCharacters(limits);
    return new TableRefused(
      'row-too-long',
      `Row ${row} has more than ${limit} characters. Is a quote (") left open?`,
      { row, limit },
      { cause: error },
    );
  }
  return new TableRefused(
    'malformed',
    `Row ${row} cannot be divided into cells: check its quotes.`,
    { row },
    { cause: error },
  );
}

/** Without the apostrophe that `writeDelimitedText` put before a cell that would have been computed or taken for a comment. */
function restoreDefused(cell: string): string {
  return /^'+[=+\-@#\t\r＝＋－＠]/.test(cell) ? cell.slice(1) : cell;
}

function headerFromComment(
  comments: readonly string[],
  delimiter: Delimiter,
  records: readonly SourceRecord[],
): SourceRecord | undefined {
  const last = comments.at(-1);
  const first = records[0];
  if (last === undefined || first === undefined) return undefined;
  const content = last.replace(/^#+\s*/, '');
  const cells = (delimiter === 'spaces' ? splitAtSpaces(content) : content.split(delimiter)).map((cell) => cell.trim());
  const fits =
    cells.length > 1 &&
    cells.length === first.cells.length &&
    cells.some(isKnownHeader) &&
    !first.cells.some(isKnownHeader);
  return fits ? { row: comments.length, cells, writtenCellCount: cells.length } : undefined;
}

function firstRecordIsHeader(records: readonly SourceRecord[], header: 'auto' | 'present' | 'absent'): boolean {
  if (header !== 'auto') return header === 'present';
  const first = records[0];
  if (first === undefined || first.cells.some(isNumberLike)) return false;
  if (first.cells.some(isKnownHeader)) return true;
  const sample = records.slice(1, 51);
  return first.cells.some(
    (_, column) => sample.length > 0 && sample.every((record) => isNumberLike(record.cells[column] ?? '')),
  );
}

/** Columns that the header leaves unnamed still count if some row has a cell there for most rows: a forgotten header cell. */
function columnCountOf(header: SourceRecord, records: readonly SourceRecord[]): number {
  const named = header.cells.length;
  const wider = records.filter((record) => record.cells.length > named);
  if (records.length === 0 || wider.length < 0.8 * records.length) return named;
  return widest(wider);
}

function widest(records: readonly SourceRecord[]): number {
  return records.reduce((most, record) => Math.max(most, record.cells.length), 0);
}

function nameColumns(header: SourceRecord | undefined, columnCount: number, issues: RowIssue[]): string[] {
  const names: string[] = [];
  const taken = new Set(header?.cells ?? []);
  const unique = (wanted: string): string => {
    let name = wanted;
    for (let copy = 2; taken.has(name) || names.includes(name); copy += 1) name = `${wanted} (${copy})`;
    return name;
  };
  for (let index = 0; index < columnCount; index += 1) {
    const given = header?.cells[index] ?? '';
    if (given === '') {
      const name = unique(`Column ${index + 1}`);
      if (header)
        issues.push({
          row: header.row,
          column: index + 1,
          code: 'unnamed-column',
          message: `Column ${index + 1} has no name in the header; it is called "${name}".`,
        });
      names.push(name);
    } else if (names.includes(given)) {
      const name = unique(given);
      issues.push({
        row: header?.row ?? 1,
        column: index + 1,
        code: 'duplicate-column',
        message: `Two columns are named "${given}"; the one in column ${index + 1} is called "${name}" here.`,
      });
      names.push(name);
    } else {
      names.push(given);
    }
  }
  return names;
}

function fitToColumns(
  { row, cells, writtenCellCount }: SourceRecord,
  columnCount: number,
  issues: RowIssue[],
): string[] {
  if (cells.length > columnCount) {
    const lost = cells.slice(columnCount);
    issues.push({
      row,
      column: columnCount + 1,
      code: 'long-row',
      message: `Row ${row} has ${cells.length} cells but the table has ${columnCount} columns; not read: ${lost
        .map((cell) => `"${cell.slice(0, 40)}"`)
        .slice(0, 5)
        .join(', ')}.`,
    });
    return cells.slice(0, columnCount);
  }
  if (writtenCellCount < columnCount) {
    issues.push({
      row,
      code: 'short-row',
      message: `Row ${row} has ${writtenCellCount} cells but the table has ${columnCount} columns; the last ones are taken as empty.`,
    });
  }
  return cells.concat(Array.from({ length: columnCount - cells.length }, () => ''));
}
