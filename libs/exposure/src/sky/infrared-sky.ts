/** The near-infrared sky as lines of OH over a continuum, scaled to measured broad-band brightness. */
import { AB_ZERO_PHOTONS_PER_M2_S, curveValueAt, OutOfDomainError, type Response } from '@faintward/photometry';
import { lightOfMag, magOfLight, requireBetween } from './check.js';
import { OH_LINES_HIGH_NM, OH_LINES_LOW_NM, type OhLine } from './oh-lines.js';

/** Share of the photons of the dark sky that lines make, by common practice; in between lines the rest is left. */
export const USUAL_LINE_SHARE = { J: 0.9, H: 0.95 } as const;

/** Middle of the opaque gap between J and H: lines short of it are scaled by J, the others by H. */
export const J_TO_H_NM = 1400;

const FWHM_PER_SIGMA = 2 * Math.sqrt(2 * Math.LN2);
/** Lines further away than this many σ give nothing. */
const REACH_SIGMA = 8;

export interface BroadBandSky {
  readonly response: Response;
  /** Of the dark sky through that response. */
  readonly abMagPerArcsec2: number;
  /** Part of its photons that comes from lines, 0 to 1. */
  readonly lineShare: number;
}

export interface SkyLine {
  readonly wavelengthNm: number;
  /** Photons s⁻¹ m⁻² arcsec⁻² at the telescope. */
  readonly photonRate: number;
}

export interface InfraredSky {
  /** Lines with strength. */
  readonly lines: readonly SkyLine[];
  /** Sky between lines, AB mag/arcsec²: flat f_ν in each of the two parts. */
  continuumAbMag(wavelengthNm: number): number;
  /** AB mag/arcsec² of all lines through a response. `null` without a line in it. */
  linesAbMag(response: Response): number | null;
  /** AB mag/arcsec² of the spectrum, at a resolving power: Gaussian lines over the continuum. */
  spectrumAbMag(wavelengthNm: number, resolvingPower: number): number;
}

/**
 * Scales a list of lines so that lines and continuum together have the given brightness in J and in H.
 *
 * Relative strengths are taken as photons. Within a band they are good to some 20 to 30 %, and change within minutes; the
 * share of lines is common practice, so the continuum between lines is good to 0.5 mag. Beyond H the scale of H is used,
 * with its continuum, and the heat of telescope and sky has to be added (`thermal-emission.ts`).
 *
 * @throws {OutOfDomainError} for a share outside 0 to 1, and for a response without a line of known strength
 */
export function createInfraredSky(lines: readonly OhLine[], bands: { J: BroadBandSky; H: BroadBandSky }): InfraredSky {
  const [scaleJ, scaleH] = [photonsPerIntensity(lines, bands.J, 'J'), photonsPerIntensity(lines, bands.H, 'H')];
  const [continuumJ, continuumH] = [bands.J, bands.H].map(
    ({ abMagPerArcsec2, lineShare }) => abMagPerArcsec2 - 2.5 * Math.log10(1 - lineShare),
  ) as [number, number];
  const scaled = lines.flatMap(({ wavelengthNm, relativeIntensity }) =>
    relativeIntensity === null
      ? []
      : [{ wavelengthNm, photonRate: relativeIntensity * (wavelengthNm < J_TO_H_NM ? scaleJ : scaleH) }],
  );
  const continuumAbMag = (wavelengthNm: number): number => {
    requireBetween('wavelengthNm', wavelengthNm, OH_LINES_LOW_NM, OH_LINES_HIGH_NM, 'nm');
    return wavelengthNm < J_TO_H_NM ? continuumJ : continuumH;
  };
  return {
    lines: scaled,
    continuumAbMag,
    linesAbMag: ({ curve, logIntegral }) => {
      const photons = scaled.reduce((sum, line) => sum + line.photonRate * curveValueAt(curve, line.wavelengthNm), 0);
      return magOfLight(photons / (AB_ZERO_PHOTONS_PER_M2_S * logIntegral));
    },
    spectrumAbMag(wavelengthNm, resolvingPower) {
      requireBetween('resolvingPower', resolvingPower, 50, 500_000);
      const continuum = lightOfMag(continuumAbMag(wavelengthNm));
      const photonsPerNm = linePhotonsPerNm(scaled, wavelengthNm, wavelengthNm / resolvingPower);
      return magOfLight(continuum + (photonsPerNm * wavelengthNm) / AB_ZERO_PHOTONS_PER_M2_S)!;
    },
  };
}

function photonsPerIntensity(lines: readonly OhLine[], band: BroadBandSky, id: string): number {
  const { response, abMagPerArcsec2, lineShare } = band;
  requireBetween(`${id}.lineShare`, lineShare, 0, 0.9999);
  requireBetween(`${id}.abMagPerArcsec2`, abMagPerArcsec2, 0, 40, 'mag/arcsec²');
  const intensity = lines.reduce(
    (sum, line) => sum + (line.relativeIntensity ?? 0) * curveValueAt(response.curve, line.wavelengthNm),
    0,
  );
  if (!(intensity > 0)) throw new OutOfDomainError(`${id}.response`, intensity, 'open at a line of known strength');
  return (lineShare * AB_ZERO_PHOTONS_PER_M2_S * lightOfMag(abMagPerArcsec2) * response.logIntegral) / intensity;
}

function linePhotonsPerNm(lines: readonly SkyLine[], wavelengthNm: number, fwhmNm: number): number {
  const sigmaNm = fwhmNm / FWHM_PER_SIGMA;
  let sum = 0;
  for (const line of lines) {
    const distance = (line.wavelengthNm - wavelengthNm) / sigmaNm;
    if (Math.abs(distance) > REACH_SIGMA) continue;
    sum += (line.photonRate * Math.exp(-0.5 * distance * distance)) / (sigmaNm * Math.sqrt(2 * Math.PI));
  }
  return sum;
}
