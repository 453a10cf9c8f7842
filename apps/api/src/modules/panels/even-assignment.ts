export interface AssignmentProblem {
  /** In the order in which they are served. */
  proposalIds: readonly string[];
  /** In the order in which ties are broken. */
  reviewerIds: readonly string[];
  reviewersPerProposal: number;
  isConflicted: (proposalId: string, reviewerId: string) => boolean;
  /** Pairs that stand and are not moved; they count for the proposal and, where the reviewer is in `reviewerIds`, as load. */
  standing: readonly { proposalId: string; reviewerId: string }[];
}

export interface AssignmentSolution {
  /** The new pairs only. */
  pairs: { proposalId: string; reviewerId: string }[];
  /** Proposals that end with fewer reviewers than wanted. */
  shortProposalIds: string[];
}

/**
 * Gives every proposal its number of different reviewers without a conflict, and the reviewers loads that are as even as
 * the conflicts and the standing pairs allow: the sum of the squared loads is the least possible, so loads differ by at most
 * one wherever that can be. As many pairs are made as can be made. The same input gives the same pairs.
 *
 * Reviews are handed out one at a time. Each goes along an alternating path, on which reviewers pass one review on to
 * somebody freer, to the least loaded reviewer that such a path reaches: successive shortest paths for a flow whose costs are
 * convex in the loads. (For tasks of one reviewer each it is the optimal semi-matching of Harvey, Ladner, Lovász & Tamir 2006,
 * cited from memory; the tests compare with all possible assignments.)
 */
export function assignEvenly(problem: AssignmentProblem): AssignmentSolution {
  const { proposalIds, reviewerIds, reviewersPerProposal, isConflicted } = problem;
  const standing = new Map<string, Set<string>>(proposalIds.map((proposalId) => [proposalId, new Set<string>()]));
  const load = new Map<string, number>(reviewerIds.map((reviewerId) => [reviewerId, 0]));
  for (const { proposalId, reviewerId } of problem.standing) {
    standing.get(proposalId)?.add(reviewerId);
    if (load.has(reviewerId)) load.set(reviewerId, (load.get(reviewerId) ?? 0) + 1);
  }
  const added = new Map<string, Set<string>>(proposalIds.map((proposalId) => [proposalId, new Set<string>()]));
  const mayTake = (proposalId: string, reviewerId: string): boolean =>
    !isConflicted(proposalId, reviewerId) &&
    !(standing.get(proposalId)?.has(reviewerId) ?? false) &&
    !(added.get(proposalId)?.has(reviewerId) ?? false);
  const shortProposalIds: string[] = [];

  for (const proposalId of proposalIds) {
    for (let count = standing.get(proposalId)?.size ?? 0; count < reviewersPerProposal; count += 1) {
      const path = freestPath(proposalId);
      if (path === undefined) {
        shortProposalIds.push(proposalId);
        break;
      }
      for (const [index, step] of path.entries()) {
        const next = path[index + 1];
        if (next !== undefined) added.get(next.proposalId)?.delete(step.reviewerId);
        added.get(step.proposalId)?.add(step.reviewerId);
      }
      const last = path.at(-1)?.reviewerId ?? '';
      load.set(last, (load.get(last) ?? 0) + 1);
    }
  }

  return {
    pairs: proposalIds.flatMap((proposalId) =>
      reviewerIds
        .filter((reviewerId) => added.get(proposalId)?.has(reviewerId))
        .map((reviewerId) => ({ proposalId, reviewerId })),
    ),
    shortProposalIds,
  };

  /** Breadth first from a proposal: `[p→a, q→b]` means that `a` takes p and hands q over to `b`. */
  function freestPath(start: string): { proposalId: string; reviewerId: string }[] | undefined {
    const cameBy = new Map<string, { proposalId: string; from: string | undefined }>();
    const queue: string[] = [];
    const visit = (proposalId: string, from: string | undefined): void => {
      for (const reviewerId of reviewerIds) {
        if (cameBy.has(reviewerId) || !mayTake(proposalId, reviewerId)) continue;
        cameBy.set(reviewerId, { proposalId, from });
        queue.push(reviewerId);
      }
    };
    visit(start, undefined);
    for (let position = 0; position < queue.length; position += 1) {
      const reviewerId = queue[position] ?? '';
      for (const proposalId of proposalIds) {
        if (added.get(proposalId)?.has(reviewerId)) visit(proposalId, reviewerId);
      }
    }
    let freest: string | undefined;
    for (const reviewerId of queue) {
      if (freest === undefined || (load.get(reviewerId) ?? 0) < (load.get(freest) ?? 0)) freest = reviewerId;
    }
    if (freest === undefined) return undefined;
    const path: { proposalId: string; reviewerId: string }[] = [];
    for (let reviewerId: string | undefined = freest; reviewerId !== undefined;) {
      const step = cameBy.get(reviewerId);
      if (step === undefined) break;
      path.unshift({ proposalId: step.proposalId, reviewerId });
      reviewerId = step.from;
    }
    return path;
  }
}
