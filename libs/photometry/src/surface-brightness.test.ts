/**
 * Dimming of surfaces comes out of a light followed by its luminosity distance and a size by its angular distance, without being
 * put in: nothing here calls what is to be shown but to compare.
 */
import { createCosmology } from '@faintward/cosmology';
import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { absoluteLight, INOUE, lineLight } from '../../../tests/factories/lights.js';
import { arrivingLight } from './arriving-light.js';
import { type DimmingConvention, meanSurfaceBrightness, surfaceBrightnessDimmingMag } from './dimming.js';
import { boxCurve } from './sampled-curve.js';
import { arcsecFromKpc } from './sizes.js';
import { responseOf } from './synthetic.js';

const PLANCK18 = createCosmology('planck18');
const ARCSEC_PER_RADIAN = 206_264.80624709636;

/** Square of 2 kpc: its solid angle as observed, and as seen from 10 pc, in arcsec². */
const SIDE_KPC = 2;
const observedArcsec2 = (redshift: number): number =>
  arcsecFromKpc(SIDE_KPC, PLANCK18.kpcPerArcsec(redshift) ?? NaN) ** 2;
const AT_TEN_PARSEC_ARCSEC2 = ((SIDE_KPC / 1e-2) * ARCSEC_PER_RADIAN) ** 2;

const redshifts = fc.double({ min: 0.01, max: 20, noNaN: true });

/** AB magnitude of a flat f_ν just beyond Lyα, where hydrogen takes nothing but its table is used. */
function magnitudeAt(redshift: number): number {
  const lymanAlphaNm = 121.567 * (1 + redshift);
  const arriving = arrivingLight(absoluteLight({ medium: INOUE }), redshift, PLANCK18);
  const found = arriving.magnitudeIn(responseOf(boxCurve(lymanAlphaNm * 1.01, lymanAlphaNm * 1.2)));
  return typeof found === 'number' ? found : NaN;
}

/** What is lost per solid angle, from a brightness at 10 pc and the one observed. */
const dimming = (observedMag: number, atTenParsecMag: number, redshift: number): number =>
  meanSurfaceBrightness(observedMag, observedArcsec2(redshift)) -
  meanSurfaceBrightness(atTenParsecMag, AT_TEN_PARSEC_ARCSEC2);

const holds = (convention: DimmingConvention, lost: (redshift: number) => number): void => {
  fc.assert(
    fc.property(redshifts, (redshift) => {
      expect(Math.abs(lost(redshift) - surfaceBrightnessDimmingMag(redshift, convention))).toBeLessThan(1e-10);
    }),
  );
};

describe('a surface dims', () => {
  it('by 7.5 log10(1 + z) in AB magnitudes of a flat f_ν', () => {
    holds('perUnitFrequency', (redshift) => dimming(magnitudeAt(redshift), -21, redshift));
  });

  it('by 12.5 log10(1 + z) per unit wavelength', () => {
    // f_λ = f_ν c / λ²: at the observed wavelength against the emitted one.
    holds('perUnitWavelength', (redshift) => {
      const toPerWavelength = 5 * Math.log10(1 + redshift);
      return dimming(magnitudeAt(redshift) + toPerWavelength, -21, redshift);
    });
  });

  it('by 10 log10(1 + z) in the energy of a line, and 7.5 log10(1 + z) in its photons', () => {
    const perSphere = 1e42 / (4 * Math.PI * 3.085677581491367e19 ** 2);
    const flux = (redshift: number): number => {
      const arriving = arrivingLight(lineLight(), redshift, PLANCK18);
      return (arriving.kind === 'line' ? arriving.fluxErgSCm2() : undefined) ?? NaN;
    };
    holds('bolometric', (redshift) =>
      dimming(-2.5 * Math.log10(flux(redshift)), -2.5 * Math.log10(perSphere), redshift),
    );
    // Photons carry hc/λ, and λ grows by 1 + z.
    holds('photonRate', (redshift) =>
      dimming(-2.5 * Math.log10(flux(redshift) * (1 + redshift)), -2.5 * Math.log10(perSphere), redshift),
    );
  });

  it('by the numbers of the four conventions at redshift 7', () => {
    // 30 log10 2 and so on: Tolman's (1 + z)⁴ = 4096.
    expect(surfaceBrightnessDimmingMag(7, 'bolometric')).toBeCloseTo(2.5 * Math.log10(4096), 12);
    expect(surfaceBrightnessDimmingMag(7, 'perUnitFrequency')).toBeCloseTo(2.5 * Math.log10(512), 12);
    expect(surfaceBrightnessDimmingMag(7, 'perUnitWavelength')).toBeCloseTo(2.5 * Math.log10(32_768), 12);
    expect(surfaceBrightnessDimmingMag(7, 'photonRate')).toBeCloseTo(2.5 * Math.log10(512), 12);
  });
});
