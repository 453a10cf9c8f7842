/** Numbers that look random and are the same for the same seed: for simulations that can be repeated, never for secrets. */
import { NumericalDomainError } from './errors.js';

/** A stream of numbers. Every call moves it on. */
export interface RandomStream {
  /** A whole number from 0 to 2^32 − 1. */
  nextUint32(): number;
  /** Evenly between 0 and 1, neither end included, in steps of 2^−53. */
  nextUniform(): number;
}

const MASK_64 = (1n << 64n) - 1n;

/**
 * splitmix64, which turns similar seeds into dissimilar states.
 *
 * @param seed  taken modulo 2^64
 * @returns a function that gives the next 64 bits
 * @see Steele, Lea & Flood 2014, OOPSLA '14, 453; Vigna's public-domain form with the constants used here
 */
export function splitmix64(seed: bigint): () => bigint {
  let state = seed & MASK_64;
  return () => {
    state = (state + 0x9e3779b97f4a7c15n) & MASK_64;
    let mixed = state;
    mixed = ((mixed ^ (mixed >> 30n)) * 0xbf58476d1ce4e5b9n) & MASK_64;
    mixed = ((mixed ^ (mixed >> 27n)) * 0x94d049bb133111ebn) & MASK_64;
    return mixed ^ (mixed >> 31n);
  };
}

/**
 * xoshiro128** 1.1 from a state of four whole numbers of 32 bits, not all zero. Period 2^128 − 1.
 *
 * @throws {NumericalDomainError} if all four are zero
 * @see Blackman & Vigna 2021, ACM Trans. Math. Softw. 47, 36; the algorithm is in the public domain
 */
export function xoshiro128StarStar(state: readonly [number, number, number, number]): RandomStream {
  let [a, b, c, d] = state.map((word) => word >>> 0) as [number, number, number, number];
  if ((a | b | c | d) === 0) throw new NumericalDomainError('state', 0, 'not zero in all four words');
  const nextUint32 = (): number => {
    const result = Math.imul(rotateLeft(Math.imul(b, 5), 7), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = rotateLeft(d, 11);
    return result;
  };
  const nextUniform = (): number => {
    const high = nextUint32() >>> 5;
    const low = nextUint32() >>> 6;
    // 53 bits from 27 and 26; half a step keeps it off 0 without ever reaching 1.
    return (high * 67_108_864 + low + 0.5) / 9_007_199_254_740_992;
  };
  return { nextUint32, nextUniform };
}

function rotateLeft(word: number, count: number): number {
  return (word << count) | (word >>> (32 - count));
}

/**
 * A stream for a seed.
 *
 * @param seed  a whole number up to 2^53 in size
 * @throws {NumericalDomainError} for any other number
 */
export function randomStream(seed: number): RandomStream {
  if (!Number.isSafeInteger(seed)) throw new NumericalDomainError('seed', seed, 'a whole number');
  const next = splitmix64(BigInt(seed));
  const [first, second] = [next(), next()];
  const word = (bits: bigint): number => Number(bits & 0xffffffffn);
  return xoshiro128StarStar([word(first), word(first >> 32n), word(second), word(second >> 32n)]);
}

/**
 * Uniform numbers for draws with several inputs, by Latin hypercube: for each input, 0 to 1 is cut into `count` equal parts, each
 * part gets one number, evenly inside it, and the parts are shuffled independently. A mean over the draws has no larger
 * variance than with independent draws (to order 1/count), and a far smaller one for what depends on the inputs nearly additively.
 *
 * @param count       draws, at least 1
 * @param dimensions  inputs
 * @returns one list of `count` numbers strictly between 0 and 1 for each input
 * @see McKay, Beckman & Conover 1979, Technometrics 21, 239; Stein 1987, Technometrics 29, 143
 */
export function latinHypercube(count: number, dimensions: number, stream: RandomStream): Float64Array[] {
  if (!(Number.isSafeInteger(count) && count > 0))
    throw new NumericalDomainError('count', count, 'a whole number above 0');
  return Array.from({ length: dimensions }, () => {
    const column = Float64Array.from({ length: count }, (_, part) => (part + stream.nextUniform()) / count);
    shuffle(column, stream);
    return column;
  });
}

/** In place, every order equally likely. @see Durstenfeld 1964, Comm. ACM 7, 420 */
function shuffle(values: Float64Array, stream: RandomStream): void {
  for (let i = values.length - 1; i > 0; i--) {
    const other = Math.floor(stream.nextUniform() * (i + 1));
    const kept = values[i]!;
    values[i] = values[other]!;
    values[other] = kept;
  }
}
