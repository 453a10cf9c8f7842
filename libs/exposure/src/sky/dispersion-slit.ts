/** What atmospheric dispersion does to light in a slit, and which way to turn the slit. */
import { gaussianSlitFraction } from '../point-spread.js';
import { dispersionArcsec, type AirState } from './atmospheric-dispersion.js';
import { requireBetween } from './check.js';

const DEG = Math.PI / 180;

/**
 * Parallactic angle: position angle of the vertical at a target, degrees east of north, −180 to 180; 0 on the meridian
 * towards the equator.
 *
 *   tan q = sin H / (tan φ cos δ − sin δ cos H)
 *
 * Exact for a sphere. At the zenith and at the poles it has no meaning and is what rounding makes of it.
 *
 * @param hourAngleDeg  west positive
 */
export function parallacticAngleDeg(hourAngleDeg: number, declinationDeg: number, latitudeDeg: number): number {
  requireBetween('hourAngleDeg', hourAngleDeg, -360, 360, '°');
  requireBetween('declinationDeg', declinationDeg, -90, 90, '°');
  requireBetween('latitudeDeg', latitudeDeg, -90, 90, '°');
  const [hour, declination, latitude] = [hourAngleDeg * DEG, declinationDeg * DEG, latitudeDeg * DEG];
  // Both terms times cos φ, which is not negative: no quadrant is lost, and a pole divides by nothing.
  const north =
    Math.sin(latitude) * Math.cos(declination) - Math.cos(latitude) * Math.sin(declination) * Math.cos(hour);
  return Math.atan2(Math.sin(hour) * Math.cos(latitude), north) / DEG;
}

/** Angle between a slit and the vertical, 0 (along) to 90° (across). */
export function angleToVerticalDeg(slitPositionAngleDeg: number, parallacticDeg: number): number {
  requireBetween('slitPositionAngleDeg', slitPositionAngleDeg, -720, 720, '°');
  requireBetween('parallacticDeg', parallacticDeg, -360, 360, '°');
  const apart = (((slitPositionAngleDeg - parallacticDeg) % 180) + 180) % 180;
  return Math.min(apart, 180 - apart);
}

export interface DispersedSlit {
  /** Wavelength at which the target is centred in the slit: that of the guider or of the acquisition. */
  readonly guidedNm: number;
  readonly airmass: number;
  readonly air: AirState;
  /** 0 with the slit along the vertical, 90 across it. */
  readonly angleToVerticalDeg: number;
  readonly slitWidthArcsec: number;
  /** Of a Gaussian image, taken to be the same at all wavelengths. */
  readonly imageFwhmArcsec: number;
}

export interface SlitLight {
  /** Part of the light at that wavelength that passes the slit. */
  readonly slitFraction: number;
  /** Distance of the image from the middle of the slit, ≥ 0. */
  readonly offsetArcsec: number;
  /** Light lost to dispersion alone, mag ≥ 0: against an image centred in the slit. `null` where nothing is left of it. */
  readonly dispersionLossMag: number | null;
}

/**
 * Light through a slit at a wavelength when the target is centred at another one.
 *
 * Exact for Gaussian images and a slit much longer than the shift, with no dispersion corrector. Wings of real images make
 * losses at large shifts smaller.
 */
export function slitLightAt(slit: DispersedSlit, wavelengthNm: number): SlitLight {
  const { slitWidthArcsec, imageFwhmArcsec } = slit;
  requireBetween('slitWidthArcsec', slitWidthArcsec, 0.01, 1000, 'arcsec');
  requireBetween('imageFwhmArcsec', imageFwhmArcsec, 0.01, 100, 'arcsec');
  requireBetween('angleToVerticalDeg', slit.angleToVerticalDeg, 0, 90, '°');
  const shift = dispersionArcsec(wavelengthNm, slit.guidedNm, slit.airmass, slit.air);
  const offsetArcsec = Math.abs(shift) * Math.sin(slit.angleToVerticalDeg * DEG);
  const width = slitWidthArcsec / imageFwhmArcsec;
  const slitFraction = gaussianSlitFraction(width, offsetArcsec / imageFwhmArcsec);
  const kept = slitFraction / gaussianSlitFraction(width);
  return { slitFraction, offsetArcsec, dispersionLossMag: kept > 0 ? Math.max(0, -2.5 * Math.log10(kept)) : null };
}

/** Shift across the band over slit width from which the slit should follow the vertical. Common practice. */
export const ALIGNMENT_NEEDED_OVER_SLIT = 0.25;

export interface ParallacticAdvice {
  /** Distance between the images at the two ends, along the vertical. */
  readonly shiftArcsec: number;
  /** Whether the slit should lie along the vertical, by common practice. */
  readonly shouldAlign: boolean;
  /** At the two ends, with the slit at the angle given. */
  readonly asGiven: readonly [low: SlitLight, high: SlitLight];
}

/**
 * Whether a slit should be turned to the vertical for a range of wavelengths: when the images at its ends lie further apart
 * than a quarter of the slit. Not to be asked with a dispersion corrector.
 */
export function parallacticAdvice(
  slit: DispersedSlit,
  rangeNm: readonly [lowNm: number, highNm: number],
): ParallacticAdvice {
  const [lowNm, highNm] = rangeNm;
  const shiftArcsec = Math.abs(dispersionArcsec(lowNm, highNm, slit.airmass, slit.air));
  return {
    shiftArcsec,
    shouldAlign: shiftArcsec > ALIGNMENT_NEEDED_OVER_SLIT * slit.slitWidthArcsec,
    asGiven: [slitLightAt(slit, lowNm), slitLightAt(slit, highNm)],
  };
}
