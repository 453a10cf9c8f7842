import { describe, expect, it } from 'vitest';
import { type AssignmentProblem, assignEvenly } from '../../../apps/api/src/modules/panels/even-assignment.js';

function names(prefix: string, count: number): string[] {
  return Array.from({ length: count }, (_, index) => `${prefix}${index + 1}`);
}

function aProblem(overrides: Partial<AssignmentProblem> = {}): AssignmentProblem {
  return {
    proposalIds: names('p', 6),
    reviewerIds: names('r', 4),
    reviewersPerProposal: 2,
    isConflicted: () => false,
    standing: [],
    ...overrides,
  };
}

function loadsOf(problem: AssignmentProblem, pairs: readonly { reviewerId: string }[]): number[] {
  return problem.reviewerIds.map(
    (reviewerId) => [...pairs, ...problem.standing].filter((pair) => pair.reviewerId === reviewerId).length,
  );
}

/** Every way of choosing reviewers, and the best of them: most pairs, then the least sum of squared loads. */
function bestByTryingAll(problem: AssignmentProblem): { pairCount: number; squares: number } {
  const subsets = Array.from({ length: 2 ** problem.reviewerIds.length }, (_, bits) =>
    problem.reviewerIds.filter((_reviewer, index) => (bits >> index) % 2 === 1),
  ).filter((subset) => subset.length <= problem.reviewersPerProposal);
  let best = { pairCount: -1, squares: Infinity };
  const visit = (position: number, loads: Map<string, number>, pairCount: number): void => {
    const proposalId = problem.proposalIds[position];
    if (proposalId === undefined) {
      const squares = [...loads.values()].reduce((sum, load) => sum + load ** 2, 0);
      if (pairCount > best.pairCount || (pairCount === best.pairCount && squares < best.squares)) {
        best = { pairCount, squares };
      }
      return;
    }
    for (const subset of subsets) {
      if (subset.some((reviewerId) => problem.isConflicted(proposalId, reviewerId))) continue;
      const next = new Map(loads);
      for (const reviewerId of subset) next.set(reviewerId, (next.get(reviewerId) ?? 0) + 1);
      visit(position + 1, next, pairCount + subset.length);
    }
  };
  visit(0, new Map(problem.reviewerIds.map((reviewerId) => [reviewerId, 0])), 0);
  return best;
}

/** A multiplicative congruential generator with a stated seed, so that a failure can be repeated. */
function randomFrom(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48_271) % 2_147_483_647;
    return state / 2_147_483_647;
  };
}

describe('even assignment', () => {
  it('gives every proposal its number of different reviewers and everybody the same load', () => {
    const problem = aProblem();
    const { pairs, shortProposalIds } = assignEvenly(problem);
    expect(shortProposalIds).toEqual([]);
    expect(loadsOf(problem, pairs)).toEqual([3, 3, 3, 3]);
    for (const proposalId of problem.proposalIds) {
      const own = pairs.filter((pair) => pair.proposalId === proposalId).map((pair) => pair.reviewerId);
      expect(new Set(own).size).toBe(2);
    }
  });

  it('keeps loads within one of each other when they cannot be equal', () => {
    const problem = aProblem({ proposalIds: names('p', 7) });
    const loads = loadsOf(problem, assignEvenly(problem).pairs);
    expect(loads.reduce((sum, load) => sum + load, 0)).toBe(14);
    expect(Math.max(...loads) - Math.min(...loads)).toBe(1);
  });

  it('never pairs a conflict, and says which proposals fall short for it', () => {
    const isConflicted = (proposalId: string, reviewerId: string) => proposalId === 'p1' && reviewerId !== 'r1';
    const { pairs, shortProposalIds } = assignEvenly(aProblem({ isConflicted }));
    expect(pairs.filter((pair) => isConflicted(pair.proposalId, pair.reviewerId))).toEqual([]);
    expect(shortProposalIds).toEqual(['p1']);
    expect(pairs).toContainEqual({ proposalId: 'p1', reviewerId: 'r1' });
  });

  it('passes reviews on when the only free reviewer of a late proposal is already taken', () => {
    // Served in order and without second thoughts, p1 and p2 would take r1, and p3, which has nobody else, would overload it.
    const problem = aProblem({
      proposalIds: ['p1', 'p2', 'p3'],
      reviewerIds: ['r1', 'r2', 'r3'],
      reviewersPerProposal: 1,
      isConflicted: (proposalId, reviewerId) =>
        (proposalId === 'p3' && reviewerId !== 'r1') || (proposalId === 'p2' && reviewerId === 'r3'),
    });
    expect(loadsOf(problem, assignEvenly(problem).pairs)).toEqual([1, 1, 1]);
  });

  it('counts standing pairs and does not move them', () => {
    const standing = [
      { proposalId: 'p1', reviewerId: 'r1' },
      { proposalId: 'p2', reviewerId: 'r1' },
    ];
    const problem = aProblem({ proposalIds: ['p1', 'p2'], reviewerIds: ['r1', 'r2', 'r3'], standing });
    expect(assignEvenly(problem).pairs).toEqual([
      { proposalId: 'p1', reviewerId: 'r2' },
      { proposalId: 'p2', reviewerId: 'r3' },
    ]);
  });

  it('adds nothing to what is full, and nobody where nobody is', () => {
    const full = [
      { proposalId: 'p1', reviewerId: 'r1' },
      { proposalId: 'p1', reviewerId: 'r2' },
    ];
    expect(assignEvenly(aProblem({ proposalIds: ['p1'], standing: full }))).toEqual({
      pairs: [],
      shortProposalIds: [],
    });
    expect(assignEvenly(aProblem({ proposalIds: ['p1'], reviewerIds: [] }))).toEqual({
      pairs: [],
      shortProposalIds: ['p1'],
    });
  });

  it('gives the same answer to the same question', () => {
    expect(assignEvenly(aProblem())).toEqual(assignEvenly(aProblem()));
  });

  it('is as complete and as even as the best of all possible assignments, for random conflicts (seed 1 to 150)', () => {
    for (let seed = 1; seed <= 150; seed += 1) {
      const random = randomFrom(seed * 7919);
      const conflicts = new Set<string>();
      for (const proposalId of names('p', 4)) {
        for (const reviewerId of names('r', 4)) if (random() < 0.35) conflicts.add(`${proposalId} ${reviewerId}`);
      }
      const problem = aProblem({
        proposalIds: names('p', 4),
        isConflicted: (proposalId, reviewerId) => conflicts.has(`${proposalId} ${reviewerId}`),
      });
      const { pairs } = assignEvenly(problem);
      const squares = loadsOf(problem, pairs).reduce((sum, load) => sum + load ** 2, 0);
      expect({ seed, pairCount: pairs.length, squares }).toEqual({ seed, ...bestByTryingAll(problem) });
    }
  });
});
