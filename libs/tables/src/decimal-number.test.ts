import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseDecimal } from './index.js';

describe('parseDecimal', () => {
  it.each([
    ['1.5', 1.5],
    [' 1.5 ', 1.5],
    ['-2e-17', -2e-17],
    ['+3', 3],
    ['.5', 0.5],
    ['5.', 5],
    ['−0.5', -0.5],
    ['–0.5', -0.5],
    ['1E3', 1000],
    ['1e−3', 0.001],
    ['1e-999', 0],
    ['007', 7],
  ])('reads "%s"', (text, value) => {
    expect(parseDecimal(text)).toEqual({ ok: true, value });
  });

  it.each([
    ['', 'empty'],
    ['  ', 'empty'],
    ['1,5', 'decimal-comma'],
    ['-0,25', 'decimal-comma'],
    ['1,234.5', 'thousands-separator'],
    ["12'345", 'thousands-separator'],
    ['12 345', 'thousands-separator'],
    ['abc', 'not-a-number'],
    ['1.5.2', 'not-a-number'],
    ['--1', 'not-a-number'],
    ['1e', 'not-a-number'],
    ['>3.2', 'not-a-number'],
    ['٣', 'not-a-number'],
    ['NaN', 'not-finite'],
    ['Infinity', 'not-finite'],
    ['-inf', 'not-finite'],
    ['1e999', 'not-finite'],
    ['0x1F', 'not-decimal'],
    ['0b11', 'not-decimal'],
  ])('refuses "%s" as %s', (text, code) => {
    expect(parseDecimal(text)).toMatchObject({ ok: false, code, message: expect.stringMatching(/\S/) });
  });

  it('explains the decimal comma with the right way to write the value', () => {
    expect(parseDecimal('1,5')).toMatchObject({
      message: '"1,5" has a comma. Write a decimal point instead: 1.5. Thousands are not separated.',
    });
  });

  it('does not repeat a huge cell in its message', () => {
    const refused = parseDecimal('x'.repeat(100_000));
    expect(refused.ok ? '' : refused.message.length).toBeLessThan(120);
  });

  it('comes back from every finite double exactly', () => {
    fc.assert(
      fc.property(fc.double({ noNaN: true, noDefaultInfinity: true }), (value) => {
        const parsed = parseDecimal(String(value));
        // String(-0) is "0": the sign of zero is not in the text.
        expect(parsed).toEqual({ ok: true, value: value === 0 ? 0 : value });
      }),
    );
  });
});
