import { limitAt } from '../rest-grid.js';
import { curveValueAt, firstAbove, type SampledCurve } from '../sampled-curve.js';

/**
 * Means of a curve over bins that reach from halfway to the node before to halfway to the node after (at the ends, from or to the
 * node itself). Node weights being the bins' widths, the trapezoidal integral over the nodes equals the integral of the curve.
 *
 * @param nodesNm  ascending, all within the curve's range; where a node stands twice, each takes the half on its side
 */
export function binMeans(curve: SampledCurve, nodesNm: Float64Array): Float64Array {
  const last = nodesNm.length - 1;
  const means = new Float64Array(nodesNm.length);
  for (let i = 0; i <= last; i++) {
    const here = nodesNm[i]!;
    const low = (here + nodesNm[Math.max(0, i - 1)]!) / 2;
    const high = (here + nodesNm[Math.min(last, i + 1)]!) / 2;
    means[i] = high > low ? integral(curve, low, high) / (high - low) : curveValueAt(curve, here);
  }
  return means;
}

/** Exact integral of the curve between two wavelengths in its range. */
export function integral(curve: SampledCurve, lowNm: number, highNm: number): number {
  const { wavelengthsNm, values } = curve;
  let sum = 0;
  let left = lowNm;
  let leftValue = curveValueAt(curve, lowNm);
  for (let i = firstAbove(wavelengthsNm, lowNm); i < wavelengthsNm.length && wavelengthsNm[i]! < highNm; i++) {
    sum += ((leftValue + values[i]!) / 2) * (wavelengthsNm[i]! - left);
    left = wavelengthsNm[i]!;
    leftValue = values[i]!;
  }
  return sum + ((leftValue + limitAt(curve, highNm, 'left')) / 2) * (highNm - left);
}
