import { AB_CONSTANT, JANSKY_CGS, SPEED_OF_LIGHT } from './constants.js';
import { OutOfDomainError } from './domain.js';
import { curveValueAt, firstAbove, type SampledCurve } from './sampled-curve.js';

const SPEED_OF_LIGHT_NM_S = SPEED_OF_LIGHT.value * 1e9;

/**
 * A response of a photon-counting system, with the integrals that every use of it needs.
 *
 * A common factor of the curve cancels in every magnitude.
 */
export interface Response {
  readonly curve: SampledCurve;
  readonly lowNm: number;
  readonly highNm: number;
  /** Outermost wavelengths at which the response is at least half of its peak: what counts as inside for a line. */
  readonly passLowNm: number;
  readonly passHighNm: number;
  /** ∫ S d ln λ: the photons of a flat f_ν. */
  readonly logIntegral: number;
  /** λ_p² = ∫ λ S dλ / ∫ S dλ/λ: relates mean f_λ and f_ν whatever the spectrum. */
  readonly pivotWavelengthNm: number;
}

/**
 * @throws {OutOfDomainError} if the curve is zero everywhere
 */
export function responseOf(curve: SampledCurve): Response {
  const { wavelengthsNm: x, values: s } = curve;
  let logIntegral = 0;
  let photonWeighted = 0;
  for (let i = 0; i + 1 < x.length; i++) {
    const width = x[i + 1]! - x[i]!;
    if (width === 0) continue;
    const slope = (s[i + 1]! - s[i]!) / width;
    logIntegral += (s[i]! - slope * x[i]!) * Math.log(x[i + 1]! / x[i]!) + slope * width;
    photonWeighted += simpson(x[i]!, x[i + 1]!, s[i]!, s[i + 1]!, 1, 1);
  }
  if (!(logIntegral > 0)) throw new OutOfDomainError('response', logIntegral, 'above 0 somewhere');
  const [passLowNm, passHighNm] = halfPowerEdgesNm(curve);
  return {
    curve,
    lowNm: x[0]!,
    highNm: x[x.length - 1]!,
    passLowNm,
    passHighNm,
    logIntegral,
    pivotWavelengthNm: Math.sqrt(photonWeighted / logIntegral),
  };
}

/** Part of the photons of a flat f_ν that a response takes between two wavelengths. */
export function responseShare({ curve, logIntegral }: Response, lowNm: number, highNm: number): number {
  const { wavelengthsNm: x, values: s } = curve;
  let sum = 0;
  for (let i = 0; i + 1 < x.length; i++) {
    const left = Math.max(x[i]!, lowNm);
    const right = Math.min(x[i + 1]!, highNm);
    if (!(left < right)) continue;
    const slope = (s[i + 1]! - s[i]!) / (x[i + 1]! - x[i]!);
    sum += (s[i]! - slope * x[i]!) * Math.log(right / left) + slope * (right - left);
  }
  return sum / logIntegral;
}

/** First and last wavelength at which a response crosses half of its peak, or its ends where it begins or ends above that. */
export function halfPowerEdgesNm({ wavelengthsNm, values }: SampledCurve): [lowNm: number, highNm: number] {
  const half = Math.max(...values) / 2;
  const first = values.findIndex((value) => value >= half);
  const last = values.findLastIndex((value) => value >= half);
  const crossing = (inside: number, outside: number): number => {
    if (outside < 0 || outside >= values.length) return wavelengthsNm[inside]!;
    const part = (values[inside]! - half) / (values[inside]! - values[outside]!);
    return wavelengthsNm[inside]! + part * (wavelengthsNm[outside]! - wavelengthsNm[inside]!);
  };
  return [crossing(first, first - 1), crossing(last, last + 1)];
}

/** ∫ λ f S dλ over one piece on which f and S are straight: a cubic, for which Simpson's rule is exact. */
function simpson(x0: number, x1: number, s0: number, s1: number, f0: number, f1: number): number {
  const middle = 0.5 * (x0 + x1) * (s0 + s1) * (f0 + f1);
  return ((x1 - x0) / 6) * (x0 * s0 * f0 + middle + x1 * s1 * f1);
}

/** Half the distance of the two Gauss–Legendre points on [−1, 1] from the middle, as a part of the whole width. */
const GAUSS_OFFSET = 0.5 / Math.sqrt(3);
const GAUSS_LOW = 0.5 - GAUSS_OFFSET;
const GAUSS_HIGH = 0.5 + GAUSS_OFFSET;

const NO_SCRATCH = new Float64Array(0);

/** What each point of a spectrum counts for in an integral over a response. */
export interface PointWeights {
  /** Index of the point that the first weight belongs to. */
  readonly first: number;
  readonly weights: Float64Array;
}

/**
 * Weights w of the points for which Σ w_i g_i = ∫ g S d ln λ, for any spectrum g = λ² f_λ ∝ f_ν on these points that is straight in
 * λ between them, as the response is between its own: the pieces of both are merged. The same weights serve for the spectrum with
 * and without each thing on its way. Zero outside the points.
 *
 * A flat f_ν comes out exactly. Where points are 1e-3 apart in ln λ, Gauss's rule with two of its own leaves 5e-15 of smooth curves, and
 * 6e-9 of a piece on which both run from nothing to their peak.
 *
 * @param nodesNm  ascending, at most two equal neighbours
 * @param stretch  1 + z for a spectrum on rest wavelengths: point i is seen at nodesNm[i] · stretch
 * @param scratch  written to and handed back as the weights if it is long enough; for callers that ask thousands of times
 */
export function pointWeights(
  { curve }: Response,
  nodesNm: Float64Array,
  stretch = 1,
  scratch: Float64Array = NO_SCRATCH,
): PointWeights {
  const { wavelengthsNm: x, values: s } = curve;
  const low = Math.max(x[0]!, nodesNm[0]! * stretch);
  const high = Math.min(x[x.length - 1]!, nodesNm[nodesNm.length - 1]! * stretch);
  if (!(low < high)) return { first: 0, weights: NO_SCRATCH };

  // i and j: the piece of the spectrum and of the response that begin at or before `left` and end beyond it.
  let i = pieceAt(nodesNm, low / stretch);
  let j = pieceAt(x, low);
  const first = i;
  const end = Math.min(firstAbove(nodesNm, high / stretch) + 1, nodesNm.length);
  const weights =
    scratch.length < end - first ? new Float64Array(end - first) : scratch.subarray(0, end - first).fill(0);
  let nodeLeft = nodesNm[i]! * stretch;
  let nodeRight = nodesNm[i + 1]! * stretch;
  let left = low;
  for (;;) {
    const right = Math.min(nodeRight, x[j + 1]!, high);
    const slope = (s[j + 1]! - s[j]!) / (x[j + 1]! - x[j]!);
    const half = 0.5 * (right - left);
    const xLow = left + (right - left) * GAUSS_LOW;
    const xHigh = left + (right - left) * GAUSS_HIGH;
    const atLow = (half * (s[j]! + slope * (xLow - x[j]!))) / xLow;
    const atHigh = (half * (s[j]! + slope * (xHigh - x[j]!))) / xHigh;
    const toRight = (atLow * (xLow - nodeLeft) + atHigh * (xHigh - nodeLeft)) / (nodeRight - nodeLeft);
    weights[i - first]! += atLow + atHigh - toRight;
    weights[i + 1 - first]! += toRight;
    if (right >= high) return { first, weights };
    left = right;
    // Two points at one wavelength are a jump: the empty piece between them is passed over.
    while (nodeRight <= left) {
      i++;
      nodeLeft = nodeRight;
      nodeRight = nodesNm[i + 1]! * stretch;
    }
    while (x[j + 1]! <= left) j++;
  }
}

/** Photon integral ∫ λ f_λ S dλ, exact for curves that are straight between their points. */
export function photonIntegral({ curve }: Response, spectrum: SampledCurve): number {
  const { wavelengthsNm: x, values: s } = curve;
  const { wavelengthsNm: nodesNm, values } = spectrum;
  const low = Math.max(x[0]!, nodesNm[0]!);
  const high = Math.min(x[x.length - 1]!, nodesNm[nodesNm.length - 1]!);
  if (!(low < high)) return 0;
  let i = pieceAt(nodesNm, low);
  let j = pieceAt(x, low);
  let sum = 0;
  for (let left = low; ;) {
    const right = Math.min(nodesNm[i + 1]!, x[j + 1]!, high);
    const f = (nm: number) => between(nm, nodesNm[i]!, nodesNm[i + 1]!, values[i]!, values[i + 1]!);
    const response = (nm: number) => between(nm, x[j]!, x[j + 1]!, s[j]!, s[j + 1]!);
    sum += simpson(left, right, response(left), response(right), f(left), f(right));
    if (right >= high) return sum;
    left = right;
    // Two points at one wavelength are a jump: the empty piece between them is passed over.
    while (nodesNm[i + 1]! <= left) i++;
    while (x[j + 1]! <= left) j++;
  }
}

/** Index of the last non-empty piece that begins at or before x. */
function pieceAt(ascending: Float64Array, x: number): number {
  const last = ascending.length - 1;
  let index = Math.min(Math.max(firstAbove(ascending, x) - 1, 0), last - 1);
  while (index < last - 1 && ascending[index + 1]! <= ascending[index]!) index++;
  return index;
}

function between(x: number, x0: number, x1: number, y0: number, y1: number): number {
  if (x <= x0) return y0;
  if (x >= x1) return y1;
  return y0 + ((y1 - y0) * (x - x0)) / (x1 - x0);
}

/** The photon integral of a narrow line of flux F (in the unit of f_λ · nm), which stands in the response at λ: λ F S(λ). */
export function linePhotonIntegral({ curve }: Response, wavelengthNm: number, flux: number): number {
  return wavelengthNm * flux * curveValueAt(curve, wavelengthNm);
}

/**
 * AB magnitude of a photon integral of f_λ in erg s⁻¹ cm⁻² nm⁻¹:
 * m = −2.5 log10(∫ λ f_λ S dλ / (c ∫ S d ln λ)) − 48.60.
 *
 * @returns Infinity for no photons: callers say so in words
 */
export function abMagnitudeOfPhotons(photons: number, { logIntegral }: Response): number {
  return -2.5 * Math.log10(photons / (SPEED_OF_LIGHT_NM_S * logIntegral)) - AB_CONSTANT.value;
}

/** The photon integral of a source of an AB magnitude: the inverse of {@link abMagnitudeOfPhotons}. */
export function photonsOfAbMagnitude(magnitudeAb: number, { logIntegral }: Response): number {
  return SPEED_OF_LIGHT_NM_S * logIntegral * 10 ** (-0.4 * (magnitudeAb + AB_CONSTANT.value));
}

/** Synthetic AB magnitude of a spectrum in erg s⁻¹ cm⁻² nm⁻¹ in a response; undefined without light in it. */
export function syntheticAbMagnitude(spectrum: SampledCurve, response: Response): number | undefined {
  const photons = photonIntegral(response, spectrum);
  return photons > 0 ? abMagnitudeOfPhotons(photons, response) : undefined;
}

/** AB magnitude of λ² f_λ, in erg s⁻¹ cm⁻² nm, at one wavelength. */
export function abMagnitudeOfFrequency(perFrequency: number): number {
  return -2.5 * Math.log10(perFrequency / SPEED_OF_LIGHT_NM_S) - AB_CONSTANT.value;
}

/** AB magnitude at one wavelength of f_λ in erg s⁻¹ cm⁻² nm⁻¹. */
export function abMagnitudeAt(fluxDensity: number, wavelengthNm: number): number {
  return -2.5 * Math.log10((fluxDensity * wavelengthNm ** 2) / SPEED_OF_LIGHT_NM_S) - AB_CONSTANT.value;
}

/** f_λ in erg s⁻¹ cm⁻² nm⁻¹ of an AB magnitude at one wavelength. */
export function fluxPerNmOfAbMagnitude(magnitudeAb: number, wavelengthNm: number): number {
  return (10 ** (-0.4 * (magnitudeAb + AB_CONSTANT.value)) * SPEED_OF_LIGHT_NM_S) / wavelengthNm ** 2;
}

/** f_ν in Jy of λ² f_λ in erg s⁻¹ cm⁻² nm. */
export function janskyOfFrequency(perFrequency: number): number {
  return perFrequency / SPEED_OF_LIGHT_NM_S / JANSKY_CGS.value;
}
