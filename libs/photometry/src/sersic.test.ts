import { describe, expect, it } from 'vitest';
import {
  OutOfDomainError,
  centralMinusEffectiveSurfaceBrightness,
  effectiveMinusMeanSurfaceBrightness,
  fluxDensityJyFromAbMagnitude,
  meanEffectiveSurfaceBrightness,
  meanSurfaceBrightness,
  sersicB,
  sersicEnclosedFraction,
  surfaceBrightnessDimmingMag,
} from './index.js';

/** Ciotti & Bertin 1999, A&A 352, 447: asymptotic series, whose own error falls from 2.5e-4 at n = 0.5 to below 1e-6 at n = 4. */
function seriesB(n: number): number {
  return (
    2 * n -
    1 / 3 +
    4 / (405 * n) +
    46 / (25_515 * n ** 2) +
    131 / (1_148_175 * n ** 3) -
    2_194_697 / (30_690_717_750 * n ** 4)
  );
}

describe('Sérsic profile', () => {
  it('has b = ln 2 for n = 1/2, where the profile is a Gaussian', () => {
    expect(sersicB(0.5)).toBeCloseTo(Math.LN2, 12);
  });

  it.each([
    [1, 1e-4],
    [2, 1e-5],
    [4, 1e-6],
    [8, 1e-6],
  ])('agrees with the published series at n = %d', (index, tolerance) => {
    expect(Math.abs(sersicB(index) - seriesB(index))).toBeLessThan(tolerance);
  });

  it('encloses half of the light in the half-light radius', () => {
    for (const index of [0.3, 0.5, 1, 2.5, 4, 8]) expect(sersicEnclosedFraction(index, 1)).toBeCloseTo(0.5, 12);
  });

  it('of n = 1 is the exponential disc: 1 − (1 + x) e^−x', () => {
    for (const radius of [0.1, 1, 2, 5]) {
      const x = sersicB(1) * radius;
      expect(sersicEnclosedFraction(1, radius)).toBeCloseTo(1 - (1 + x) * Math.exp(-x), 13);
    }
  });

  it('has the surface-brightness offsets that its integral gives', () => {
    for (const index of [0.5, 1, 2, 4]) {
      // ⟨I⟩_e / I_e by direct summation over ln R of exp{−b[(R)^(1/n) − 1]}.
      const b = sersicB(index);
      let sum = 0;
      const step = 1e-3;
      for (let logRadius = -25 + step / 2; logRadius < 0; logRadius += step) {
        const radius = Math.exp(logRadius);
        sum += 2 * radius * radius * Math.exp(-b * (radius ** (1 / index) - 1)) * step;
      }
      expect(effectiveMinusMeanSurfaceBrightness(index)).toBeCloseTo(2.5 * Math.log10(sum), 5);
      expect(centralMinusEffectiveSurfaceBrightness(index)).toBeCloseTo(-2.5 * Math.log10(Math.exp(b)), 12);
    }
  });

  it('refuses indices outside 0.3 to 8 and negative radii', () => {
    expect(() => sersicB(0.29)).toThrow(OutOfDomainError);
    expect(() => sersicB(8.01)).toThrow(OutOfDomainError);
    expect(() => sersicB(NaN)).toThrow(OutOfDomainError);
    expect(() => sersicEnclosedFraction(1, -0.1)).toThrow(OutOfDomainError);
    expect(sersicB(0.3)).toBeGreaterThan(0);
    expect(sersicB(8)).toBeGreaterThan(0);
  });
});

describe('dimming', () => {
  it('is already inside a magnitude from D_L and a size from D_A', () => {
    // Same source near and far: flux ∝ D_L⁻² (1+z) per unit frequency, angle ∝ D_A⁻¹ = (1+z)² / D_L.
    for (const redshift of [0.5, 3, 7]) {
      const [luminosityDistance, halfLightKpc] = [4000 * redshift, 2];
      const angle = (halfLightKpc * (1 + redshift) ** 2) / luminosityDistance;
      const magnitude = 5 * Math.log10(luminosityDistance) - 2.5 * Math.log10(1 + redshift);
      const rest = meanSurfaceBrightness(0, Math.PI * halfLightKpc ** 2);
      const observed = meanSurfaceBrightness(magnitude, Math.PI * angle ** 2);
      expect(observed - rest).toBeCloseTo(surfaceBrightnessDimmingMag(redshift, 'perUnitFrequency'), 10);
    }
  });

  it('puts half of the light on the half-light ellipse', () => {
    const mean = meanEffectiveSurfaceBrightness(24, 0.3, 0.6);
    const area = Math.PI * 0.6 * 0.3 ** 2;
    expect(fluxDensityJyFromAbMagnitude(mean) * area).toBeCloseTo(fluxDensityJyFromAbMagnitude(24) / 2, 15);
  });
});
