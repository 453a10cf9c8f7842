import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  columnOfRole,
  guessColumnRoles,
  readDelimitedText,
  TableRefused,
  type ReadDelimitedTextOptions,
  type TableRefusalCode,
} from './index.js';

function refusalOf(text: string, options: ReadDelimitedTextOptions = {}): TableRefused {
  try {
    readDelimitedText(text, options);
  } catch (error) {
    if (error instanceof TableRefused) return error;
    throw error;
  }
  throw new Error('the text was read');
}

describe('reading a table', () => {
  it('reads the published quasars', () => {
    const text = readFileSync(new URL('../../../tests/reference/sources/quasars-z2.csv', import.meta.url), 'utf8');
    const table = readDelimitedText(text);
    expect(table.columns).toEqual(['name', 'ra_j2000', 'dec_j2000', 'redshift', 'v_mag', 'abs_mag_catalogue']);
    expect(table.rows).toHaveLength(618);
    expect(table.rows[0]).toEqual(['BR J0355-3811', '03h55m04.9s', '-38d11m42s', '4.545', '17.95', '-28.9']);
    expect(table.rowNumbers[0]).toBe(2);
    expect(table.issues).toEqual([]);
    const mapping = guessColumnRoles(table.columns, table.rows.slice(0, 50));
    expect(mapping.guesses.map(({ role, columnIndex }) => [role, columnIndex])).toEqual([
      ['name', 0],
      ['rightAscension', 1],
      ['declination', 2],
      ['redshift', 3],
      ['magnitude', 4],
    ]);
    expect(mapping.guesses.every((guess) => guess.confidence > 0.8)).toBe(true);
    expect(mapping.unassigned).toEqual([5]);
    expect(columnOfRole(mapping, 'notes')).toBeUndefined();
  });

  it.each([
    ['comma', ',', 'name,ra,dec\nA,10:00:00,-02:00:00\nB,11:00:00,+03:00:00\n'],
    ['semicolon, with decimal commas', ';', 'name;ra;dec\nA;10,5;-02,5\nB;11,5;+03,5\n'],
    ['tab, with commas in the names', '\t', 'name\tra\tdec\nA, the first\t10:00:00\t-2\nB, the second\t11:00:00\t3\n'],
    ['vertical bar', '|', 'name|ra|dec\nA|10:00:00|-2\nB|11:00:00|3'],
    ['blanks', 'spaces', 'name   ra        dec\nA      10:00:00  -2.5\nB      11:00:00   3.5\n'],
  ])('finds the delimiter: %s', (_, delimiter, text) => {
    const table = readDelimitedText(text);
    expect(table.delimiter).toBe(delimiter);
    expect(table.columns).toEqual(['name', 'ra', 'dec']);
    expect(table.rows).toHaveLength(2);
    expect(table.hasHeader).toBe(true);
  });

  it.each(['\n', '\r\n', '\r'])('reads line ends %j', (lineEnd) => {
    const table = readDelimitedText(['name,z', 'A,1', 'B,2', ''].join(lineEnd));
    expect(table.rows).toEqual([
      ['A', '1'],
      ['B', '2'],
    ]);
  });

  it('takes no notice of a byte order mark', () => {
    expect(readDelimitedText('\ufeffname,z\nA,1').columns).toEqual(['name', 'z']);
  });

  it('keeps to semicolons where a row is short and every name has a comma', () => {
    const rows = Array.from({ length: 8 }, (_, i) => `A, part ${i};${10 + i}.5;-2.5`);
    const table = readDelimitedText(['name, part;ra;dec', ...rows, 'A, part 9;20.5'].join('\n'));
    expect(table.delimiter).toBe(';');
    expect(table.columns).toEqual(['name, part', 'ra', 'dec']);
    expect(table.issues.map(({ code }) => code)).toEqual(['short-row']);
  });

  it('reads quoted cells with delimiters, doubled quotes and line breaks, and counts rows as a spreadsheet does', () => {
    const table = readDelimitedText('name,notes\nA,"bright, ""red"" and\nextended"\nB,plain\n');
    expect(table.rows).toEqual([
      ['A', 'bright, "red" and\nextended'],
      ['B', 'plain'],
    ]);
    expect(table.rowNumbers).toEqual([2, 3]);
  });

  it('keeps a quote inside a cell: it may be seconds of arc', () => {
    expect(readDelimitedText('name,dec\nA,-27°48\'18"\n').rows).toEqual([['A', '-27°48\'18"']]);
  });

  it('reports short and long rows and keeps them', () => {
    const table = readDelimitedText('name,ra,dec\nA,10:00:00\nB,11:00:00,+1,oops,more\nC,12:00:00,+2\n');
    expect(table.rows).toEqual([
      ['A', '10:00:00', ''],
      ['B', '11:00:00', '+1'],
      ['C', '12:00:00', '+2'],
    ]);
    expect(table.issues).toMatchObject([
      { row: 2, code: 'short-row' },
      { row: 3, column: 4, code: 'long-row', message: expect.stringContaining('"oops", "more"') },
    ]);
  });

  it('leaves out blank rows but counts them, and drops empty columns at the end', () => {
    const table = readDelimitedText('name,z,,\nA,1,,\n,,,\n\nB,2,,\n');
    expect(table.columns).toEqual(['name', 'z']);
    expect(table.rows).toEqual([
      ['A', '1'],
      ['B', '2'],
    ]);
    expect(table.rowNumbers).toEqual([2, 5]);
    expect(table.issues).toEqual([]);
  });

  it('takes comment lines at the top, the last one as header if it divides like the rows', () => {
    const table = readDelimitedText('# made by hand\n# name, ra, dec\nA,10:00:00,-2\n#B,11:00:00,-3\nC,12:00:00,-4\n');
    expect(table.columns).toEqual(['name', 'ra', 'dec']);
    expect(table.rows.map((row) => row[0])).toEqual(['A', 'C']);
    expect(table.rowNumbers).toEqual([3, 5]);
    expect(table.issues).toMatchObject([{ row: 4, code: 'comment-row' }]);
  });

  it('numbers the columns of a list without a header', () => {
    const table = readDelimitedText('A\t10:00:00\t-2.5\nB\t11:00:00\t-3.5');
    expect(table.hasHeader).toBe(false);
    expect(table.columns).toEqual(['Column 1', 'Column 2', 'Column 3']);
    expect(table.rows).toHaveLength(2);
    expect(table.rowNumbers).toEqual([1, 2]);
  });

  it('lets the caller decide about the header', () => {
    expect(readDelimitedText('name,z\nA,1', { header: 'absent' }).rows).toHaveLength(2);
    expect(readDelimitedText('1,2\n3,4', { header: 'present' }).columns).toEqual(['1', '2']);
  });

  it('takes a single pasted column of names as one column', () => {
    const table = readDelimitedText('NGC 1234\nNGC 4321\nIC 10\n');
    expect(table.columns).toEqual(['Column 1']);
    expect(table.rows).toEqual([['NGC 1234'], ['NGC 4321'], ['IC 10']]);
  });

  it('reads a single pasted row', () => {
    expect(readDelimitedText('A\t10:00:00\t-2.5').rows).toEqual([['A', '10:00:00', '-2.5']]);
  });

  it('gives repeated and missing header cells names of their own and says so', () => {
    const table = readDelimitedText('name,mag,mag,\nA,20,21,x\nB,22,23,y\n');
    expect(table.columns).toEqual(['name', 'mag', 'mag (2)', 'Column 4']);
    expect(table.issues).toMatchObject([
      { row: 1, column: 3, code: 'duplicate-column' },
      { row: 1, column: 4, code: 'unnamed-column' },
    ]);
  });

  it('keeps a header without rows', () => {
    expect(readDelimitedText('name,ra,dec\n')).toMatchObject({
      columns: ['name', 'ra', 'dec'],
      rows: [],
      hasHeader: true,
    });
  });
});

describe('refusing a text as a whole', () => {
  it.each<[string, string, ReadDelimitedTextOptions, TableRefusalCode]>([
    ['nothing', '', {}, 'empty'],
    ['blanks', ' \n\t\n', {}, 'empty'],
    ['only comments', '# a\n# b\n', {}, 'empty'],
    ['only delimiters', ',,,\n,,,\n', {}, 'empty'],
    ['NUL', 'name,z\nA\0,1', {}, 'binary'],
    ['control characters', '\u0001\u0002\u0003\u0004name', {}, 'binary'],
    ['too many characters', 'name,z\nA,1', { maxCharacters: 5 }, 'too-large'],
    ['too many rows', 'name,z\nA,1\nB,2\nC,3', { maxRows: 2 }, 'too-many-rows'],
    ['far too many rows', `name,z\n${'A,1\n'.repeat(50)}`, { maxRows: 2 }, 'too-many-rows'],
    ['too many columns', 'a,b,c\n1,2,3', { maxColumns: 2 }, 'too-many-columns'],
    ['a long cell', `name,z\n${'x'.repeat(50)},1`, { maxCellLength: 20 }, 'cell-too-long'],
    ['a line without end', `name,z\n${'x'.repeat(2_000_001)}`, {}, 'row-too-long'],
    ['a quote left open', 'name,z\nA,1\n"B,2\nC,3\n', {}, 'unclosed-quote'],
    ['a quote left open in a long text', `name,z\nA,1\n"B,2\n${'C,3\n'.repeat(500_000)}`, {}, 'row-too-long'],
  ])('%s', (_, text, options, code) => {
    expect(refusalOf(text, options)).toMatchObject({
      name: 'TableRefused',
      code,
      message: expect.stringMatching(/\S/),
    });
  });

  it('says where', () => {
    expect(refusalOf(`name,z\nA,1\nB,${'x'.repeat(50)}`, { maxCellLength: 20 })).toMatchObject({
      row: 3,
      column: 2,
      limit: 20,
    });
    expect(refusalOf('name,z\nA,1\n"B,2\n')).toMatchObject({ row: 3 });
  });

  it('reads exactly as many rows as allowed', () => {
    expect(readDelimitedText('name,z\nA,1\nB,2', { maxRows: 2 }).rows).toHaveLength(2);
    expect(readDelimitedText('A,1\nB,2', { maxRows: 2 }).rows).toHaveLength(2);
    expect(refusalOf('A,1\nB,2\nC,3', { maxRows: 2 }).code).toBe('too-many-rows');
  });

  it('refuses a flood of delimiters in bounded time', () => {
    expect(refusalOf(`name,z\n${','.repeat(900_000)}x`).code).toBe('too-many-columns');
  });
});
