import { lightOfMag, requireBetween } from './check.js';
import { moonlightNanolamberts, moonScattering, vMagOfNanolamberts, type MoonGeometry } from './moonlight.js';
import type { Sunlight } from './sunlight.js';

/** τ ∝ λ^−α of aerosol over a clear mountain. Common practice; 0.5 (coarse dust) to 2 (haze). */
const AEROSOL_POWER = 1.3;

export interface MoonlightBandInput {
  readonly geometry: MoonGeometry;
  readonly wavelengthNm: number;
  /** Clear-sky extinction at that wavelength and in V, mag per airmass. */
  readonly extinctionMag: number;
  readonly extinctionVisualMag: number;
}

/** What stands for V: its wavelength and m_AB − m_Vega. */
export interface VisualBand {
  readonly wavelengthNm: number;
  readonly vegaToAbMag: number;
}

/**
 * Moonlight at the target at any wavelength, in units of AB magnitude 0 per arcsec²; 0 with the Moon down.
 *
 * An extension of the published V model, which it equals in V. Light that is scattered once is ∝ phase function times
 * optical depth, so the Rayleigh part grows as λ^−4 and the Mie part as λ^−1.3; losses on the way are those of the
 * extinction at λ; the colour is the Sun's reflected by the Moon:
 *
 *   I* [f_R s^−4 + f_M s^−1.3] (k_V/k_λ) 10^(−0.4 k_λ X_m) [1 − 10^(−0.4 k_λ X)], s = λ/λ_V
 *
 * Approximate: 0.1 to 0.25 mag in V as published, some 0.3 to 0.5 mag elsewhere, not verified. Light scattered more than
 * once, which matters short of 400 nm, is not in it. From 1600 nm on it stays below 3 % of the dark sky 30° or more away
 * from a full Moon; between the lines of OH it still counts.
 *
 * @param sunlight  colours against the same V
 * @throws {OutOfDomainError} outside 300 to 2500 nm
 */
export function moonlightAb(input: MoonlightBandInput, sunlight: Sunlight, visual: VisualBand): number {
  const { geometry, wavelengthNm, extinctionMag, extinctionVisualMag } = input;
  const colourMag = sunlight.moonColourAb(wavelengthNm);
  requireBetween('extinctionMag', extinctionMag, 1e-4, 10, 'mag per airmass');
  const { rayleigh, mie } = moonScattering(geometry.separationDeg);
  const ratio = wavelengthNm / visual.wavelengthNm;
  const perDepth = (rayleigh * ratio ** -4 + mie * ratio ** -AEROSOL_POWER) * (extinctionVisualMag / extinctionMag);
  const nanolamberts = moonlightNanolamberts(geometry, perDepth, extinctionMag);
  if (nanolamberts === 0) return 0;
  return lightOfMag(vMagOfNanolamberts(nanolamberts) + visual.vegaToAbMag + colourMag);
}
