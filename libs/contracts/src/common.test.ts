import { describe, expect, it } from 'vitest';
import { line, prose } from './common.js';

describe('a line of text', () => {
  it('is trimmed and may hold any script', () => {
    expect(line(20).parse('  Ångström Ω 星 ')).toBe('Ångström Ω 星');
    expect(line(20).parse('\u{1F52D} sky')).toBe('\u{1F52D} sky');
  });

  it('is refused empty, too long, with control characters or with half a character', () => {
    for (const text of ['   ', 'x'.repeat(21), 'a\u0000b', 'a\nb', 'half \ud83d', '\udd2d half']) {
      expect(line(20).safeParse(text).success, JSON.stringify(text)).toBe(false);
    }
  });
});

describe('prose', () => {
  it('may be empty and run over lines, but holds no NUL and no half characters', () => {
    expect(prose(50).parse('one\n\ttwo')).toBe('one\n\ttwo');
    expect(prose(50).parse('')).toBe('');
    expect(prose(50).safeParse('a\u0000').success).toBe(false);
    expect(prose(50).safeParse('half \ud83d').success).toBe(false);
  });
});
