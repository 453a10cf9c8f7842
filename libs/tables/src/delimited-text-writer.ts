export type CellValue = string | number | boolean | null | undefined;

export interface WriteDelimitedTextOptions {
  /** Default comma. */
  readonly delimiter?: ',' | ';' | '\t';
  /** Line ends; default CRLF as in RFC 4180. */
  readonly lineEnd?: '\r\n' | '\n';
  /** Begin with a byte order mark, by which spreadsheets recognise UTF-8. Default false. */
  readonly byteOrderMark?: boolean;
}

// What a spreadsheet program may take as the start of a formula; the last four are the full-width forms.
const formulaStart = /^\s*[=+\-@\t\r＝＋－＠]/;
const defusedStart = /^'+[=+\-@#\t\r＝＋－＠]/;

// A sign with a digit or point behind it and nothing in it that could compute or call: a number, a declination, or a remark that begins with a number.
const signedNumber = /^[+-](?:\d|\.\d)(?:[^=+\-@|!()*/^&[\]{}<>;,\\]|(?<=\d\.?[eE])[+-](?=\d))*$/;

/**
 * CSV text that spreadsheets open without computing anything from it.
 *
 * A text cell that a spreadsheet would take for a formula gets an apostrophe in front; `readDelimitedText` takes it off again. Numbers and declinations keep their
 * leading sign: "-38d11m42s", "+12:23:28", "-.5" and "-1e-17" are written as they are. `null` and `undefined` become empty cells; numbers are written with
 * all the digits that distinguish them.
 *
 * @param rows each with one value per column
 * @throws {RangeError} if a row does not have as many values as there are columns, or a number is not finite
 */
export function writeDelimitedText(
  columns: readonly string[],
  rows: readonly (readonly CellValue[])[],
  options: WriteDelimitedTextOptions = {},
): string {
  const { delimiter = ',', lineEnd = '\r\n', byteOrderMark = false } = options;
  const line = (values: readonly CellValue[]): string =>
    values.map((value, columnIndex) => writeCell(value, columnIndex, delimiter)).join(delimiter);
  const lines = [line(columns)];
  rows.forEach((row, index) => {
    if (row.length !== columns.length)
      throw new RangeError(`Row ${index + 1} has ${row.length} values for ${columns.length} columns.`);
    lines.push(line(row));
  });
  return `${byteOrderMark ? '\ufeff' : ''}${lines.join(lineEnd)}${lineEnd}`;
}

/** The text with an apostrophe in front if a spreadsheet would take it for a formula. */
export function defuseFormula(text: string): string {
  if (defusedStart.test(text)) return `'${text}`;
  if (!formulaStart.test(text) || signedNumber.test(text)) return text;
  return `'${text}`;
}

function writeCell(value: CellValue, columnIndex: number, delimiter: string): string {
  if (value === null || value === undefined) return '';
  if (typeof value === 'boolean') return value ? 'true' : 'false';
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`A table cell cannot hold ${value}; leave it empty instead.`);
    return String(value);
  }
  // A row that begins with # would be taken for a comment, by us and by other readers of tables.
  const text = columnIndex === 0 && value.startsWith('#') ? `'${value}` : defuseFormula(value);
  const needsQuotes = text.includes(delimiter) || /["\r\n]/.test(text) || text !== text.trim();
  return needsQuotes ? `"${text.replaceAll('"', '""')}"` : text;
}
