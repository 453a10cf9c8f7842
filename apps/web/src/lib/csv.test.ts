import { expect, it } from 'vitest';
import { toCsv } from './csv';

it('quotes, keeps all digits, leaves unknown values empty and disarms formulas', () => {
  expect(
    toCsv(
      ['name', 'z'],
      [
        ['a "b", c', 7.123456789012345],
        ['=HYPERLINK("x")', null],
        ['-x', NaN],
      ],
    ),
  ).toBe(['name,z', '"a ""b"", c",7.123456789012345', `"'=HYPERLINK(""x"")",`, `'-x,`, ''].join('\r\n'));
});
