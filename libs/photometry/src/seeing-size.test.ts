import { describe, expect, it } from 'vitest';
import { halfLightRadiusAfterSeeing, imageRegime } from './seeing-size.js';

describe('half-light radius after seeing', () => {
  it('is half the FWHM for a point, exact for a Gaussian, and the source’s own in no seeing', () => {
    expect(halfLightRadiusAfterSeeing(0, 0.8)).toBe(0.4);
    // Gaussians add their σ² and have half-light radii of FWHM/2 each.
    expect(halfLightRadiusAfterSeeing(0.3, 0.8)).toBeCloseTo(0.5, 12);
    expect(halfLightRadiusAfterSeeing(5, 1e-6)).toBeCloseTo(5, 9);
  });

  it('refuses seeing of no width and a negative radius', () => {
    expect(() => halfLightRadiusAfterSeeing(1, 0)).toThrow(/fwhm/);
    expect(() => halfLightRadiusAfterSeeing(-1, 1)).toThrow(/halfLightRadius/);
  });
});

describe('image regime', () => {
  it.each([
    [null, 'point'],
    [0, 'point'],
    [0.159, 'point'],
    [0.161, 'resolvedBySeeing'],
    [1.599, 'resolvedBySeeing'],
    [1.601, 'extended'],
  ] as const)('of %d arcsec in 0.8 arcsec seeing: %s', (radius, regime) => {
    expect(imageRegime(radius, 0.8)).toBe(regime);
  });

  it('refuses what is no size', () => {
    expect(() => imageRegime(NaN, 0.8)).toThrow(/halfLightRadius/);
    expect(() => imageRegime(1, NaN)).toThrow(/fwhm/);
  });
});
