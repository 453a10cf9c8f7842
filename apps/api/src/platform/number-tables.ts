import { type DelimitedTable, readDelimitedText, TableRefused } from '@faintward/tables';
import { mapInSlices } from '../engine/slices.js';

/** Lines that are read at once: some tens of milliseconds. */
const SLICE_LINES = 1500;
/** Comments and blank lines that a table may have beside its rows. */
const OTHER_LINES = 1000;

/**
 * A table of numbers, whose lines are its rows, read in slices with turns for others in between.
 *
 * @throws {TableRefused}
 */
export async function readNumberTable(text: string, maxRows: number): Promise<DelimitedTable> {
  refuseMoreLinesThan(maxRows + OTHER_LINES, text);
  const lines = text.split(/\r\n|\n|\r/);
  const begin = readDelimitedText(lines.slice(0, SLICE_LINES).join('\n'), { maxRows });
  if (lines.length <= SLICE_LINES) return begin;
  const { delimiter } = begin;
  const starts: number[] = [];
  for (let start = SLICE_LINES; start < lines.length; start += SLICE_LINES) starts.push(start);
  const slices = await mapInSlices(starts, (start) => {
    const slice = lines.slice(start, start + SLICE_LINES);
    if (slice.every((line) => /^\s*(?:#.*)?$/.test(line))) return { rows: [], rowNumbers: [] };
    try {
      return readDelimitedText(slice.join('\n'), { delimiter, header: 'absent', maxRows });
    } catch (error) {
      if (!(error instanceof TableRefused)) throw error;
      // Once more with its place in the text, which the reason names.
      return readDelimitedText('\n'.repeat(start) + slice.join('\n'), { delimiter, header: 'absent', maxRows });
    }
  });
  const rows = [...begin.rows, ...slices.flatMap((slice) => slice.rows)];
  if (rows.length > maxRows) {
    throw new TableRefused('too-many-rows', `The table has ${rows.length} rows; at most ${maxRows} are read at once.`, {
      limit: maxRows,
    });
  }
  return {
    ...begin,
    rows,
    rowNumbers: [
      ...begin.rowNumbers,
      ...slices.flatMap(({ rowNumbers }, index) => rowNumbers.map((row) => row + (starts[index] ?? 0))),
    ],
  };
}

/**
 * Refuses a text of so many lines before anything is made of them: millions of empty ones take many seconds to read.
 *
 * @throws {TableRefused}
 */
export function refuseMoreLinesThan(most: number, text: string): void {
  let count = 1;
  for (let index = 0; index < text.length; index += 1) {
    const code = text.charCodeAt(index);
    // Windows ends a line with both.
    if (code !== LINE_FEED && (code !== CARRIAGE_RETURN || text.charCodeAt(index + 1) === LINE_FEED)) continue;
    count += 1;
    if (count > most + 1) {
      throw new TableRefused('too-many-rows', `The text has more than ${most} lines, comments included.`, {
        limit: most,
      });
    }
  }
}

const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;
