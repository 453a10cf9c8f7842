import { DUST_LAW_COEFFICIENTS } from './dust-coefficients.js';

/** A(λ)/A(V) at x = 1/λ in µm⁻¹, as the publication defines it; only called where the law is valid. */
export type LawInInverseMicron = (x: number) => number;

type Polynomial = readonly number[];

/** @see Cardelli, Clayton & Mathis 1989, ApJ 345, 245 */
export function cardelliClaytonMathis(totalToSelective: number): LawInInverseMicron {
  const { infrared, optical, ultraviolet, farUltraviolet } = DUST_LAW_COEFFICIENTS.ccm1989;
  const part = (x: number, which: 'a' | 'b'): number => {
    if (x < infrared.below) return infrared[which] * x ** infrared.power;
    if (x < optical.below) return polynomial(optical[which], x - optical.origin);
    if (x >= ultraviolet.below) return polynomial(farUltraviolet[which], x - farUltraviolet.origin);
    const { constant, slope, bumpHeight, bumpCentre, bumpWidth } = ultraviolet[which];
    const { curvature } = ultraviolet;
    const bend = polynomial(curvature[which], Math.max(0, x - curvature.above));
    return constant + slope * x + bumpHeight / ((x - bumpCentre) ** 2 + bumpWidth) + bend;
  };
  return (x) => part(x, 'a') + part(x, 'b') / totalToSelective;
}

/** @see Fitzpatrick 1999, PASP 111, 63 */
export function fitzpatrick(totalToSelective: number): LawInInverseMicron {
  const law = DUST_LAW_COEFFICIENTS.fitzpatrick1999;
  const ultraviolet = fitzpatrickUltraviolet(totalToSelective);
  const anchors: [x: number, perColourExcess: number][] = [
    [0, 0],
    ...law.infraredAnchors.map(({ wavelengthNm, atStandard }): [number, number] => [
      1000 / wavelengthNm,
      (atStandard * totalToSelective) / law.standardTotalToSelective,
    ]),
    ...law.opticalAnchors.map(({ wavelengthNm, inTotalToSelective }): [number, number] => [
      1000 / wavelengthNm,
      polynomial(inTotalToSelective, totalToSelective),
    ]),
    ...law.ultravioletAnchorsNm.map((nm): [number, number] => [1000 / nm, ultraviolet(1000 / nm)]),
  ];
  const spline = naturalCubicSpline(anchors);
  const splineBelow = 1000 / law.splineFromNm;
  return (x) => (x > splineBelow ? ultraviolet(x) : spline(x)) / totalToSelective;
}

function fitzpatrickUltraviolet(totalToSelective: number): (x: number) => number {
  const law = DUST_LAW_COEFFICIENTS.fitzpatrick1999.ultraviolet;
  const slope = polynomial(law.slopeInInverseTotalToSelective, 1 / totalToSelective);
  const constant = polynomial(law.constantInSlope, slope);
  return (x) => {
    const bump = x ** 2 / ((x ** 2 - law.bumpCentre ** 2) ** 2 + (law.bumpWidth * x) ** 2);
    const bend = polynomial(law.curvature, Math.max(0, x - law.curvatureAbove));
    return constant + slope * x + law.bumpHeight * bump + law.curvatureHeight * bend + totalToSelective;
  };
}

/** @see Calzetti et al. 2000, ApJ 533, 682 */
export function calzetti(totalToSelective: number): LawInInverseMicron {
  const { scale, splitNm, shorter, longer } = DUST_LAW_COEFFICIENTS.calzetti2000;
  return (x) => (scale * polynomial(x > 1000 / splitNm ? shorter : longer, x) + totalToSelective) / totalToSelective;
}

function polynomial(coefficients: Polynomial, x: number): number {
  return coefficients.reduceRight((sum, coefficient) => sum * x + coefficient, 0);
}

/** Cubic spline without curvature at its ends. Points in ascending x; evaluated between the first and the last. */
function naturalCubicSpline(points: readonly (readonly [number, number])[]): (x: number) => number {
  const curvatures = naturalCurvatures(points);
  return (x) => {
    let i = 0;
    while (i < points.length - 2 && x > points[i + 1]![0]) i++;
    const [x0, y0] = points[i]!;
    const [x1, y1] = points[i + 1]!;
    const h = x1 - x0;
    const [a, b] = [(x1 - x) / h, (x - x0) / h];
    return a * y0 + b * y1 + (((a ** 3 - a) * curvatures[i]! + (b ** 3 - b) * curvatures[i + 1]!) * h ** 2) / 6;
  };
}

/** Second derivatives at the points: the tridiagonal system of a spline, eliminated from the left and solved backwards. */
function naturalCurvatures(points: readonly (readonly [number, number])[]): number[] {
  const last = points.length - 1;
  const factors = [0];
  const rights = [0];
  for (let i = 1; i < last; i++) {
    const [[xa, ya], [xb, yb], [xc, yc]] = [points[i - 1]!, points[i]!, points[i + 1]!];
    const pivot = 2 * (xc - xa) - (xb - xa) * factors[i - 1]!;
    const change = (yc - yb) / (xc - xb) - (yb - ya) / (xb - xa);
    factors.push((xc - xb) / pivot);
    rights.push((6 * change - (xb - xa) * rights[i - 1]!) / pivot);
  }
  const curvatures = Array<number>(points.length).fill(0);
  for (let i = last - 1; i > 0; i--) curvatures[i] = rights[i]! - factors[i]! * curvatures[i + 1]!;
  return curvatures;
}
