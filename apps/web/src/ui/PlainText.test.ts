import { expect, it } from 'vitest';
import { blocksOf } from './PlainText';

it('parts paragraphs at blank lines and gathers lists', () => {
  expect(blocksOf('One\ntwo\n\nThree:\n- a\n- b\n  more\nAfter\n')).toEqual([
    { kind: 'paragraph', lines: ['One', 'two'] },
    { kind: 'paragraph', lines: ['Three:'] },
    { kind: 'list', items: ['a', 'b more'] },
    { kind: 'paragraph', lines: ['After'] },
  ]);
});

it('leaves a dash within a line, and a minus before a number, alone', () => {
  expect(blocksOf('z 4 - 14\n-21 mag')).toEqual([{ kind: 'paragraph', lines: ['z 4 - 14', '-21 mag'] }]);
});
