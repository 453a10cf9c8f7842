import { latinHypercube, normalQuantile, randomStream } from '@faintward/numerics';
import { arrivingLight } from './arriving-light.js';
import type { RedshiftDistribution } from './redshift-distribution.js';
import type { LuminosityDistances, SourceLight } from './source-light.js';
import type { Response } from './synthetic.js';

/** What is drawn, and how often. */
export interface LightSampling {
  /** The light at a redshift: what is typical of its kind can depend on it. */
  lightAt(redshift: number): SourceLight;
  redshifts: RedshiftDistribution;
  /** 1 σ of the brightness in magnitudes. */
  sigmaMag: number;
  /** 1 σ of ln μ; only where lensing is applied on top of the light given. */
  sigmaLnMagnification: number;
  distances: LuminosityDistances;
  isSurface: boolean;
  /** The range whose magnitude is wanted. */
  response: Response;
  sampleCount: number;
  seed: number;
}

/** The draws, in one order. */
export interface LightSamples {
  readonly redshifts: Float64Array;
  /** AB magnitude above the atmosphere; NaN where nothing arrives. */
  readonly magnitudesAb: Float64Array;
}

/**
 * Draws of redshift and brightness, and the magnitude that arrives of each, by Latin hypercube: each input is spread evenly
 * over its distribution, so that quantiles carry less sampling error than with independent draws. The same seed gives the
 * same draws.
 *
 * Brightness and redshift are taken as independent, which they are not where both come from one photometric fit.
 */
export function sampleLight(sampling: LightSampling): LightSamples {
  const { sampleCount, sigmaMag, distances, isSurface, response } = sampling;
  const columns = latinHypercube(sampleCount, 3, randomStream(sampling.seed));
  const redshifts = columns[0]!.map((uniform) => sampling.redshifts.sample(uniform));
  const brightness = columns[1]!.map(normalQuantile);
  const magnification = columns[2]!.map(normalQuantile);
  const magnitudesAb = new Float64Array(sampleCount);
  let at: { redshift: number; magnitudeAb: number; isLensed: boolean } | undefined;
  for (let k = 0; k < sampleCount; k++) {
    const redshift = redshifts[k]!;
    // A redshift that is known is the same in every draw.
    if (at?.redshift !== redshift) {
      const light = sampling.lightAt(redshift);
      const magnitude = arrivingLight(light, redshift, distances, isSurface).magnitudeIn(response);
      at = {
        redshift,
        magnitudeAb: typeof magnitude === 'number' ? magnitude : NaN,
        isLensed: !isSurface && !light.includes.lensing,
      };
    }
    const lensingMag = at.isLensed ? -(2.5 / Math.LN10) * sampling.sigmaLnMagnification * magnification[k]! : 0;
    magnitudesAb[k] = at.magnitudeAb + sigmaMag * brightness[k]! + lensingMag;
  }
  return { redshifts, magnitudesAb };
}

/** Quantile of the values that are numbers, straight between them; undefined without any. */
export function quantileOf(values: Float64Array, probability: number): number | undefined {
  const sorted = values.filter((value) => !Number.isNaN(value)).sort();
  if (sorted.length === 0) return undefined;
  const position = probability * (sorted.length - 1);
  const index = Math.min(Math.floor(position), sorted.length - 1);
  const next = Math.min(index + 1, sorted.length - 1);
  return sorted[index]! + (position - index) * (sorted[next]! - sorted[index]!);
}
