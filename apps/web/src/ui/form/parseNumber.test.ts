import { expect, it } from 'vitest';
import { parseNumber } from './parseNumber';

it.each([
  ['7.12', 7.12],
  [' −21 ', -21],
  ['2e-17', 2e-17],
  ['1 234.5', 1234.5],
  ['', null],
  ['abc', 'abc'],
  ['7,12', '7,12'],
  ['0x10', '0x10'],
  ['Infinity', 'Infinity'],
])('reads %j', (text, value) => {
  expect(parseNumber(text)).toEqual(value);
});
