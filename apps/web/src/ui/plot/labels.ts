/** Moves labels apart downwards and back, where they would overlap, keeping their order. */
export function spreadLabels<Label extends { y: number }>(
  labels: readonly Label[],
  top: number,
  bottom: number,
): Label[] {
  const gap = 15;
  const sorted = labels.toSorted((a, b) => a.y - b.y).map((label) => ({ ...label }));
  for (let index = 0; index < sorted.length; index += 1) {
    const above = sorted[index - 1];
    const current = sorted[index]!;
    current.y = Math.max(current.y, above ? above.y + gap : top);
  }
  for (let index = sorted.length - 1; index >= 0; index -= 1) {
    const below = sorted[index + 1];
    const current = sorted[index]!;
    current.y = Math.min(current.y, below ? below.y - gap : bottom);
  }
  return sorted;
}

/** Pixels that a text of this many characters takes at the size of plot labels, on the safe side. */
export function textWidth(text: string, fontSize = 12): number {
  return [...text].length * fontSize * 0.55;
}

export interface LanedLabel<Item> {
  item: Item;
  /** Left and right end in pixels. */
  from: number;
  to: number;
  lane: number;
}

/**
 * Puts spans into as few lanes as keep them apart, first come first served from the left. What finds no room in
 * `laneCount` lanes is left out and returned apart.
 */
export function intoLanes<Item>(
  spans: readonly { item: Item; from: number; to: number }[],
  laneCount: number,
  gap = 4,
): { placed: LanedLabel<Item>[]; leftOut: Item[] } {
  const ends: number[] = [];
  const placed: LanedLabel<Item>[] = [];
  const leftOut: Item[] = [];
  for (const span of spans.toSorted((a, b) => a.from - b.from)) {
    const lane = ends.findIndex((end) => span.from >= end + gap);
    const chosen = lane === -1 ? ends.length : lane;
    if (chosen >= laneCount) {
      leftOut.push(span.item);
      continue;
    }
    ends[chosen] = span.to;
    placed.push({ ...span, lane: chosen });
  }
  return { placed, leftOut };
}

/** Ticks that keep at least `gap` pixels between them, the first of each crowd kept. */
export function spacedTicks(ticks: readonly number[], at: (tick: number) => number, gap: number): number[] {
  const kept: number[] = [];
  for (const tick of ticks) {
    const last = kept.at(-1);
    if (last === undefined || Math.abs(at(tick) - at(last)) >= gap) kept.push(tick);
  }
  return kept;
}
