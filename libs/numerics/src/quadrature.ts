import { NotConvergedError, NumericalDomainError } from './errors.js';

/** Nodes in (−1, 1), ascending, and their weights. */
export interface QuadratureRule {
  readonly nodes: Float64Array;
  readonly weights: Float64Array;
}

const rules = new Map<number, QuadratureRule>();

/**
 * Gauss–Legendre nodes and weights on [−1, 1].
 *
 * Newton's method on the Legendre polynomial from its three-term recurrence; nodes and weights are good to about 1e-15 for
 * n ≤ 200. Rules are kept, so asking again costs nothing; do not write into the arrays.
 *
 * @param n  number of nodes, 1 to 1000
 * @throws {NumericalDomainError} for another n
 * @see DLMF 3.5.19 to 3.5.24 (rule), 18.9.1 (recurrence), 18.16.10 (starting values)
 */
export function gaussLegendreRule(n: number): QuadratureRule {
  if (!Number.isInteger(n) || n < 1 || n > 1000) throw new NumericalDomainError('n', n, 'an integer from 1 to 1000');
  const known = rules.get(n);
  if (known) return known;
  const nodes = new Float64Array(n);
  const weights = new Float64Array(n);
  for (let i = 0; i < Math.ceil(n / 2); i++) {
    let x = Math.cos((Math.PI * (i + 0.75)) / (n + 0.5));
    let derivative = 0;
    for (let step = 0; step < 20; step++) {
      let previous = 0;
      let current = 1;
      for (let k = 0; k < n; k++) {
        const next = ((2 * k + 1) * x * current - k * previous) / (k + 1);
        previous = current;
        current = next;
      }
      derivative = (n * (x * current - previous)) / (x * x - 1);
      const change = current / derivative;
      x -= change;
      if (Math.abs(change) < 1e-16) break;
    }
    const weight = 2 / ((1 - x * x) * derivative * derivative);
    nodes[i] = -x;
    nodes[n - 1 - i] = x;
    weights[i] = weight;
    weights[n - 1 - i] = weight;
  }
  if (n % 2 === 1) nodes[(n - 1) / 2] = 0;
  const rule = { nodes, weights };
  rules.set(n, rule);
  return rule;
}

/**
 * ∫ₐᵇ f(x) dx by one Gauss–Legendre rule: exact for polynomials up to degree 2n − 1, spectrally accurate for functions
 * analytic around [a, b], poor at kinks and end-point singularities (use {@link integrateAdaptively} there).
 *
 * @param nodeCount  number of nodes, 1 to 1000; 32 if left out
 * @throws {NumericalDomainError} for another number of nodes
 */
export function gaussLegendre(f: (x: number) => number, a: number, b: number, nodeCount = 32): number {
  const { nodes, weights } = gaussLegendreRule(nodeCount);
  const middle = (a + b) / 2;
  const half = (b - a) / 2;
  let sum = 0;
  for (let i = 0; i < nodeCount; i++) sum += weights[i]! * f(middle + half * nodes[i]!);
  return half * sum;
}

/** Positive nodes of the 15-point Kronrod rule, outermost first; the odd-numbered ones belong to the 7-point Gauss rule. */
const KRONROD_NODES: readonly number[] = [
  0.9914553711208126, 0.9491079123427585, 0.8648644233597691, 0.7415311855993945, 0.5860872354676911,
  0.4058451513773972, 0.20778495500789848, 0,
];
const KRONROD_WEIGHTS: readonly number[] = [
  0.022935322010529224, 0.06309209262997856, 0.10479001032225019, 0.14065325971552592, 0.1690047266392679,
  0.19035057806478542, 0.20443294007529889, 0.20948214108472782,
];
const GAUSS_WEIGHTS: readonly number[] = [
  0.1294849661688697, 0.27970539148927664, 0.3818300505051189, 0.4179591836734694,
];

function kronrod15(f: (x: number) => number, a: number, b: number): { integral: number; error: number } {
  const middle = (a + b) / 2;
  const half = (b - a) / 2;
  let kronrod = 0;
  let gauss = 0;
  for (let i = 0; i < 8; i++) {
    const offset = half * KRONROD_NODES[i]!;
    const value = i === 7 ? f(middle) : f(middle - offset) + f(middle + offset);
    kronrod += KRONROD_WEIGHTS[i]! * value;
    if (i % 2 === 1) gauss += GAUSS_WEIGHTS[(i - 1) / 2]! * value;
  }
  return { integral: half * kronrod, error: Math.abs(half * (kronrod - gauss)) };
}

/** How well and how hard {@link integrateAdaptively} tries. */
export interface AdaptiveOptions {
  /** Wanted error relative to the integral; 1e-12 if left out. */
  readonly relativeTolerance?: number;
  /** Wanted absolute error; 0 if left out. */
  readonly absoluteTolerance?: number;
  /** Most pieces the interval may be cut into; 2000 if left out. */
  readonly maxPieces?: number;
}

/**
 * ∫ₐᵇ f(x) dx, cutting the worst piece in two until the summed error estimate (7-point Gauss against 15-point Kronrod) is
 * within the tolerance. The estimate is pessimistic: the true error is usually far smaller.
 *
 * Valid for finite a and b and functions finite inside. f is never called at a or b.
 *
 * @throws {NotConvergedError} if the pieces run out or f gives a value that is not finite
 * @see Piessens et al. 1983, QUADPACK (rule QK15, method QAG); weights verified in the tests by exactness on polynomials
 */
export function integrateAdaptively(
  f: (x: number) => number,
  a: number,
  b: number,
  options: AdaptiveOptions = {},
): number {
  const { relativeTolerance = 1e-12, absoluteTolerance = 0, maxPieces = 2000 } = options;
  if (a === b) return 0;
  const first = kronrod15(f, a, b);
  const pieces = [{ a, b, ...first }];
  let integral = first.integral;
  let error = first.error;
  // Rounding alone leaves about this much; asking for less would never end.
  const floor = (): number => 4e-16 * pieces.reduce((sum, piece) => sum + Math.abs(piece.integral), 0);
  while (!(error <= Math.max(absoluteTolerance, relativeTolerance * Math.abs(integral), floor()))) {
    if (!Number.isFinite(error) || pieces.length >= maxPieces) {
      throw new NotConvergedError('integrateAdaptively', pieces.length, `on [${a}, ${b}], error estimate ${error}`);
    }
    let worst = 0;
    for (let i = 1; i < pieces.length; i++) if (pieces[i]!.error > pieces[worst]!.error) worst = i;
    const { a: left, b: right } = pieces[worst]!;
    const middle = (left + right) / 2;
    pieces[worst] = { a: left, b: middle, ...kronrod15(f, left, middle) };
    pieces.push({ a: middle, b: right, ...kronrod15(f, middle, right) });
    integral = pieces.reduce((sum, piece) => sum + piece.integral, 0);
    error = pieces.reduce((sum, piece) => sum + piece.error, 0);
  }
  return integral;
}
