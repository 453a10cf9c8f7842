export { TableRefused, type TableRefusalCode, type TableRefusalDetails } from './table-refused.js';
export { decodeText, type DecodedText, type TextEncoding } from './decode-text.js';
export { detectDelimiter, type Delimiter } from './delimiter-detection.js';
export {
  readDelimitedText,
  type DelimitedTable,
  type ReadDelimitedTextOptions,
  type RowIssue,
  type RowIssueCode,
} from './delimited-text-reader.js';
export {
  defuseFormula,
  writeDelimitedText,
  type CellValue,
  type WriteDelimitedTextOptions,
} from './delimited-text-writer.js';
export {
  columnOfRole,
  guessColumnRoles,
  headerUnit,
  type ColumnGuess,
  type ColumnRole,
  type ColumnRoleMapping,
} from './column-roles.js';
export { normaliseMinus, parseDecimal, type NumberRefusalCode, type ParsedNumber } from './decimal-number.js';
