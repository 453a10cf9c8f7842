import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  bordaCount,
  connectedComponents,
  fitAdditiveModel,
  InvalidScoreSheet,
  kendallTauB,
  rankByMean,
  rankDescending,
  reviewerLeniency,
  sheetFromTable,
  spearmanRho,
  summariseScores,
  type ScoreSheet,
} from './index.js';

/** Scores as given in a panel: 0 to 10 in half steps. */
const aScore = fc.integer({ min: 0, max: 20 }).map((halves) => halves / 2);
const aTable = fc
  .record({ proposals: fc.integer({ min: 1, max: 12 }), reviewers: fc.integer({ min: 1, max: 6 }) })
  .chain(({ proposals, reviewers }) =>
    fc.array(fc.array(fc.option(aScore, { nil: null, freq: 3 }), { minLength: reviewers, maxLength: reviewers }), {
      minLength: proposals,
      maxLength: proposals,
    }),
  );
const aFullTable = fc
  .record({ proposals: fc.integer({ min: 2, max: 10 }), reviewers: fc.integer({ min: 2, max: 6 }) })
  .chain(({ proposals, reviewers }) =>
    fc.array(fc.array(aScore, { minLength: reviewers, maxLength: reviewers }), {
      minLength: proposals,
      maxLength: proposals,
    }),
  );

describe('additive model', () => {
  it('keeps adjusted differences within a component when a constant is added to one reviewer', () => {
    fc.assert(
      fc.property(aTable, fc.integer({ min: 0, max: 5 }), aScore, (table, chosen, constant) => {
        const shifted = table.map((row) =>
          row.map((score, reviewer) => (score !== null && reviewer === chosen ? score + constant : score)),
        );
        const before = fitAdditiveModel(sheetFromTable(table));
        const after = fitAdditiveModel(sheetFromTable(shifted));
        for (const { proposals } of before.components) {
          const [first = 0, ...others] = proposals;
          for (const other of others) {
            const difference =
              (before.adjustedScores[other] ?? Number.NaN) - (before.adjustedScores[first] ?? Number.NaN);
            expect(
              (after.adjustedScores[other] ?? Number.NaN) - (after.adjustedScores[first] ?? Number.NaN),
            ).toBeCloseTo(difference, 9);
          }
        }
      }),
    );
  });

  it('does not depend on the order of proposals, of reviewers or of scores', () => {
    fc.assert(
      fc.property(aTable, (table) => {
        const sheet = sheetFromTable(table);
        const reversed: ScoreSheet = {
          ...sheet,
          scores: sheet.scores
            .map(({ proposal, reviewer, score }) => ({
              proposal: sheet.proposalCount - 1 - proposal,
              reviewer: sheet.reviewerCount - 1 - reviewer,
              score,
            }))
            .reverse(),
        };
        const forward = fitAdditiveModel(sheet);
        const backward = fitAdditiveModel(reversed);
        forward.adjustedScores.forEach((value, index) => {
          const other = backward.adjustedScores[sheet.proposalCount - 1 - index];
          if (value === undefined) expect(other).toBeUndefined();
          else expect(other).toBeCloseTo(value, 9);
        });
      }),
    );
  });

  it('equals the mean when everybody scored everything', () => {
    fc.assert(
      fc.property(aFullTable, (table) => {
        const { adjustedScores } = fitAdditiveModel(sheetFromTable(table));
        table.forEach((row, index) =>
          expect(adjustedScores[index]).toBeCloseTo(summariseScores(row).mean ?? Number.NaN, 9),
        );
      }),
    );
  });

  it('has offsets that add up to zero and residuals that are orthogonal to every reviewer and proposal', () => {
    fc.assert(
      fc.property(aTable, (table) => {
        const sheet = sheetFromTable(table);
        const model = fitAdditiveModel(sheet);
        for (const { reviewers } of model.components) {
          expect(
            reviewers.reduce((sum, reviewer) => sum + (model.reviewerOffsets[reviewer] ?? Number.NaN), 0),
          ).toBeCloseTo(0, 9);
        }
        const byReviewer = new Map<number, number>();
        const byProposal = new Map<number, number>();
        for (const { proposal, reviewer, score } of sheet.scores) {
          const residual =
            score - (model.adjustedScores[proposal] ?? Number.NaN) - (model.reviewerOffsets[reviewer] ?? Number.NaN);
          byReviewer.set(reviewer, (byReviewer.get(reviewer) ?? 0) + residual);
          byProposal.set(proposal, (byProposal.get(proposal) ?? 0) + residual);
        }
        for (const sum of [...byReviewer.values(), ...byProposal.values()]) expect(sum).toBeCloseTo(0, 8);
      }),
    );
  });

  it('keeps disconnected groups apart', () => {
    const sheet = sheetFromTable([
      [8, null],
      [null, 3],
      [7, null],
    ]);
    expect(connectedComponents(sheet)).toEqual([
      { proposals: [0, 2], reviewers: [0] },
      { proposals: [1], reviewers: [1] },
    ]);
    expect(fitAdditiveModel(sheet).isComparable).toBe(false);
  });

  it('answers an empty sheet with nothing', () => {
    expect(fitAdditiveModel({ proposalCount: 2, reviewerCount: 0, scores: [] })).toMatchObject({
      adjustedScores: [undefined, undefined],
      components: [],
      isComparable: true,
    });
  });
});

describe('score sheets', () => {
  it.each<[string, ScoreSheet]>([
    ['an unknown proposal', { proposalCount: 1, reviewerCount: 1, scores: [{ proposal: 1, reviewer: 0, score: 5 }] }],
    ['an unknown reviewer', { proposalCount: 1, reviewerCount: 1, scores: [{ proposal: 0, reviewer: -1, score: 5 }] }],
    ['no number', { proposalCount: 1, reviewerCount: 1, scores: [{ proposal: 0, reviewer: 0, score: Number.NaN }] }],
    [
      'a score given twice',
      {
        proposalCount: 1,
        reviewerCount: 1,
        scores: [
          { proposal: 0, reviewer: 0, score: 5 },
          { proposal: 0, reviewer: 0, score: 6 },
        ],
      },
    ],
  ])('are refused with %s', (_, sheet) => {
    expect(() => fitAdditiveModel(sheet)).toThrow(InvalidScoreSheet);
    expect(() => reviewerLeniency(sheet)).toThrow(InvalidScoreSheet);
    expect(() => bordaCount(sheet)).toThrow(InvalidScoreSheet);
  });
});

describe('leniency shown as information', () => {
  it('is the reviewer’s mean against the panel’s', () => {
    // By hand: the panel mean of 8, 6, 4, 2 is 5; the first reviewer gave 8 and 4, the second 6 and 2, the third nothing.
    const offsets = reviewerLeniency(
      sheetFromTable([
        [8, 6, null],
        [4, 2, null],
      ]),
    ).map(({ offset }) => offset);
    expect(offsets).toEqual([1, -1, undefined]);
  });
});

describe('ranking by mean', () => {
  it('shares ranks among equal means and puts what has no score last', () => {
    const rows = rankByMean([
      { proposalId: 'e', scores: [] },
      { proposalId: 'd', scores: [5] },
      { proposalId: 'c', scores: [7, 8] },
      { proposalId: 'b', scores: [9, 6] },
      { proposalId: 'a', scores: [9] },
    ]);
    expect(rows.map(({ proposalId, rank, isTied }) => [proposalId, rank, isTied])).toEqual([
      ['a', 1, false],
      ['b', 2, true],
      ['c', 2, true],
      ['d', 4, false],
      ['e', undefined, false],
    ]);
    expect(rows[1]).toMatchObject({ count: 2, mean: 7.5, median: 7.5, lowest: 6, highest: 9 });
    expect(rows[1]?.spread).toBeCloseTo(Math.sqrt(4.5), 12);
    expect(rows[4]).toMatchObject({
      count: 0,
      mean: undefined,
      median: undefined,
      spread: undefined,
      lowest: undefined,
    });
  });

  it('gives the same list in whatever order proposals and scores arrive', () => {
    fc.assert(
      fc.property(fc.array(fc.array(aScore, { maxLength: 6 }), { maxLength: 15 }), (scores) => {
        const proposals = scores.map((list, index) => ({ proposalId: `p${index}`, scores: list }));
        const shuffled = [...proposals]
          .reverse()
          .map(({ proposalId, scores: list }) => ({ proposalId, scores: [...list].reverse() }));
        expect(rankByMean(shuffled)).toEqual(rankByMean(proposals));
      }),
    );
  });

  it('gives ranks that count the better ones, and average ranks that keep the sum', () => {
    fc.assert(
      fc.property(fc.array(aScore, { maxLength: 30 }), (values) => {
        rankDescending(values, 'competition').forEach((rank, index) => {
          expect(rank).toBe(1 + values.filter((value) => value > (values[index] ?? 0)).length);
        });
        const sum = rankDescending(values, 'average').reduce((total: number, rank) => total + (rank ?? 0), 0);
        expect(sum).toBe((values.length * (values.length + 1)) / 2);
      }),
    );
  });

  it('ties means that differ by rounding only', () => {
    expect(rankDescending([0.1 + 0.2, 0.3], 'competition')).toEqual([1, 1]);
  });
});

describe('Borda points', () => {
  it('are unchanged by any stretching of a reviewer’s scale and hand out n(n−1)/2 points per reviewer', () => {
    fc.assert(
      fc.property(aFullTable, (table) => {
        const stretched = table.map((row) => row.map((score) => score ** 3 + 1));
        const { points } = bordaCount(sheetFromTable(table));
        expect(bordaCount(sheetFromTable(stretched)).points).toEqual(points);
        const n = table.length;
        expect(points.reduce((sum, value) => sum + value, 0)).toBeCloseTo(
          ((table[0]?.length ?? 0) * n * (n - 1)) / 2,
          9,
        );
      }),
    );
  });
});

describe('rank correlations', () => {
  it('are 1 with themselves, −1 reversed, and symmetric', () => {
    const distinct = fc.uniqueArray(fc.integer({ min: -1000, max: 1000 }), { minLength: 2, maxLength: 20 });
    fc.assert(
      fc.property(distinct, (values) => {
        const reversed = values.map((value) => -value);
        for (const correlation of [kendallTauB, spearmanRho]) {
          expect(correlation(values, values)).toBeCloseTo(1, 12);
          expect(correlation(values, reversed)).toBeCloseTo(-1, 12);
        }
      }),
    );
    fc.assert(
      fc.property(fc.array(fc.tuple(aScore, aScore), { minLength: 2, maxLength: 20 }), (pairs) => {
        const x = pairs.map(([a]) => a);
        const y = pairs.map(([, b]) => b);
        expect(kendallTauB(x, y)).toBe(kendallTauB(y, x));
      }),
    );
  });

  it('refuse lists of different lengths and what is not a number', () => {
    expect(() => kendallTauB([1], [1, 2])).toThrow(RangeError);
    expect(() => spearmanRho([1, Number.NaN], [1, 2])).toThrow(RangeError);
  });
});
