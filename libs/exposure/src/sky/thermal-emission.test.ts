import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { thermalAbMag, thermalPhotonRate } from './thermal-emission.js';

const telescope = { emissivity: 0.15, temperatureCelsius: 5 };

describe('heat', () => {
  it('adds up to the photons of a black body, 1.5205e15 T³ s⁻¹ m⁻² over all wavelengths', () => {
    // 4πζ(3) k³/(h³c²) = 1.5205e15; radiance is that over π. What lies outside 0.8 to 30 µm is left out on both sides: the
    // share inside is a series of ∫ x² / (e^x − 1) between hc/λkT of the two ends, over 2ζ(3) = 2.4041.
    const kelvin = 333.15;
    const x = (nm: number) => 14_387_768.8 / (nm * kelvin);
    let integral = 0;
    for (let n = 1; n < 200; n++) {
      const part = (u: number) => Math.exp(-n * u) * ((u * u) / n + (2 * u) / n ** 2 + 2 / n ** 3);
      integral += part(x(30_000)) - part(x(800));
    }
    const share = integral / 2.404_113_806;
    let photons = 0;
    const steps = 20_000;
    const step = Math.log(30_000 / 800) / steps;
    for (let i = 0; i < steps; i++) {
      const nm = 800 * Math.exp((i + 0.5) * step);
      photons += thermalPhotonRate({ emissivity: 1, temperatureCelsius: 60 }, nm) * nm * step;
    }
    const perSteradian = photons * (648_000 / Math.PI) ** 2;
    expect(perSteradian / ((1.5205e15 * kelvin ** 3 * share) / Math.PI)).toBeCloseTo(1, 4);
  });

  it('brightens in K by 0.09 mag per degree, 0.08 with a sixth of the sky from airglow', () => {
    // Sánchez et al. 2008 (arXiv:0809.4988): +0.08 mag per °C for the whole K sky.
    const perDegree = thermalAbMag([telescope], 2150)! - thermalAbMag([{ ...telescope, temperatureCelsius: 6 }], 2150)!;
    expect(perDegree).toBeGreaterThan(0.08);
    expect(perDegree).toBeLessThan(0.1);
    expect(perDegree * (5 / 6)).toBeCloseTo(0.08, 2);
  });

  it('does not matter in H: below 1 % of the sky of 15.4 AB', () => {
    expect(thermalAbMag([telescope, { emissivity: 0.05, temperatureCelsius: 5 }], 1630)!).toBeGreaterThan(20.4);
  });

  it('adds over layers, and grows with emissivity, temperature and, in the infrared, wavelength', () => {
    const layer = fc.record({
      emissivity: fc.double({ min: 0.01, max: 0.9, noNaN: true }),
      temperatureCelsius: fc.double({ min: -40, max: 40, noNaN: true }),
    });
    fc.assert(
      fc.property(layer, fc.double({ min: 1500, max: 6000, noNaN: true }), (source, nm) => {
        const one = thermalPhotonRate(source, nm);
        expect(thermalPhotonRate({ ...source, emissivity: source.emissivity / 2 }, nm) / one).toBeCloseTo(0.5, 12);
        expect(thermalPhotonRate({ ...source, temperatureCelsius: source.temperatureCelsius + 1 }, nm)).toBeGreaterThan(
          one,
        );
        expect(thermalPhotonRate(source, nm * 1.01)).toBeGreaterThan(one);
        expect(thermalAbMag([source], nm)! - thermalAbMag([source, source], nm)!).toBeCloseTo(2.5 * Math.log10(2), 9);
      }),
    );
  });

  it('is none from a perfect mirror, and refused outside the infrared', () => {
    expect(thermalAbMag([{ emissivity: 0, temperatureCelsius: 5 }], 2200)).toBeNull();
    expect(() => thermalPhotonRate({ emissivity: 1.1, temperatureCelsius: 5 }, 2200)).toThrow('emissivity');
    expect(() => thermalPhotonRate(telescope, 500)).toThrow('wavelengthNm');
  });
});
