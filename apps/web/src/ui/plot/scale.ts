export interface Scale {
  /** Data to pixels. */
  (value: number): number;
  ticks: readonly number[];
  domain: readonly [number, number];
}

/** Round steps of 1, 2 or 5 times a power of ten that cover a range in about `count` parts. */
export function linearTicks(low: number, high: number, count: number): number[] {
  const span = high - low;
  if (!(span > 0)) return [low];
  const raw = span / Math.max(1, count);
  const power = 10 ** Math.floor(Math.log10(raw));
  const step = [1, 2, 5, 10].map((factor) => factor * power).find((candidate) => candidate >= raw * 0.999)!;
  const first = Math.ceil(low / step - 1e-9);
  const last = Math.floor(high / step + 1e-9);
  // By index and not by addition, so that 0.3 is 0.3.
  return Array.from({ length: last - first + 1 }, (_, index) => Number(((first + index) * step).toPrecision(12)));
}

/** Powers of ten, with 2 and 5 between when there are few of them. */
export function logTicks(low: number, high: number, count: number): number[] {
  const decades = Math.log10(high / low);
  const factors = decades < count / 3 ? [1, 2, 5] : [1];
  const every = Math.max(1, Math.ceil(decades / count));
  const ticks: number[] = [];
  for (let exponent = Math.floor(Math.log10(low)); exponent <= Math.ceil(Math.log10(high)); exponent += 1) {
    if (exponent % every !== 0) continue;
    for (const factor of factors) {
      const tick = Number((factor * 10 ** exponent).toPrecision(12));
      if (tick >= low * 0.999999 && tick <= high * 1.000001) ticks.push(tick);
    }
  }
  return ticks;
}

/**
 * A linear or logarithmic axis, turned round where the domain descends. Values outside the domain are carried on; a logarithmic axis puts values ≤ 0 at NaN,
 * which the plot leaves out.
 */
export function makeScale(
  kind: 'linear' | 'log',
  domain: readonly [number, number],
  range: readonly [number, number],
  tickCount: number,
): Scale {
  const transform = kind === 'log' ? Math.log10 : (value: number) => value;
  const low = transform(domain[0]);
  const span = transform(domain[1]) - low || 1;
  const scale = (value: number) => range[0] + ((transform(value) - low) / span) * (range[1] - range[0]);
  return Object.assign(scale, {
    ticks: (kind === 'log' ? logTicks : linearTicks)(Math.min(...domain), Math.max(...domain), tickCount),
    domain,
  });
}

/** Smallest and largest finite value (and positive, for a logarithmic axis), widened when they coincide. */
export function extent(values: Iterable<number>, positiveOnly = false): [number, number] {
  let low = Infinity;
  let high = -Infinity;
  for (const value of values) {
    if (!Number.isFinite(value) || (positiveOnly && value <= 0)) continue;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  if (low > high) return positiveOnly ? [1, 10] : [0, 1];
  if (low === high)
    return positiveOnly ? [low / 2, high * 2] : [low - (Math.abs(low) || 1) / 2, high + (Math.abs(high) || 1) / 2];
  return [low, high];
}
