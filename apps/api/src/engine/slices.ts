import { setImmediate as nextTurn } from 'node:timers/promises';

/** Longest that one slice keeps other requests waiting. */
const SLICE_MS = 20;

/**
 * Maps many rows, letting other requests have their turn every twenty milliseconds: what thousands of rows need at once would
 * keep everybody waiting.
 */
export async function mapInSlices<Row, Result>(
  rows: readonly Row[],
  work: (row: Row, index: number) => Result,
): Promise<Result[]> {
  const results: Result[] = [];
  let sliceEnd = performance.now() + SLICE_MS;
  for (const [index, row] of rows.entries()) {
    results.push(work(row, index));
    if (performance.now() < sliceEnd) continue;
    await nextTurn();
    sliceEnd = performance.now() + SLICE_MS;
  }
  return results;
}

/** Runs `work` on one batch of rows after the other, with a turn for other requests in between. */
export async function inBatches<Row>(
  rows: readonly Row[],
  size: number,
  work: (batch: readonly Row[]) => Promise<unknown>,
): Promise<void> {
  for (let start = 0; start < rows.length; start += size) {
    if (start > 0) await nextTurn();
    await work(rows.slice(start, start + size));
  }
}
