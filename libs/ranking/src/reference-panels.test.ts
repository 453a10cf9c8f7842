import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  bordaCount,
  fitAdditiveModel,
  kendallTauB,
  kendallW,
  overlapCorrection,
  rankDescending,
  reviewerLeniency,
  sheetFromTable,
  spearmanRho,
  standardiseScores,
  summariseScores,
} from './index.js';

type Numbers = readonly (number | null)[];

interface Ranks {
  readonly average: Numbers;
  readonly competition: Numbers;
}

interface ReferencePanel {
  readonly id: string;
  readonly scores: readonly Numbers[];
  readonly raw_mean: Numbers;
  readonly raw_sd_ddof1: Numbers;
  readonly raw_rank: Ranks;
  readonly reviewers: readonly { n: number; mean: number; sd_ddof1: number | null }[];
  readonly z: readonly Numbers[];
  readonly z_mean_unusable_as_zero: Numbers;
  readonly z_mean_unusable_left_out: Numbers;
  readonly z_rank_unusable_left_out: Ranks;
  readonly overlap_offset: Numbers;
  readonly overlap_corrected_mean: Numbers;
  readonly overlap_rank: Ranks;
  readonly additive: {
    readonly adjusted_score: Numbers;
    readonly adjusted_score_se: Numbers;
    readonly reviewer_offset: Numbers;
    readonly proposal_component: readonly number[];
    readonly reviewer_component: readonly number[];
    readonly components: readonly {
      proposals: number[];
      reviewers: number[];
      scores: number;
      degrees_of_freedom: number;
      rss: number;
      residual_sd: number | null;
    }[];
    readonly comparable_across_components: boolean;
  };
  readonly additive_rank: Ranks | null;
  readonly additive_rank_within_component: readonly { proposals: number[]; rank: Ranks }[];
  readonly borda_points: Numbers;
  readonly borda_mean_normalised: Numbers;
  readonly kendall_W: number | null;
}

const reference = JSON.parse(
  readFileSync(new URL('../../../tests/reference/review.json', import.meta.url), 'utf8'),
) as {
  readonly panels: readonly ReferencePanel[];
  readonly rank_correlation: readonly {
    x: number[];
    y: number[];
    kendall_tau_b: number | null;
    spearman_rho: number | null;
  }[];
};

/** 1e-9 absolute, as the reference asks: its own least squares agree with exact rational arithmetic to 4e-14. */
function expectClose(found: readonly (number | undefined)[], expected: Numbers): void {
  expect(found).toHaveLength(expected.length);
  expected.forEach((value, index) => {
    const mine = found[index];
    if (value === null) expect(mine).toBeUndefined();
    else expect(Math.abs((mine ?? Number.NaN) - value)).toBeLessThan(1e-9);
  });
}

function expectRanks(values: readonly (number | undefined)[], expected: Ranks): void {
  const toNull = (ranks: readonly (number | undefined)[]): Numbers => ranks.map((rank) => rank ?? null);
  expect(toNull(rankDescending(values, 'average'))).toEqual(expected.average);
  expect(toNull(rankDescending(values, 'competition'))).toEqual(expected.competition);
}

it('has eleven panels to compare with', () => {
  expect(reference.panels).toHaveLength(11);
  expect(reference.rank_correlation.length).toBeGreaterThan(7);
});

describe.each(reference.panels)('panel $id', (panel) => {
  const sheet = sheetFromTable(panel.scores);

  it('has the raw means, spreads and ranks', () => {
    const summaries = panel.scores.map((row) => summariseScores(row.filter((score) => score !== null)));
    const means = summaries.map(({ mean }) => mean);
    expectClose(means, panel.raw_mean);
    expectClose(
      summaries.map(({ spread }) => spread),
      panel.raw_sd_ddof1,
    );
    expectRanks(means, panel.raw_rank);
  });

  it('has the reviewers’ means, spreads and counts', () => {
    const reviewers = reviewerLeniency(sheet);
    expect(reviewers.map(({ scoreCount }) => scoreCount)).toEqual(panel.reviewers.map(({ n }) => n));
    expectClose(
      reviewers.map(({ mean }) => mean),
      panel.reviewers.map(({ mean }) => mean),
    );
    expectClose(
      reviewers.map(({ spread }) => spread),
      panel.reviewers.map(({ sd_ddof1 }) => sd_ddof1),
    );
  });

  it('has the z-scores under both rules', () => {
    const asAverage = standardiseScores(sheet, 'as-average');
    expectClose(
      asAverage.zScores,
      panel.z.flat().filter((z) => z !== null),
    );
    expectClose(asAverage.means, panel.z_mean_unusable_as_zero);
    const leftOut = standardiseScores(sheet, 'left-out');
    expectClose(leftOut.means, panel.z_mean_unusable_left_out);
    expectRanks(leftOut.means, panel.z_rank_unusable_left_out);
  });

  it('has the overlap offsets and corrected means', () => {
    const { offsets, correctedMeans } = overlapCorrection(sheet);
    expectClose(offsets, panel.overlap_offset);
    expectClose(correctedMeans, panel.overlap_corrected_mean);
    expectRanks(correctedMeans, panel.overlap_rank);
  });

  it('has the additive model with its standard errors and components', () => {
    const model = fitAdditiveModel(sheet);
    const { additive } = panel;
    expectClose(model.adjustedScores, additive.adjusted_score);
    expectClose(model.standardErrors, additive.adjusted_score_se);
    expectClose(model.reviewerOffsets, additive.reviewer_offset);
    expect(model.proposalComponents.map((component) => component ?? -1)).toEqual(additive.proposal_component);
    expect(model.reviewerComponents.map((component) => component ?? -1)).toEqual(additive.reviewer_component);
    expect(model.isComparable).toBe(additive.comparable_across_components);
    expect(model.components).toHaveLength(additive.components.length);
    additive.components.forEach((expected, index) => {
      const component = model.components[index];
      expect(component).toMatchObject({
        proposals: expected.proposals,
        reviewers: expected.reviewers,
        scoreCount: expected.scores,
        degreesOfFreedom: expected.degrees_of_freedom,
      });
      expectClose(
        [component?.residualSumOfSquares, component?.residualStandardDeviation],
        [expected.rss, expected.residual_sd],
      );
    });
    if (panel.additive_rank !== null) expectRanks(model.adjustedScores, panel.additive_rank);
    for (const { proposals, rank } of panel.additive_rank_within_component) {
      expectRanks(
        proposals.map((proposal) => model.adjustedScores[proposal]),
        rank,
      );
    }
  });

  it('has the Borda points and the concordance', () => {
    const { points, normalisedMeans } = bordaCount(sheet);
    expectClose(points, panel.borda_points);
    expectClose(normalisedMeans, panel.borda_mean_normalised);
    expectClose([kendallW(sheet)], [panel.kendall_W]);
  });
});

describe('rank correlations', () => {
  it.each(reference.rank_correlation)('of $x and $y', ({ x, y, kendall_tau_b, spearman_rho }) => {
    expectClose([kendallTauB(x, y), spearmanRho(x, y)], [kendall_tau_b, spearman_rho]);
  });
});
