import { findRoot } from '@faintward/numerics';
import { halfLightRadiusAfterSeeing } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { enclosedFractionAfterSeeing } from './sersic-image.js';

/** The error of √(R_e² + (FWHM/2)²) in per cent, as its documentation says, against the convolved profile of this library. */
describe('half-light radius after seeing against the convolution', () => {
  it.each([
    [1, 0.5, -3.9],
    [1, 1, -2.3],
    [1, 2, -0.7],
    [4, 0.25, -14],
    [4, 0.5, -13],
    [4, 1, -6],
    [4, 2, -1],
  ])('n = %d, R_e = %d FWHM: %d %%', (index, radius, percent) => {
    const exact = findRoot((r) => enclosedFractionAfterSeeing(index, radius, 1, r) - 0.5, 0.1, 10, {
      relativeTolerance: 1e-6,
    });
    const error = 100 * (halfLightRadiusAfterSeeing(radius, 1) / exact - 1);
    // The table is rounded, and 0.1 % of enclosed light is 0.2 % in radius.
    expect(Math.abs(error - percent)).toBeLessThan(index === 1 ? 0.3 : 0.8);
  });
});
