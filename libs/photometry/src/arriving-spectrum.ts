import type { ArrivingContinuum } from './arriving-continuum.js';
import { firstAbove } from './sampled-curve.js';
import { janskyOfFrequency } from './synthetic.js';

/** A spectrum for drawing: observed wavelengths, and f_ν as it arrives and without what takes light outside the source. */
export interface DrawnSpectrum {
  wavelengthsNm: number[];
  fluxDensitiesJy: number[];
  unabsorbedFluxDensitiesJy: number[];
}

const SPEED_OF_LIGHT_KM_S = 299_792.458;
const SIGMA_OVER_FWHM = 1 / Math.sqrt(8 * Math.LN2);
/** A narrow line is drawn with this many points to either side, out to four standard deviations. */
const LINE_POINTS = 8;
const LINE_REACH_SIGMA = 4;

/**
 * The arriving spectrum between two observed wavelengths, with narrow lines drawn as Gaussians of their widths.
 *
 * Points are left out evenly where there are more than asked for; the two points of a jump are kept.
 *
 * @returns undefined where the light has no scale of its own (it was quoted in the range looked at) or no light arrives
 */
export function drawnSpectrum(
  arriving: ArrivingContinuum,
  lowNm: number,
  highNm: number,
  pointCount = 1000,
): DrawnSpectrum | undefined {
  const normalisationMag = arriving.normalisationMag();
  if (typeof normalisationMag !== 'number') return undefined;
  const { spectrum } = arriving.light;
  const nodesNm = spectrum.continuum.wavelengthsNm;
  const stretch = 1 + arriving.redshift;
  const first = firstAbove(nodesNm, Math.max(lowNm / stretch, spectrum.validLowNm) * (1 - 1e-12));
  const end = firstAbove(nodesNm, Math.min(highNm / stretch, spectrum.validHighNm));
  const every = Math.max(1, Math.ceil((end - first) / pointCount));
  const scale = 10 ** (-0.4 * normalisationMag);
  const points: { nm: number; arrives: number; unabsorbed: number }[] = [];
  for (let i = first; i < end; i++) {
    const isJump = nodesNm[i] === nodesNm[i + 1] || nodesNm[i] === nodesNm[i - 1];
    if (!isJump && (i - first) % every !== 0 && i !== end - 1) continue;
    points.push({
      nm: nodesNm[i]! * stretch,
      arrives: arriving.perFrequencyAtNode(i, true) * scale,
      unabsorbed: arriving.perFrequencyAtNode(i, false) * scale,
    });
  }
  for (const line of spectrum.lines) {
    const observedNm = line.restWavelengthNm * stretch;
    if (observedNm < lowNm || observedNm > highNm) continue;
    const relativeWidth = (line.velocityWidthKmS * SIGMA_OVER_FWHM) / SPEED_OF_LIGHT_KM_S;
    const widthNm = observedNm * relativeWidth;
    const { arrives, unabsorbed } = arriving.lineFactors(line.restWavelengthNm);
    // λ² f_λ at rest wavelengths: the flux over the width, at the line.
    const peak = (line.flux * line.restWavelengthNm * scale) / (relativeWidth * Math.sqrt(2 * Math.PI));
    addLine(points, observedNm, widthNm, peak * arrives, peak * unabsorbed);
  }
  return {
    wavelengthsNm: points.map(({ nm }) => nm),
    fluxDensitiesJy: points.map(({ arrives }) => janskyOfFrequency(arrives)),
    unabsorbedFluxDensitiesJy: points.map(({ unabsorbed }) => janskyOfFrequency(unabsorbed)),
  };
}

/** Puts a Gaussian on top of the points, with points of its own between them. */
function addLine(
  points: { nm: number; arrives: number; unabsorbed: number }[],
  centreNm: number,
  widthNm: number,
  peakArrives: number,
  peakUnabsorbed: number,
): void {
  const start = points.findIndex(({ nm }) => nm > centreNm - LINE_REACH_SIGMA * widthNm);
  if (start <= 0) return;
  const after = points.findIndex(({ nm }) => nm > centreNm + LINE_REACH_SIGMA * widthNm);
  if (after === -1) return;
  const left = points[start - 1]!;
  const right = points[after]!;
  const own = Array.from({ length: 2 * LINE_POINTS + 1 }, (_, i) => {
    const sigmas = ((i - LINE_POINTS) / LINE_POINTS) * LINE_REACH_SIGMA;
    const nm = centreNm + sigmas * widthNm;
    const t = (nm - left.nm) / (right.nm - left.nm);
    const profile = Math.exp(-0.5 * sigmas * sigmas);
    return {
      nm,
      arrives: left.arrives + t * (right.arrives - left.arrives) + peakArrives * profile,
      unabsorbed: left.unabsorbed + t * (right.unabsorbed - left.unabsorbed) + peakUnabsorbed * profile,
    };
  });
  points.splice(start, after - start, ...own);
}
