/** A stream of pseudo-random numbers that is the same in every run, on every machine. */
export interface RandomStream {
  /** Uniform in [0, 1). */
  next(): number;
  between(low: number, high: number): number;
  /** A whole number from `low` to `high`, both included. */
  integer(low: number, high: number): number;
  /** Normal deviate of mean 0 and standard deviation 1. */
  normal(): number;
  pick<Item>(items: readonly Item[]): Item;
  shuffled<Item>(items: readonly Item[]): Item[];
}

/**
 * The stream that belongs to a name. Every part of the demo draws from a stream of its own, so that adding a target to one
 * proposal moves nothing in another.
 *
 * Mulberry32 (Tommy Ettinger's public-domain generator of 32 bits of state), started from an FNV-1a hash of the name: good
 * enough to scatter invented objects, not for statistics or secrets.
 */
export function randomStream(name: string): RandomStream {
  let state = fnv1a(name);
  const next = (): number => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), state | 1);
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61);
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
  const between = (low: number, high: number): number => low + (high - low) * next();
  const integer = (low: number, high: number): number => low + Math.floor((high - low + 1) * next());
  return {
    next,
    between,
    integer,
    normal: () => Math.sqrt(-2 * Math.log(1 - next())) * Math.cos(2 * Math.PI * next()),
    pick: (items) => {
      const item = items[integer(0, items.length - 1)];
      if (item === undefined) throw new RangeError('Nothing to pick from.');
      return item;
    },
    shuffled: <Item>(items: readonly Item[]) =>
      items
        .map((item) => ({ item, key: next() }))
        .sort((a, b) => a.key - b.key)
        .map(({ item }) => item),
  };
}

function fnv1a(text: string): number {
  let hash = 0x811c9dc5;
  for (const byte of new TextEncoder().encode(text)) hash = Math.imul(hash ^ byte, 0x01000193);
  return hash >>> 0;
}

/** Rounded as people round what they type. */
export function roundTo(value: number, decimals: number): number {
  return Number(value.toFixed(decimals));
}
