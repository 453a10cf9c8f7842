import { expect, it } from 'vitest';
import { redshiftColour } from './redshiftColour';

it('stands still outside its ends, names its anchors and mixes between them', () => {
  expect(redshiftColour(-1)).toBe('var(--fw-palette-faintward-z0)');
  expect(redshiftColour(1100)).toBe('var(--fw-palette-faintward-z5)');
  expect(redshiftColour(7)).toBe('var(--fw-palette-faintward-z3)');
  expect(redshiftColour(5.5)).toBe(
    'color-mix(in oklab, var(--fw-palette-faintward-z3) 50%, var(--fw-palette-faintward-z2))',
  );
});
