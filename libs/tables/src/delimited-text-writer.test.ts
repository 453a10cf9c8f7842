import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { defuseFormula, readDelimitedText, writeDelimitedText } from './index.js';

describe('defusing formulas', () => {
  it.each([
    '-38d11m42s',
    '-0.5',
    '-.5',
    '-27 48 18',
    '-27:48:18',
    '-27°48\'18"',
    '+12:23:28',
    '+.5',
    '-1e-17',
    '-1.5E+3',
    '−0.5',
    '-0.5 mag fainter than expected',
    '3+4',
    'A=B',
    'x@y',
  ])('leaves "%s" alone', (text) => {
    expect(defuseFormula(text)).toBe(text);
  });

  it.each([
    '=1+1',
    '=HYPERLINK("http://127.0.0.1")',
    '+cmd|" /C calc"!A0',
    '-cmd|" /C calc"!A0',
    '-2+3+cmd|" /C calc"!A0',
    '-1+1',
    '-5*A1',
    '@SUM(A1)',
    '\t=1+1',
    '\r=1+1',
    ' =1+1',
    '＝1+1',
    '-',
    '+',
    '--1',
    '-1e-5-A1',
    '-SUM(A1)',
  ])('puts an apostrophe before %j', (text) => {
    expect(defuseFormula(text)).toBe(`'${text}`);
  });
});

describe('writing a table', () => {
  it('writes numbers with their sign and digits, empty cells for unknown values, and quotes where needed', () => {
    const text = writeDelimitedText(
      ['name', 'dec', 'z', 'notes'],
      [
        ['A, "x"', '-38d11m42s', 4.545, null],
        ['=B', '−0.5', -1.5e-17, 'two\nlines'],
        ['C', undefined, 0.1, true],
      ],
    );
    expect(text).toBe(
      'name,dec,z,notes\r\n"A, ""x""",-38d11m42s,4.545,\r\n\'=B,−0.5,-1.5e-17,"two\nlines"\r\nC,,0.1,true\r\n',
    );
  });

  it('begins with a byte order mark when asked', () => {
    expect(writeDelimitedText(['a'], [], { byteOrderMark: true, lineEnd: '\n' })).toBe('\ufeffa\n');
  });

  it('refuses rows of another length and numbers that are not finite', () => {
    expect(() => writeDelimitedText(['a', 'b'], [['1']])).toThrow(/Row 1 has 1 values for 2 columns/);
    expect(() => writeDelimitedText(['a'], [[Number.NaN]])).toThrow(RangeError);
  });

  it('is read back as it was, whatever the cells hold', () => {
    const cell = fc
      .oneof(
        fc.string({ maxLength: 12 }),
        fc.string({ unit: fc.constantFrom(...'=+-@\'"\t,;| 1.e\n#'), maxLength: 8 }),
        fc.constantFrom('-38d11m42s', '−0.5', "'=x", "''=x"),
      )
      .map((text) => text.replace(/[\0\r]/g, '').trim())
      // eslint-disable-next-line no-control-regex -- a text full of control characters is refused as binary
      .filter((text) => !/[\u0001-\u0008\u000e-\u001f]/.test(text));
    const row = fc.tuple(fc.constantFrom('A', '#12', "'#12", "'A", '=B'), cell, cell);
    fc.assert(
      fc.property(
        fc.array(row, { minLength: 1, maxLength: 8 }),
        fc.constantFrom(',' as const, ';' as const, '\t' as const),
        (rows, delimiter) => {
          const text = writeDelimitedText(['name', 'first', 'second'], rows, { delimiter });
          expect(readDelimitedText(text, { delimiter, header: 'present' }).rows).toEqual(rows);
        },
      ),
      { numRuns: 500 },
    );
  });

  it('never writes a cell that a spreadsheet would compute', () => {
    const tricky = fc.string({ unit: fc.constantFrom(...'=+-@ 1.eEA|!()*/^&'), minLength: 1, maxLength: 10 });
    fc.assert(
      fc.property(tricky, (text) => {
        const safe = defuseFormula(text);
        const starts = /^\s*[=+\-@]/.test(safe);
        // What keeps its sign holds no operator except one sign of an exponent.
        if (starts)
          expect(
            safe
              .trimStart()
              .slice(1)
              .replace(/\d\.?[eE][+-]\d/g, ''),
          ).not.toMatch(/[=+\-@|!()*/^&]/);
      }),
      { numRuns: 2000 },
    );
  });
});
