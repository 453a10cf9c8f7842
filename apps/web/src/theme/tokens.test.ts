import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import { channels, contrastRatio } from './contrast';
import { schemes, shapePairs, textPairs, type SchemeName } from './tokens';

const names = Object.keys(schemes) as SchemeName[];

describe('contrast', () => {
  it('agrees with the ends of the scale and with the published example of #777777 on white', () => {
    expect(contrastRatio('#000000', '#ffffff')).toBeCloseTo(21, 10);
    expect(contrastRatio('#ffffff', '#ffffff')).toBe(1);
    // WebAIM's contrast article gives 4.47 : 1 (cut, not rounded) for #777777 on white.
    expect(contrastRatio('#777777', '#ffffff')).toBeCloseTo(4.478, 3);
  });

  describe.each(names)('%s', (name) => {
    it.each(textPairs)('%s on %s carries text', (text, ground) => {
      expect(contrastRatio(schemes[name][text], schemes[name][ground])).toBeGreaterThanOrEqual(4.5);
    });
    it.each(shapePairs)('%s on %s can be seen as a shape', (shape, ground) => {
      expect(contrastRatio(schemes[name][shape], schemes[name][ground])).toBeGreaterThanOrEqual(3);
    });
  });
});

describe('dome', () => {
  it.each(Object.entries(schemes.dome))('%s is a red', (_token, colour) => {
    const [red, green, blue] = channels(colour);
    // Hue within ±15° of pure red, or too dark for a hue.
    expect(red).toBeGreaterThanOrEqual(Math.max(green, blue));
    const chroma = red - Math.min(green, blue);
    const hueDegrees = chroma === 0 ? 0 : (60 * (green - blue)) / chroma;
    expect(Math.abs(hueDegrees)).toBeLessThanOrEqual(15);
    expect(Math.max(green, blue)).toBeLessThanOrEqual(0.5 * red + 1);
  });
});

describe('first paint', () => {
  it('uses the same grounds and inks as the theme, so that nothing flashes', () => {
    // Vitest runs from the root of the repository.
    const sheet = readFileSync('apps/web/public/first-paint.css', 'utf8');
    for (const name of names) {
      const rule = new RegExp(
        `\\[data-theme='${name}'\\]\\s*{\\s*background:\\s*(#[0-9a-f]+);\\s*color:\\s*(#[0-9a-f]+);`,
      ).exec(sheet);
      expect(rule?.slice(1)).toEqual([schemes[name].ground, schemes[name].ink]);
    }
  });
});
