import { describe, expect, it } from 'vitest';
import {
  BANDS,
  abFromVegaMagnitude,
  findBand,
  lensingMag,
  OutOfDomainError,
  powerLawColourMag,
  vegaFromAbMagnitude,
} from './index.js';

describe('bands', () => {
  it('all have edges in order, and a source for everything they state', () => {
    for (const band of Object.values(BANDS)) {
      expect(band.wavelengthHighNm).toBeGreaterThan(band.wavelengthLowNm);
      expect(band.edgesSource).not.toBe('');
      expect(band.vegaToAbMag === null).toBe(band.vegaToAbSource === null);
    }
  });

  it('turn a Vega magnitude into AB and back', () => {
    // Blanton & Roweis 2007: K_s AB − Vega = 1.85.
    expect(abFromVegaMagnitude(20, 'Ks')).toBeCloseTo(21.85, 12);
    expect(vegaFromAbMagnitude(21.85, 'Ks')).toBeCloseTo(20, 12);
  });

  it.each([
    // Blanton & Roweis 2007, AJ 133, 734; U, R and I from memory.
    ['U', 0.79],
    ['B', -0.09],
    ['V', 0.02],
    ['R', 0.21],
    ['I', 0.45],
    ['J', 0.91],
    ['H', 1.39],
    ['Ks', 1.85],
  ] as const)('%s is %d mag fainter in AB than in Vega', (band, offset) => {
    expect(abFromVegaMagnitude(0, band)).toBe(offset);
  });

  it('have no Vega offset where magnitudes are AB anyway', () => {
    expect(abFromVegaMagnitude(20, 'g')).toBeUndefined();
  });

  it('are told apart by case, and unknown ones are not found', () => {
    expect(findBand('r')).not.toBe(findBand('R'));
    expect(findBand('toString')).toBeUndefined();
  });
});

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

describe('lensingMag', () => {
  it('brightens by 2.5 log μ and refuses what is not a magnification', () => {
    expect(lensingMag(100)).toBeCloseTo(-5, 12);
    expect(() => lensingMag(0)).toThrow(OutOfDomainError);
    expect(() => lensingMag(-2)).toThrow(OutOfDomainError);
  });
});
