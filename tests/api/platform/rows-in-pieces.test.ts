import { text } from 'node:stream/consumers';
import { setImmediate as nextTurn } from 'node:timers/promises';
import { describe, expect, it } from 'vitest';
import { rowsInPieces } from '../../../apps/api/src/platform/rows-in-pieces.js';

describe('an answer written in pieces', () => {
  it('is the JSON that it would be at once, whatever the number of rows', async () => {
    for (const rowCount of [0, 1, 999, 1000, 1001, 3500]) {
      const rows = Array.from({ length: rowCount }, (_, index) => ({ index, text: '],[ "é"', none: null }));
      for (const answer of [{ title: 'A "title"', rows }, { rows }]) {
        expect(await text(rowsInPieces(answer).getStream())).toBe(JSON.stringify(answer));
      }
    }
  });

  it('gives others a turn in between', async () => {
    let isWritten = false;
    let turnCount = 0;
    const written = text(rowsInPieces({ rows: new Array(50_000).fill({ redshift: 1 }) }).getStream());
    const end = written.then(() => (isWritten = true));
    while (!isWritten) {
      await nextTurn();
      turnCount += 1;
    }
    await end;
    expect(turnCount).toBeGreaterThan(40);
  });
});
