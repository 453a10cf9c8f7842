import { NotConvergedError, RootNotBracketedError } from './errors.js';

/** When a root counts as found. */
export interface RootOptions {
  /** Wanted absolute error of the root; 0 if left out. */
  readonly absoluteTolerance?: number;
  /** Wanted error relative to the root; 1e-14 if left out. */
  readonly relativeTolerance?: number;
  /** Most evaluations beyond the two ends; 200 if left out. */
  readonly maxIterations?: number;
}

/**
 * A root of f between a and b by Brent's method: inverse quadratic or secant steps while they behave, bisection otherwise.
 *
 * f must be continuous on [a, b] with values of opposite sign (or zero) at the ends. The result lies within
 * `absoluteTolerance + relativeTolerance · |root|` (plus rounding) of a change of sign.
 *
 * @throws {RootNotBracketedError} if both ends have the same sign, or f is NaN there
 * @throws {NotConvergedError} if the tolerance is not reached, or f becomes NaN on the way
 * @see Brent 1973, Algorithms for Minimization without Derivatives, chapter 4
 */
export function findRoot(f: (x: number) => number, a: number, b: number, options: RootOptions = {}): number {
  const { absoluteTolerance = 0, relativeTolerance = 1e-14, maxIterations = 200 } = options;
  let previous = a;
  let best = b;
  let fPrevious = f(a);
  let fBest = f(b);
  if (fPrevious === 0) return a;
  if (fBest === 0) return b;
  if (!(fPrevious < 0 !== fBest < 0) || Number.isNaN(fPrevious) || Number.isNaN(fBest)) {
    throw new RootNotBracketedError(a, b, fPrevious, fBest);
  }
  let opposite = previous;
  let fOpposite = fPrevious;
  let step = best - previous;
  let stepBefore = step;

  for (let iteration = 0; iteration < maxIterations; iteration++) {
    if (fBest > 0 === fOpposite > 0) {
      opposite = previous;
      fOpposite = fPrevious;
      step = best - previous;
      stepBefore = step;
    }
    if (Math.abs(fOpposite) < Math.abs(fBest)) {
      previous = best;
      best = opposite;
      opposite = previous;
      fPrevious = fBest;
      fBest = fOpposite;
      fOpposite = fPrevious;
    }
    const tolerance =
      2 * Number.EPSILON * Math.abs(best) + 0.5 * (absoluteTolerance + relativeTolerance * Math.abs(best));
    const toMiddle = (opposite - best) / 2;
    if (Math.abs(toMiddle) <= tolerance || fBest === 0) return best;

    if (Math.abs(stepBefore) >= tolerance && Math.abs(fPrevious) > Math.abs(fBest)) {
      const s = fBest / fPrevious;
      let p: number;
      let q: number;
      if (previous === opposite) {
        p = 2 * toMiddle * s;
        q = 1 - s;
      } else {
        const r = fPrevious / fOpposite;
        const t = fBest / fOpposite;
        p = s * (2 * toMiddle * r * (r - t) - (best - previous) * (t - 1));
        q = (r - 1) * (t - 1) * (s - 1);
      }
      if (p > 0) q = -q;
      else p = -p;
      if (2 * p < Math.min(3 * toMiddle * q - Math.abs(tolerance * q), Math.abs(stepBefore * q))) {
        stepBefore = step;
        step = p / q;
      } else {
        step = toMiddle;
        stepBefore = toMiddle;
      }
    } else {
      step = toMiddle;
      stepBefore = toMiddle;
    }
    previous = best;
    fPrevious = fBest;
    best += Math.abs(step) > tolerance ? step : Math.sign(toMiddle) * tolerance;
    fBest = f(best);
    if (Number.isNaN(fBest)) throw new NotConvergedError('findRoot', iteration + 1, `f(${best}) is not a number`);
  }
  throw new NotConvergedError('findRoot', maxIterations, `last interval around ${best}`);
}

/**
 * A root of f between a and b by Newton's method, falling back to bisection when a step leaves the bracket or does not
 * shrink fast enough. For functions whose derivative is cheap.
 *
 * @param f  gives the value and the derivative
 * @throws {RootNotBracketedError} if both ends have the same sign, or f is NaN there
 * @throws {NotConvergedError} if the tolerance is not reached, or f becomes NaN on the way
 * @see Dahlquist & Björck 2008, Numerical Methods in Scientific Computing I, section 6.3
 */
export function findRootWithDerivative(
  f: (x: number) => { readonly value: number; readonly derivative: number },
  a: number,
  b: number,
  options: RootOptions & { readonly start?: number } = {},
): number {
  const { absoluteTolerance = 0, relativeTolerance = 1e-14, maxIterations = 200, start = (a + b) / 2 } = options;
  const atA = f(a).value;
  const atB = f(b).value;
  if (atA === 0) return a;
  if (atB === 0) return b;
  if (!(atA < 0 !== atB < 0) || Number.isNaN(atA) || Number.isNaN(atB)) throw new RootNotBracketedError(a, b, atA, atB);
  let negative = atA < 0 ? a : b;
  let positive = atA < 0 ? b : a;
  let x = start;
  let lastStep = Math.abs(b - a);
  for (let iteration = 0; iteration < maxIterations; iteration++) {
    const { value, derivative } = f(x);
    if (Number.isNaN(value))
      throw new NotConvergedError('findRootWithDerivative', iteration, `f(${x}) is not a number`);
    if (value === 0) return x;
    if (value < 0) negative = x;
    else positive = x;
    const newton = x - value / derivative;
    const low = Math.min(negative, positive);
    const high = Math.max(negative, positive);
    const inside = newton > low && newton < high && Math.abs(newton - x) < lastStep;
    const next = inside ? newton : (low + high) / 2;
    const tolerance = 2 * Number.EPSILON * Math.abs(next) + absoluteTolerance + relativeTolerance * Math.abs(next);
    lastStep = inside ? Math.abs(next - x) : high - low;
    if (Math.abs(next - x) <= tolerance || high - low <= tolerance) return next;
    x = next;
  }
  throw new NotConvergedError('findRootWithDerivative', maxIterations, `last point ${x}`);
}
