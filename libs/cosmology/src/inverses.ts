import { findRoot, findRootWithDerivative } from '@faintward/numerics';
import { transverseFactor, transverseSlope } from './curvature.js';
import { NoSolutionError } from './errors.js';
import type { Expansion } from './expansion.js';
import { comovingBetween, timeBetween, timeSinceBigBang } from './line-of-sight.js';
import type { PathProfile } from './path-profile.js';

/*
 * Every inverse encloses its solution between two nodes of the path profile and refines it with Newton steps in
 * x = ln(1 + z), the integral continuing from the nearer node. Lengths and times are in Hubble units.
 */

interface ValueAndSlope {
  readonly value: number;
  readonly derivative: number;
}

/** Comoving distance at x, continued from the profile's node at or below x. */
function comovingAt(expansion: Expansion, profile: PathProfile, x: number): number {
  const node = nodeBelow(profile, x);
  return profile.comoving[node]! + comovingBetween(expansion, profile.x[node]!, x);
}

function nodeBelow(profile: PathProfile, x: number): number {
  const last = profile.x.length - 1;
  return Math.min(last, Math.max(0, Math.floor((x / profile.x[last]!) * last)));
}

/** Transverse comoving distance and its derivative in x. */
function transverseAt(expansion: Expansion, comoving: number, x: number): ValueAndSlope {
  const q = expansion.omegaCurvature * comoving * comoving;
  const s = Math.exp(x);
  return { value: comoving * transverseFactor(q), derivative: (transverseSlope(q) * s) / expansion.rate(s) };
}

/** Root of a function that changes sign between two x. */
function solve(f: (x: number) => ValueAndSlope, low: number, high: number): number {
  return Math.expm1(findRootWithDerivative(f, low, high, { relativeTolerance: 1e-15 }));
}

/** First node at which an ascending column reaches the target, at least 1. */
function firstReaching(column: Float64Array, target: number): number {
  let low = 0;
  let high = column.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (column[middle]! >= target) high = middle;
    else low = middle;
  }
  return high;
}

function refuseOutside(quantity: string, value: number, minimum: number, maximum: number): void {
  if (!(value >= minimum && value <= maximum)) throw new NoSolutionError(quantity, value, { minimum, maximum });
}

export function redshiftAtComovingDistance(
  expansion: Expansion,
  profile: PathProfile,
  distanceMpc: number,
  hubbleDistanceMpc: number,
): number {
  const { x, comoving } = profile;
  refuseOutside('comovingDistanceMpc', distanceMpc, 0, comoving.at(-1)! * hubbleDistanceMpc);
  const target = distanceMpc / hubbleDistanceMpc;
  const node = firstReaching(comoving, target);
  return solve(
    (at) => {
      const s = Math.exp(at);
      return { value: comovingAt(expansion, profile, at) - target, derivative: s / expansion.rate(s) };
    },
    x[node - 1]!,
    x[node]!,
  );
}

export function redshiftAtLookbackTime(
  expansion: Expansion,
  profile: PathProfile,
  lookbackTimeGyr: number,
  hubbleTimeGyr: number,
): number {
  const { x, lookback } = profile;
  refuseOutside('lookbackTimeGyr', lookbackTimeGyr, 0, lookback.at(-1)! * hubbleTimeGyr);
  const target = lookbackTimeGyr / hubbleTimeGyr;
  const node = firstReaching(lookback, target);
  const from = x[node - 1]!;
  const already = lookback[node - 1]!;
  return solve(
    (at) => ({
      value: already + timeBetween(expansion, from, at) - target,
      derivative: 1 / expansion.rate(Math.exp(at)),
    }),
    from,
    x[node]!,
  );
}

export function redshiftAtAge(
  expansion: Expansion,
  profile: PathProfile,
  ageGyr: number,
  hubbleTimeGyr: number,
): number {
  const { x, age } = profile;
  // The same sum that ageGyr(0) is, so that today's age itself is accepted.
  const today = timeSinceBigBang(expansion, 0);
  refuseOutside('ageGyr', ageGyr, age.at(-1)! * hubbleTimeGyr, today * hubbleTimeGyr);
  if (today === Infinity) {
    throw new NoSolutionError('ageGyr', ageGyr, { minimum: Infinity, maximum: Infinity });
  }
  const target = Math.min(ageGyr / hubbleTimeGyr, age[0]!);
  // Ages descend along the profile: search in the mirrored column.
  let node = 1;
  let last = age.length - 1;
  while (node < last) {
    const middle = (node + last) >> 1;
    if (age[middle]! <= target) last = middle;
    else node = middle + 1;
  }
  const to = x[node]!;
  const ageThere = age[node]!;
  return Math.max(
    0,
    solve(
      (at) => ({
        value: target - (ageThere + timeBetween(expansion, at, to)),
        derivative: 1 / expansion.rate(Math.exp(at)),
      }),
      x[node - 1]!,
      to,
    ),
  );
}

/** Redshift at which the path from x = `start` has gone half way around a closed universe. */
export function antipodeRedshift(expansion: Expansion, profile: PathProfile, start: number): number | undefined {
  if (!(expansion.omegaCurvature < 0)) return undefined;
  const target = Math.PI / Math.sqrt(-expansion.omegaCurvature) + comovingAt(expansion, profile, start);
  if (target > profile.comoving.at(-1)!) return undefined;
  return redshiftAtComovingDistance(expansion, profile, target, 1);
}

/** x up to which transverse distances exist: the antipode or the end of the profile. */
function lastTransverseX(expansion: Expansion, profile: PathProfile): number {
  const antipode = antipodeRedshift(expansion, profile, 0);
  return antipode === undefined ? profile.x.at(-1)! : Math.log1p(antipode);
}

/**
 * Where D_M (1+z)^power turns around, for power ±1: changes of sign of its derivative. In x the derivative of
 * ln-scaled D_M is f = dD_M/dx + power · D_M.
 */
function turningPoints(expansion: Expansion, profile: PathProfile, power: 1 | -1): readonly number[] {
  const end = lastTransverseX(expansion, profile);
  const steepness = (x: number, comoving: number): number => {
    const { value, derivative } = transverseAt(expansion, comoving, x);
    return derivative + power * value;
  };
  const found: number[] = [];
  let before = steepness(0, 0);
  for (let node = 1; node < profile.x.length && profile.x[node - 1]! < end; node++) {
    const to = Math.min(profile.x[node]!, end);
    const comoving = to < profile.x[node]! ? comovingAt(expansion, profile, to) : profile.comoving[node]!;
    const after = steepness(to, comoving);
    if (before > 0 !== after > 0) found.push(refineTurn(expansion, profile, steepness, profile.x[node - 1]!, to));
    before = after;
  }
  return found;
}

/** Bisection with interpolation would do no better: f is smooth and the bracket short, so the secant form converges at once. */
function refineTurn(
  expansion: Expansion,
  profile: PathProfile,
  steepness: (x: number, comoving: number) => number,
  low: number,
  high: number,
): number {
  return findRoot((x) => steepness(x, comovingAt(expansion, profile, x)), low, high, { relativeTolerance: 1e-15 });
}

export function redshiftAtLuminosityDistance(
  expansion: Expansion,
  profile: PathProfile,
  distanceMpc: number,
  hubbleDistanceMpc: number,
): number {
  const f = (x: number): ValueAndSlope => {
    const { value, derivative } = transverseAt(expansion, comovingAt(expansion, profile, x), x);
    const s = Math.exp(x);
    return { value: s * value, derivative: s * (value + derivative) };
  };
  const turn = turningPoints(expansion, profile, 1)[0];
  const end = turn ?? lastTransverseX(expansion, profile);
  refuseOutside('luminosityDistanceMpc', distanceMpc, 0, f(end).value * hubbleDistanceMpc);
  return solveMonotone(f, profile, 0, end, distanceMpc / hubbleDistanceMpc);
}

/** Solves f = target on [low, high], where f is monotone, after narrowing the bracket on the profile's nodes. */
function solveMonotone(
  f: (x: number) => ValueAndSlope,
  profile: PathProfile,
  low: number,
  high: number,
  target: number,
): number {
  const rising = f(high).value > f(low).value;
  const last = profile.x.length - 1;
  let left = low;
  let right = high;
  let first = Math.ceil((low / profile.x[last]!) * last);
  let final = Math.floor((high / profile.x[last]!) * last);
  while (first <= final) {
    const middle = (first + final) >> 1;
    const at = profile.x[middle]!;
    const beyond = f(at).value > target === rising;
    if (beyond) {
      if (at > left && at < right) right = at;
      final = middle - 1;
    } else {
      if (at > left && at < right) left = at;
      first = middle + 1;
    }
  }
  return solve(
    (x) => {
      const { value, derivative } = f(x);
      return { value: value - target, derivative };
    },
    left,
    right,
  );
}

function angularDiameterAt(expansion: Expansion, profile: PathProfile, x: number): ValueAndSlope {
  const { value, derivative } = transverseAt(expansion, comovingAt(expansion, profile, x), x);
  const s = Math.exp(x);
  return { value: value / s, derivative: (derivative - value) / s };
}

export function angularDiameterDistanceMaximum(
  expansion: Expansion,
  profile: PathProfile,
  hubbleDistanceMpc: number,
): { readonly redshift: number; readonly distanceMpc: number } | undefined {
  const x = turningPoints(expansion, profile, -1)[0];
  if (x === undefined) return undefined;
  return {
    redshift: Math.expm1(x),
    distanceMpc: angularDiameterAt(expansion, profile, x).value * hubbleDistanceMpc,
  };
}

export function redshiftsAtAngularDiameterDistance(
  expansion: Expansion,
  profile: PathProfile,
  distanceMpc: number,
  hubbleDistanceMpc: number,
): readonly number[] {
  const f = (x: number): ValueAndSlope => angularDiameterAt(expansion, profile, x);
  const target = distanceMpc / hubbleDistanceMpc;
  const stops = [0, ...turningPoints(expansion, profile, -1), lastTransverseX(expansion, profile)];
  const heights = stops.map((x) => f(x).value);
  refuseOutside('angularDiameterDistanceMpc', distanceMpc, 0, Math.max(...heights) * hubbleDistanceMpc);
  const found: number[] = [];
  for (let i = 1; i < stops.length; i++) {
    const low = heights[i - 1]! - target;
    const high = heights[i]! - target;
    // A stop that is itself a solution is taken once, from the stretch that ends there (or begins there, for z = 0).
    if (high === 0) found.push(Math.expm1(stops[i]!));
    else if (low === 0) {
      if (i === 1) found.push(Math.expm1(stops[0]!));
    } else if (low > 0 !== high > 0) found.push(solveMonotone(f, profile, stops[i - 1]!, stops[i]!, target));
  }
  return found;
}
