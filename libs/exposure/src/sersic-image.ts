/** What seeing makes of a Sérsic profile: how much of it an aperture holds, and how bright its central pixel is. */
import {
  findRoot,
  gaussLegendreRule,
  inverseRegularizedGammaP,
  logGamma,
  regularizedGammaP,
} from '@faintward/numerics';
import { halfLightRadiusAfterSeeing } from '@faintward/photometry';
import { OPTIMUM_RADIUS_OVER_FWHM } from './constants.js';
import { GAUSSIAN_SIGMA_OVER_FWHM, gaussianEncircledFraction, gaussianPeakPixelFraction } from './point-spread.js';

/** Below this R_e/FWHM (over the index, above n = 1) the image is taken for a Gaussian of the same half-light radius. */
const GAUSSIAN_LIMIT = 0.2;
/** From this R_e/FWHM on the shape of the profile alone decides the best aperture. */
const RESOLVED_LIMIT = 2;

/**
 * Circular aperture that is near the best for a background-limited observation of a Sérsic profile in Gaussian seeing.
 *
 * 0.673 FWHM for a point source, growing with the half-light radius, towards the best radius of the unblurred profile
 * (1.07 R_e for n = 1); never below that of a point source. S/N is flat around the best radius, so a few per cent do not
 * matter.
 *
 * @param circularisedRadiusArcsec  R_e √q
 */
export function bestApertureRadiusArcsec(index: number, circularisedRadiusArcsec: number, fwhmArcsec: number): number {
  const blend = smoothStep(
    Math.log(circularisedRadiusArcsec / fwhmArcsec / GAUSSIAN_LIMIT) / Math.log(RESOLVED_LIMIT / GAUSSIAN_LIMIT),
  );
  // A Gaussian is the Sérsic profile of n = 0.5, so the index may slide between the two limits.
  const blurredIndex = 0.5 + (index - 0.5) * blend;
  const halfLight = halfLightRadiusAfterSeeing(circularisedRadiusArcsec, fwhmArcsec);
  return Math.max(OPTIMUM_RADIUS_OVER_FWHM * fwhmArcsec, bestRadiusOverHalfLight(blurredIndex) * halfLight);
}

/**
 * Fraction of a Sérsic profile inside a centred circle after convolution with a Gaussian.
 *
 * Resolved profiles: convolved, ring by ring, within 0.1 % (checked for 0.3 ≤ n ≤ 8, R_e up to 20 FWHM). Nearly
 * unresolved ones (R_e < FWHM/5, sooner for n > 1): a Gaussian with the half-light radius √(R_e² + (FWHM/2)²), which holds
 * up to 4 % too much of the light; between that and twice that size the two are blended.
 */
export function enclosedFractionAfterSeeing(
  index: number,
  circularisedRadiusArcsec: number,
  fwhmArcsec: number,
  radiusArcsec: number,
): number {
  const blend = convolutionShare(index, circularisedRadiusArcsec / fwhmArcsec);
  const gaussian = (): number =>
    gaussianEncircledFraction(radiusArcsec / (2 * halfLightRadiusAfterSeeing(circularisedRadiusArcsec, fwhmArcsec)));
  const sigma = fwhmArcsec * GAUSSIAN_SIGMA_OVER_FWHM;
  const convolved = (): number => convolvedFraction(index, circularisedRadiusArcsec / sigma, radiusArcsec / sigma, 12);
  return mix(blend, gaussian, convolved);
}

/** Fraction of the light in the pixel on the centre: a circle of the pixel's area where the profile is resolved. */
export function peakPixelFractionAfterSeeing(
  index: number,
  circularisedRadiusArcsec: number,
  fwhmArcsec: number,
  pixelArcsec: number,
): number {
  const blend = convolutionShare(index, circularisedRadiusArcsec / fwhmArcsec);
  const gaussian = (): number =>
    gaussianPeakPixelFraction(pixelArcsec / (2 * halfLightRadiusAfterSeeing(circularisedRadiusArcsec, fwhmArcsec)));
  const sigma = fwhmArcsec * GAUSSIAN_SIGMA_OVER_FWHM;
  const convolved = (): number =>
    convolvedFraction(index, circularisedRadiusArcsec / sigma, pixelArcsec / Math.sqrt(Math.PI) / sigma, 6);
  return mix(blend, gaussian, convolved);
}

function convolutionShare(index: number, radiusOverFwhm: number): number {
  const start = GAUSSIAN_LIMIT / Math.max(1, index);
  return smoothStep(radiusOverFwhm / start - 1);
}

function mix(share: number, atZero: () => number, atOne: () => number): number {
  if (share === 0) return atZero();
  if (share === 1) return atOne();
  return (1 - share) * atZero() + share * atOne();
}

/** 0 below 0, 1 above 1, 3t² − 2t³ between. */
function smoothStep(t: number): number {
  if (t <= 0) return 0;
  if (t >= 1) return 1;
  return t * t * (3 - 2 * t);
}

/** What the integral needs of an index: b and the logarithm of b^(2n) / (n Γ(2n)), which makes the total light 1. */
interface ProfileConstants {
  b: number;
  logNorm: number;
}

const constantsByIndex = new Map<number, ProfileConstants>();
const MOST_CACHED_INDICES = 1000;

/** Kept per index, because solving for b costs as much as the rest and programmes use few indices. */
function profileConstants(index: number): ProfileConstants {
  const known = constantsByIndex.get(index);
  if (known !== undefined) return known;
  const b = inverseRegularizedGammaP(2 * index, 0.5);
  const constants = { b, logNorm: 2 * index * Math.log(b) - Math.log(index) - logGamma(2 * index) };
  if (constantsByIndex.size >= MOST_CACHED_INDICES) constantsByIndex.clear();
  constantsByIndex.set(index, constants);
  return constants;
}

const RING_COUNT = 24;

/**
 * Light in the circle: all of the rings that lie well inside, and of the rings near its edge the part that the blur
 * carries in. Rings are nodes in τ = (R/R_e)^(1/m), m = max(1, n), in which the cusp of the profile is smooth.
 *
 * @param halfLightOverSigma  R_e, in units of the Gaussian's σ like the aperture
 */
function convolvedFraction(
  index: number,
  halfLightOverSigma: number,
  apertureOverSigma: number,
  nodeCount: number,
): number {
  const { b, logNorm } = profileConstants(index);
  const innermost = Math.max(0, apertureOverSigma - CUT_SIGMA) / halfLightOverSigma;
  const outermost = (apertureOverSigma + CUT_SIGMA) / halfLightOverSigma;
  const wholly = innermost === 0 ? 0 : regularizedGammaP(2 * index, b * innermost ** (1 / index));
  const m = Math.max(1, index);
  const low = innermost ** (1 / m);
  const half = (outermost ** (1 / m) - low) / 2;
  const { nodes, weights } = gaussLegendreRule(RING_COUNT);
  let sum = 0;
  for (let i = 0; i < RING_COUNT; i++) {
    const tau = low + half * (1 + (nodes[i] ?? 0));
    const radius = tau ** m;
    const light = m * tau ** (2 * m - 1) * Math.exp(logNorm - b * (index >= 1 ? tau : tau ** (1 / index)));
    sum +=
      (weights[i] ?? 0) * light * displacedGaussianFraction(radius * halfLightOverSigma, apertureOverSigma, nodeCount);
  }
  return Math.min(1, wholly + half * sum);
}

/** Gaussians are cut off here; e^(−6²/2) is 2e-8. */
const CUT_SIGMA = 6;

/**
 * Fraction of a two-dimensional Gaussian of σ = 1 inside a circle of radius a whose centre is b away:
 * ∫₀ᵃ ρ e^(−(ρ−b)²/2) [e^(−ρb) I₀(ρb)] dρ (one minus Marcum's Q function).
 */
function displacedGaussianFraction(b: number, a: number, nodeCount: number): number {
  const low = Math.max(0, b - CUT_SIGMA);
  const high = Math.min(a, b + CUT_SIGMA);
  if (high <= low) return 0;
  const { nodes, weights } = gaussLegendreRule(nodeCount);
  const middle = (low + high) / 2;
  const half = (high - low) / 2;
  let sum = 0;
  for (let i = 0; i < nodes.length; i++) {
    const rho = middle + half * (nodes[i] ?? 0);
    const distance = rho - b;
    sum += (weights[i] ?? 0) * rho * Math.exp(-0.5 * distance * distance) * scaledBesselI0(rho * b);
  }
  return Math.min(1, sum * half);
}

/** e^(−x) I₀(x) for x ≥ 0, within 2e-7. @see Abramowitz & Stegun 1964, 9.8.1 and 9.8.2 */
function scaledBesselI0(x: number): number {
  if (x < 3.75) {
    const t = (x / 3.75) ** 2;
    const series =
      1 + t * (3.5156229 + t * (3.0899424 + t * (1.2067492 + t * (0.2659732 + t * (0.0360768 + t * 0.0045813)))));
    return series * Math.exp(-x);
  }
  const t = 3.75 / x;
  const tail = -0.02057706 + t * (0.02635537 + t * (-0.01647633 + t * 0.00392377));
  return (
    (0.39894228 + t * (0.01328592 + t * (0.00225319 + t * (-0.00157565 + t * (0.00916281 + t * tail))))) / Math.sqrt(x)
  );
}

const TABLE_LOWEST_INDEX = 0.3;
const TABLE_HIGHEST_INDEX = 8;
const TABLE_INTERVALS = 64;
let bestRadiusTable: Float64Array | undefined;

/** Radius over R_e at which an unblurred Sérsic profile has its largest enclosed fraction over radius. */
function bestRadiusOverHalfLight(index: number): number {
  if (index === 0.5) return 2 * OPTIMUM_RADIUS_OVER_FWHM;
  bestRadiusTable ??= Float64Array.from({ length: TABLE_INTERVALS + 1 }, (_, i) =>
    solveBestRadius(TABLE_LOWEST_INDEX * (TABLE_HIGHEST_INDEX / TABLE_LOWEST_INDEX) ** (i / TABLE_INTERVALS)),
  );
  const position =
    (TABLE_INTERVALS * Math.log(index / TABLE_LOWEST_INDEX)) / Math.log(TABLE_HIGHEST_INDEX / TABLE_LOWEST_INDEX);
  const below = Math.min(TABLE_INTERVALS - 1, Math.max(0, Math.floor(position)));
  const low = bestRadiusTable[below] ?? NaN;
  const high = bestRadiusTable[below + 1] ?? NaN;
  return low + (high - low) * (position - below);
}

function solveBestRadius(index: number): number {
  const b = inverseRegularizedGammaP(2 * index, 0.5);
  const logNorm = Math.log(index) + logGamma(2 * index);
  const excess = (logRadius: number): number => {
    const u = b * Math.exp(logRadius / index);
    return Math.exp(2 * index * Math.log(u) - u - logNorm) - regularizedGammaP(2 * index, u);
  };
  return Math.exp(findRoot(excess, Math.log(1e-5), Math.log(5), { absoluteTolerance: 1e-9 }));
}
