/** Why a text as a whole could not be read as a table. */
export type TableRefusalCode =
  | 'empty'
  | 'binary'
  | 'spreadsheet-file'
  | 'encoding'
  | 'too-large'
  | 'too-many-rows'
  | 'too-many-columns'
  | 'cell-too-long'
  | 'row-too-long'
  | 'unclosed-quote'
  | 'malformed';

export interface TableRefusalDetails {
  /** Row as a spreadsheet counts it, from 1. */
  readonly row?: number;
  /** Column from 1. */
  readonly column?: number;
  /** The limit that was passed, in the unit of the code (characters, rows or columns). */
  readonly limit?: number;
}

/**
 * The text is refused as a whole: nothing of it was read. The message is fit for the person who sent it and says what would be right.
 * Faults of single rows are never thrown; they are listed in `issues` of the result.
 */
export class TableRefused extends Error {
  override readonly name = 'TableRefused';
  readonly code: TableRefusalCode;
  readonly row: number | undefined;
  readonly column: number | undefined;
  readonly limit: number | undefined;

  constructor(code: TableRefusalCode, message: string, details: TableRefusalDetails = {}, options?: ErrorOptions) {
    super(message, options);
    this.code = code;
    this.row = details.row;
    this.column = details.column;
    this.limit = details.limit;
  }
}
