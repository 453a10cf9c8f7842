/** A place in cosmic time: redshift, and the age it belongs to in the cosmology in use. */
export interface TimePlace {
  redshift: number;
  ageGyr: number;
}

export interface TimeAxis {
  /** Even in time, or where that would crowd most targets at the left, even in ln(1+z). */
  kind: 'time' | 'logarithm';
  at: (place: TimePlace) => number;
}

/** The axis of cosmic time between two pixels, today at the right. */
export function timeAxis(
  points: readonly TimePlace[],
  ticks: readonly TimePlace[],
  ageTodayGyr: number,
  left: number,
  right: number,
): TimeAxis {
  const farCount = points.filter((point) => point.redshift > 4).length;
  if (farCount * 2 <= points.length) {
    return { kind: 'time', at: ({ ageGyr }) => left + (ageGyr / ageTodayGyr) * (right - left) };
  }
  const furthest = Math.max(1, ...(points.length > 0 ? points : ticks).map((place) => place.redshift * 1.12));
  return {
    kind: 'logarithm',
    at: ({ redshift }) => right - (Math.log1p(redshift) / Math.log1p(furthest)) * (right - left),
  };
}

/** Marks that keep their labels apart, from today backwards; what would touch its neighbour is left out. */
export function spacedMarks(
  places: readonly TimePlace[],
  axis: TimeAxis,
  left: number,
  gap: number,
): (TimePlace & { x: number })[] {
  const shown: (TimePlace & { x: number })[] = [];
  for (const place of places.toSorted((a, b) => a.redshift - b.redshift)) {
    const x = axis.at(place);
    const previous = shown.at(-1);
    if (x >= left - 1 && (!previous || previous.x - x >= gap)) shown.push({ ...place, x });
  }
  return shown;
}

/** Radius of a disc whose area says how many hours are asked. Without hours all discs are alike. */
export function discRadius(hours: number | null, maxHours: number, count: number): number {
  // Many targets take smaller discs, so that they still lie beside each other.
  const most = count > 60 ? 8 : 12;
  const least = count > 60 ? 3 : 4;
  if (maxHours <= 0) return least + 1;
  return Math.max(least, most * Math.sqrt((hours ?? 0) / maxHours));
}

/**
 * Moves discs off the line where they would cover each other, as little as possible and not further than `reach`; the
 * largest stay on it. What finds no place stays on the line, covers others there, and is counted.
 */
export function spreadDiscs(
  discs: readonly { x: number; radius: number }[],
  reach: number,
): { offsets: number[]; coveringCount: number } {
  const offsets = discs.map(() => 0);
  const placed: number[] = [];
  const order = discs.map((_disc, index) => index).toSorted((a, b) => discs[b]!.radius - discs[a]!.radius);
  let coveringCount = 0;
  const covers = (index: number, offset: number) =>
    placed.some((other) => {
      const apart = Math.hypot(discs[index]!.x - discs[other]!.x, offset - offsets[other]!);
      return apart < (discs[index]!.radius + discs[other]!.radius) * 0.92;
    });
  const offsetOf = (index: number): number | undefined => {
    for (let distance = 0; distance <= reach - discs[index]!.radius; distance += 2) {
      const offset = (distance === 0 ? [0] : [-distance, distance]).find((candidate) => !covers(index, candidate));
      if (offset !== undefined) return offset;
    }
    return undefined;
  };
  for (const index of order) {
    const offset = offsetOf(index);
    if (offset === undefined) coveringCount += 1;
    offsets[index] = offset ?? 0;
    placed.push(index);
  }
  return { offsets, coveringCount };
}

/** How far discs may leave the line: as little as keeps them apart, up to a limit. */
const reaches = [22, 34, 48, 62] as const;

/** Discs with as much room as they need. */
export function roomForDiscs(discs: readonly { x: number; radius: number }[]): { offsets: number[]; reach: number } {
  for (const reach of reaches) {
    const { offsets, coveringCount } = spreadDiscs(discs, reach);
    if (coveringCount === 0 || reach === reaches.at(-1)) return { offsets, reach };
  }
  return { offsets: discs.map(() => 0), reach: reaches[0] };
}

/** Targets counted in columns along the axis, where they are too many for a disc each. */
export function columnsOf(
  points: readonly TimePlace[],
  axis: TimeAxis,
  width: number,
): { x: number; count: number; redshift: number }[] {
  const columns = new Map<number, { count: number; sum: number }>();
  for (const point of points) {
    const column = Math.floor(axis.at(point) / width);
    const old = columns.get(column) ?? { count: 0, sum: 0 };
    columns.set(column, { count: old.count + 1, sum: old.sum + point.redshift });
  }
  return [...columns]
    .map(([column, { count, sum }]) => ({ x: column * width, count, redshift: sum / count }))
    .toSorted((a, b) => a.x - b.x);
}
