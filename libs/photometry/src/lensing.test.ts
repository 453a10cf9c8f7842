import { describe, expect, it } from 'vitest';
import { OutOfDomainError } from './domain.js';
import { lensingMag } from './lensing.js';

describe('lensingMag', () => {
  it('brightens by 2.5 log μ and refuses what is not a magnification', () => {
    expect(lensingMag(100)).toBeCloseTo(-5, 12);
    expect(() => lensingMag(0)).toThrow(OutOfDomainError);
    expect(() => lensingMag(-2)).toThrow(OutOfDomainError);
  });
});
