import type { ArrivingContinuum } from './arriving-continuum.js';
import { SPEED_OF_LIGHT_KM_S } from './constants.js';
import { firstAbove } from './sampled-curve.js';
import type { RestLine } from './source-spectra.js';
import { janskyOfFrequency } from './synthetic.js';
import { gaussianSigmaFromFwhm } from './wavelengths.js';

/** A spectrum for drawing: observed wavelengths, and f_ν as it arrives and without what takes light outside the source. */
export interface DrawnSpectrum {
  wavelengthsNm: number[];
  fluxDensitiesJy: number[];
  unabsorbedFluxDensitiesJy: number[];
}

/** A narrow line gets this many points to either side, out to four standard deviations. */
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
  const nodes: Point[] = [];
  for (let i = first; i < end; i++) {
    const isJump = nodesNm[i] === nodesNm[i + 1] || nodesNm[i] === nodesNm[i - 1];
    if (!isJump && (i - first) % every !== 0 && i !== end - 1) continue;
    nodes.push({
      nm: nodesNm[i]! * stretch,
      arrives: arriving.perFrequencyAtNode(i, true) * scale,
      unabsorbed: arriving.perFrequencyAtNode(i, false) * scale,
    });
  }
  const gaussians = spectrum.lines.map((line) => gaussianOf(line, arriving, stretch, scale));
  const points = withPointsAt(nodes, gaussians.flatMap(pointsAcross));
  for (const gaussian of gaussians) addGaussian(points, gaussian);
  return {
    wavelengthsNm: points.map(({ nm }) => nm),
    fluxDensitiesJy: points.map(({ arrives }) => janskyOfFrequency(arrives)),
    unabsorbedFluxDensitiesJy: points.map(({ unabsorbed }) => janskyOfFrequency(unabsorbed)),
  };
}

/** λ² f_λ at an observed wavelength, as it arrives and without what takes light outside the source. */
interface Point {
  readonly nm: number;
  arrives: number;
  unabsorbed: number;
}

/** A narrow line as it is drawn: its peaks on top of the continuum. */
interface Gaussian {
  readonly centreNm: number;
  readonly sigmaNm: number;
  readonly peakArrives: number;
  readonly peakUnabsorbed: number;
}

function gaussianOf(line: RestLine, arriving: ArrivingContinuum, stretch: number, scale: number): Gaussian {
  const relativeSigma = gaussianSigmaFromFwhm(line.velocityWidthKmS) / SPEED_OF_LIGHT_KM_S;
  const { arrives, unabsorbed } = arriving.lineFactors(line.restWavelengthNm);
  // λ² f_λ at rest wavelengths: λ F over the width in ln λ, at the line.
  const peak = (line.flux * line.restWavelengthNm * scale) / (relativeSigma * Math.sqrt(2 * Math.PI));
  const centreNm = line.restWavelengthNm * stretch;
  return {
    centreNm,
    sigmaNm: centreNm * relativeSigma,
    peakArrives: peak * arrives,
    peakUnabsorbed: peak * unabsorbed,
  };
}

function pointsAcross({ centreNm, sigmaNm }: Gaussian): number[] {
  return Array.from(
    { length: 2 * LINE_POINTS + 1 },
    (_, i) => centreNm + ((i - LINE_POINTS) / LINE_POINTS) * LINE_REACH_SIGMA * sigmaNm,
  );
}

/** The points with others put between them, on the straight lines that join them. */
function withPointsAt(points: readonly Point[], wavelengthsNm: readonly number[]): Point[] {
  const wanted = wavelengthsNm.toSorted((a, b) => a - b);
  const merged: Point[] = [];
  let next = 0;
  for (const right of points) {
    const left = merged.at(-1);
    for (; next < wanted.length && wanted[next]! <= right.nm; next++) {
      const nm = wanted[next]!;
      const last = merged.at(-1);
      if (left === undefined || last === undefined || nm <= last.nm || nm === right.nm) continue;
      const t = (nm - left.nm) / (right.nm - left.nm);
      merged.push({
        nm,
        arrives: left.arrives + t * (right.arrives - left.arrives),
        unabsorbed: left.unabsorbed + t * (right.unabsorbed - left.unabsorbed),
      });
    }
    merged.push({ ...right });
  }
  return merged;
}

function addGaussian(points: Point[], { centreNm, sigmaNm, peakArrives, peakUnabsorbed }: Gaussian): void {
  for (const point of points) {
    const distance = (point.nm - centreNm) / sigmaNm;
    if (Math.abs(distance) > LINE_REACH_SIGMA * (1 + 1e-9)) continue;
    const profile = Math.exp(-0.5 * distance * distance);
    point.arrives += peakArrives * profile;
    point.unabsorbed += peakUnabsorbed * profile;
  }
}
