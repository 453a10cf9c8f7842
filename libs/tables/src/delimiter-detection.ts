/** How cells are set apart. `spaces` is any run of blanks, as in text copied from a paper or a terminal. */
export type Delimiter = ',' | ';' | '\t' | '|' | 'spaces';

// A tab never occurs inside a cell by accident, a semicolon seldom, a comma often: the safer sign wins when several divide the lines evenly.
const candidates: readonly Exclude<Delimiter, 'spaces'>[] = ['\t', ';', '|', ','];

const sampleLineCount = 200;
const sampleCharacterCount = 100_000;
const evenEnough = 0.8;

/**
 * The delimiter of a text, judged by how evenly each candidate divides its first lines. Delimiters inside quotes do not count. A text in which nothing
 * divides the lines is one column: then the answer is a comma, which changes nothing. Blanks are chosen only where every word pattern speaks for
 * columns, since names such as "NGC 1234" hold blanks too.
 */
export function detectDelimiter(text: string): Delimiter {
  const lines = firstLines(text, sampleLineCount);
  if (lines.length === 0) return ',';

  let best: { delimiter: Delimiter; evenness: number } | undefined;
  for (const delimiter of candidates) {
    const evenness = evennessOf(lines.map((line) => countOutsideQuotes(line, delimiter)));
    if (evenness >= evenEnough) return delimiter;
    if (evenness > (best?.evenness ?? 0.3)) best = { delimiter, evenness };
  }
  if (looksLikeColumnsOfWords(lines)) return 'spaces';
  return best?.delimiter ?? ',';
}

/** Cells of a line whose cells are set apart by blanks; a quoted cell may hold blanks, and a doubled quote in it is a quote. */
export function splitAtSpaces(line: string): string[] {
  const cells: string[] = [];
  for (const match of line.matchAll(/"((?:[^"]|"")*)"(?=\s|$)|\S+/g)) {
    cells.push(match[1] === undefined ? match[0] : match[1].replaceAll('""', '"'));
  }
  return cells;
}

function firstLines(text: string, count: number): string[] {
  const beginning = text.slice(0, sampleCharacterCount);
  const lines = beginning.split(/\r\n|\n|\r/);
  // The last line may have been cut in the middle.
  if (beginning.length < text.length && lines.length > 1) lines.pop();
  return lines.filter((line) => line.trim() !== '').slice(0, count);
}

function countOutsideQuotes(line: string, delimiter: string): number {
  let count = 0;
  let quoted = false;
  let cellStart = true;
  for (const character of line) {
    // A quote opens a cell only at its start: elsewhere it may be the sign for seconds of arc.
    if (character === '"' && (quoted || cellStart)) quoted = !quoted;
    cellStart = false;
    if (!quoted && character === delimiter) {
      count += 1;
      cellStart = true;
    }
  }
  return count;
}

/** Share of the lines that hold the commonest number of delimiters; 0 if that number is none. */
function evennessOf(counts: readonly number[]): number {
  const frequency = new Map<number, number>();
  for (const count of counts) frequency.set(count, (frequency.get(count) ?? 0) + 1);
  let commonest = 0;
  let lines = 0;
  for (const [count, occurrences] of frequency) {
    if (occurrences > lines || (occurrences === lines && count > commonest)) {
      commonest = count;
      lines = occurrences;
    }
  }
  return commonest === 0 ? 0 : lines / counts.length;
}

function looksLikeColumnsOfWords(lines: readonly string[]): boolean {
  const rows = lines.map(splitAtSpaces);
  if (evennessOf(rows.map((cells) => cells.length - 1)) < evenEnough) return false;
  const numeric = rows.filter((cells) => cells.filter((cell) => /^[+\-\u2212]?[.\d]/.test(cell)).length >= 2);
  // The first line may be a header.
  return numeric.length > 0 && numeric.length >= rows.length - 1;
}
