import { halfLightRadiusAfterSeeing, sersicB } from '@faintward/photometry';
import { describe, expect, it } from 'vitest';
import { gaussianEncircledFraction } from './point-spread.js';
import { bestApertureRadiusArcsec, enclosedFractionAfterSeeing, peakPixelFractionAfterSeeing } from './sersic-image.js';

/**
 * The same by brute force in the image plane: the profile is laid out in rings and angles, every element is blurred by the
 * Gaussian in x and y, and what falls into the circle is summed in narrow strips. Shares no step with the library.
 */
function bruteForceFraction(index: number, radius: number, fwhm: number, aperture: number): number {
  const sigma = fwhm / (2 * Math.sqrt(2 * Math.LN2));
  const b = sersicB(index);
  const [ringCount, stripCount] = [1200, 240];
  let [inside, total] = [0, 0];
  // Rings uniform in R^(1/(2n)) resolve the cusp and reach to where 1e-5 of the light is left.
  const outermost = radius * 40 ** Math.max(1, index / 2);
  for (let ring = 0; ring < ringCount; ring++) {
    const edge = (i: number): number => outermost * (i / ringCount) ** (2 * Math.max(1, index));
    const middle = edge(ring + 0.5);
    const light = Math.exp(-b * (middle / radius) ** (1 / index)) * (edge(ring + 1) ** 2 - edge(ring) ** 2);
    total += light;
    if (light === 0 || middle > aperture + 8 * sigma) continue;
    // By symmetry the ring may be put at (middle, 0): the fraction in the circle is the same for every angle.
    let share = 0;
    for (let strip = 0; strip < stripCount; strip++) {
      const x = aperture * (-1 + (2 * (strip + 0.5)) / stripCount);
      const halfHeight = Math.sqrt(aperture * aperture - x * x);
      const alongX = Math.exp(-0.5 * ((x - middle) / sigma) ** 2) / (sigma * Math.sqrt(2 * Math.PI));
      share += alongX * errorFunction(halfHeight / (sigma * Math.SQRT2)) * ((2 * aperture) / stripCount);
    }
    inside += light * share;
  }
  return inside / total;
}

/** Abramowitz & Stegun 1964, 7.1.26: 1.5e-7. */
function errorFunction(x: number): number {
  const t = 1 / (1 + 0.3275911 * x);
  const polynomial = t * (0.254829592 + t * (-0.284496736 + t * (1.421413741 + t * (-1.453152027 + t * 1.061405429))));
  return 1 - polynomial * Math.exp(-x * x);
}

describe('enclosed fraction after seeing', () => {
  it.each([
    [0.5, 0.6],
    [1, 0.5],
    [1, 1],
    [1, 3],
    [2, 0.5],
    [2, 2],
    [4, 0.3],
    [4, 1],
    [4, 4],
    [0.5, 20],
    [1, 20],
  ])('of a resolved profile n = %d, R_e = %d FWHM equals the convolution', (index, radius) => {
    for (const aperture of [0.4, 0.6732, 1.5, 4]) {
      const expected = bruteForceFraction(index, radius, 1, aperture);
      // The library claims 0.1 %; the brute force is itself only good to about as much.
      expect(Math.abs(enclosedFractionAfterSeeing(index, radius, 1, aperture) / expected - 1)).toBeLessThan(2e-3);
    }
  });

  it.each([
    [1, 0.19, 0.035],
    [4, 0.049, 0.06],
  ])('of an unresolved profile n = %d, R_e = %d FWHM is a little too large', (index, radius, tolerance) => {
    for (const aperture of [0.6732, 1, 1.5]) {
      const excess =
        enclosedFractionAfterSeeing(index, radius, 1, aperture) / bruteForceFraction(index, radius, 1, aperture) - 1;
      expect(excess).toBeGreaterThan(-1e-3);
      expect(excess).toBeLessThan(tolerance);
    }
  });

  it('becomes that of a point source when the size vanishes', () => {
    expect(enclosedFractionAfterSeeing(2, 1e-5, 0.8, 0.5)).toBeCloseTo(gaussianEncircledFraction(0.5 / 0.8), 8);
    expect(bestApertureRadiusArcsec(2, 1e-5, 0.8)).toBeCloseTo(0.6732 * 0.8, 4);
  });

  it('has half of the light within the half-light radius, as well as that formula holds', () => {
    // √(R_e² + (FWHM/2)²) is up to 4 % off for n = 1, so the light inside is up to some 3 % off.
    for (const radius of [0.25, 0.5, 1, 2]) {
      const inside = enclosedFractionAfterSeeing(1, radius, 1, halfLightRadiusAfterSeeing(radius, 1));
      expect(Math.abs(inside - 0.5)).toBeLessThan(0.03);
    }
  });

  it('has its best radius at 1.07 R_e for a large disc (exponential: 1.068)', () => {
    expect(bestApertureRadiusArcsec(1, 30, 0.5) / 30).toBeCloseTo(1.068, 3);
  });

  it('puts into the central pixel what a circle of its area holds, less for larger sources', () => {
    const peak = (radius: number): number => peakPixelFractionAfterSeeing(1, radius, 0.8, 0.2);
    const circle = enclosedFractionAfterSeeing(1, 1, 0.8, 0.2 / Math.sqrt(Math.PI));
    expect(peak(1) / circle).toBeCloseTo(1, 4);
    expect(peak(0.1)).toBeGreaterThan(peak(0.3));
    expect(peak(0.3)).toBeGreaterThan(peak(1));
  });
});
