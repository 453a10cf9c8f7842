import type { Bands } from '@faintward/photometry';
import type { TwilightTable } from '@faintward/photometry/sky-tables';
import { lightOfMag, requireBetween } from './check.js';
import type { Sunlight } from './sunlight.js';

/** With the Sun lower there is no twilight: it is night. */
export const NIGHT_SUN_ALTITUDE_DEG = -18;
/** With the Sun higher the rates do not hold, and nothing faint can be seen. */
export const HIGHEST_SUN_ALTITUDE_DEG = -5;

/** Beyond the reddest tabulated band twilight is taken to be scattered ∝ λ^−4. */
const SCATTERING_POWER = 4;

/** Brightness of twilight, alone. */
export interface Twilight {
  /**
   * Light of the zenith with the Sun at an altitude, in units of AB magnitude 0 per arcsec²; 0 from −18° down.
   *
   * Good to 0.3 mag from U to I and some 1 mag beyond; towards the Sun it is brighter, which is not in it.
   *
   * @throws {OutOfDomainError} with the Sun above −5°, or outside 300 to 2500 nm
   */
  lightAb(wavelengthNm: number, sunAltitudeDeg: number): number;
  /** Whether a wavelength lies beyond the published bands, so that the value is extended by the colour of the Sun. */
  isExtended(wavelengthNm: number): boolean;
}

interface Point {
  readonly wavelengthNm: number;
  readonly magPerDegree: number;
  readonly levelAbMag: number;
}

/**
 * Twilight from its file: a level with the Sun at one altitude, and magnitudes per degree, straight in ln λ between the
 * bands. In V the sky fades by 1.1 mag per degree.
 *
 * @see Patat et al. 2006, A&A 455, 385 (from memory)
 */
export function createTwilight({ data }: { readonly data: TwilightTable }, bands: Bands, sunlight: Sunlight): Twilight {
  const points = data.rows
    .map(({ bandId, magPerDegree, magPerArcsec2 }) => ({
      wavelengthNm: bands[bandId].pivotWavelengthNm,
      magPerDegree,
      levelAbMag: magPerArcsec2 + (bands[bandId].vegaToAbMag ?? 0),
    }))
    .sort((a, b) => a.wavelengthNm - b.wavelengthNm);
  const [first, last] = [points[0]!, points.at(-1)!];
  const isExtended = (wavelengthNm: number) => wavelengthNm < first.wavelengthNm || wavelengthNm > last.wavelengthNm;
  return {
    isExtended,
    lightAb(wavelengthNm, sunAltitudeDeg) {
      requireBetween('sunAltitudeDeg', sunAltitudeDeg, -90, HIGHEST_SUN_ALTITUDE_DEG, '°');
      const colourMag = sunlight.solarColourAb(wavelengthNm);
      if (sunAltitudeDeg <= NIGHT_SUN_ALTITUDE_DEG) return 0;
      const nearest = wavelengthNm < first.wavelengthNm ? first : last;
      const { magPerDegree, levelAbMag } = isExtended(wavelengthNm)
        ? extended(nearest, wavelengthNm, colourMag - sunlight.solarColourAb(nearest.wavelengthNm))
        : between(points, wavelengthNm);
      return lightOfMag(levelAbMag + magPerDegree * (data.levelSunAltitudeDeg - sunAltitudeDeg));
    },
  };
}

function extended(nearest: Point, wavelengthNm: number, colourMag: number): Point {
  const scatteringMag = 2.5 * SCATTERING_POWER * Math.log10(wavelengthNm / nearest.wavelengthNm);
  return { ...nearest, wavelengthNm, levelAbMag: nearest.levelAbMag + colourMag + scatteringMag };
}

function between(points: readonly Point[], wavelengthNm: number): Point {
  const i = points.findIndex((point, at) => at > 0 && point.wavelengthNm >= wavelengthNm);
  const [low, high] = [points[i - 1]!, points[i]!];
  const t = Math.log(wavelengthNm / low.wavelengthNm) / Math.log(high.wavelengthNm / low.wavelengthNm);
  return {
    wavelengthNm,
    magPerDegree: low.magPerDegree * (1 - t) + high.magPerDegree * t,
    levelAbMag: low.levelAbMag * (1 - t) + high.levelAbMag * t,
  };
}

/** Common practice: how low the Sun must be before faint objects are observed. */
const POLICY: readonly { belowNm: number; sunAltitudeDeg: number; reason: string }[] = [
  { belowNm: 700, sunAltitudeDeg: -18, reason: 'end of astronomical twilight' },
  { belowNm: 1000, sunAltitudeDeg: -15, reason: 'the far-red sky is bright by itself' },
  { belowNm: 1900, sunAltitudeDeg: -12, reason: 'airglow outshines twilight in the near infrared' },
  { belowNm: Infinity, sunAltitudeDeg: -10, reason: 'airglow and heat outshine twilight beyond 1.9 µm' },
];

/** Altitude below which the Sun should be for faint objects at a wavelength; common practice, to be set by the observatory. */
export function darkEnoughSunAltitude(wavelengthNm: number): { sunAltitudeDeg: number; reason: string } {
  requireBetween('wavelengthNm', wavelengthNm, 300, 30_000, 'nm');
  const { sunAltitudeDeg, reason } = POLICY.find(({ belowNm }) => wavelengthNm < belowNm)!;
  return { sunAltitudeDeg, reason };
}
