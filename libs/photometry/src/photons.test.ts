import { describe, expect, it } from 'vitest';
import { powerLawColourMag } from './photons.js';

describe('powerLawColourMag', () => {
  it('equals the photon-weighted average of the spectrum by summation', () => {
    const [low, high, reference] = [900, 1400, 1600];
    for (const beta of [-3.5, -2, -1.2, 0, 2]) {
      let weighted = 0;
      const count = 20_000;
      for (let i = 0; i < count; i++) {
        const wavelength = low * (high / low) ** ((i + 0.5) / count);
        weighted += (wavelength / reference) ** (2 + beta) / count;
      }
      expect(powerLawColourMag(beta, reference, low, high)).toBeCloseTo(-2.5 * Math.log10(weighted), 7);
    }
  });

  it('is continuous at a flat spectrum', () => {
    expect(powerLawColourMag(-2 + 1e-7, 1000, 700, 900)).toBeCloseTo(0, 6);
    expect(powerLawColourMag(-2, 1000, 700, 900)).toBe(0);
  });
});
