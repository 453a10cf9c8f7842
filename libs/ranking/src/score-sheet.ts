/** One reviewer's score of one proposal. Proposals and reviewers are numbered from 0; which is which is the caller's knowledge. */
export interface SheetScore {
  readonly proposal: number;
  readonly reviewer: number;
  /** Higher is better. */
  readonly score: number;
}

/** The scores of a panel: any reviewer may have scored any of the proposals, once. */
export interface ScoreSheet {
  readonly proposalCount: number;
  readonly reviewerCount: number;
  readonly scores: readonly SheetScore[];
}

/** A score that cannot be part of a sheet: unknown proposal or reviewer, not a finite number, or given twice. */
export class InvalidScoreSheet extends RangeError {
  override readonly name = 'InvalidScoreSheet';
}

/** A sheet from a table: one row per proposal, one column per reviewer, null where there is no score. */
export function sheetFromTable(table: readonly (readonly (number | null)[])[]): ScoreSheet {
  const reviewerCount = table.reduce((most, row) => Math.max(most, row.length), 0);
  const scores = table.flatMap((row, proposal) =>
    row.flatMap((score, reviewer) => (score === null ? [] : [{ proposal, reviewer, score }])),
  );
  return { proposalCount: table.length, reviewerCount, scores };
}

/** @throws {InvalidScoreSheet} unless every score is finite, belongs to the sheet, and is the only one of its proposal and reviewer */
export function requireValidSheet({ proposalCount, reviewerCount, scores }: ScoreSheet): void {
  const seen = new Set<number>();
  for (const { proposal, reviewer, score } of scores) {
    if (!isIndex(proposal, proposalCount))
      throw new InvalidScoreSheet(`Proposal ${proposal} is not one of ${proposalCount}.`);
    if (!isIndex(reviewer, reviewerCount))
      throw new InvalidScoreSheet(`Reviewer ${reviewer} is not one of ${reviewerCount}.`);
    if (!Number.isFinite(score))
      throw new InvalidScoreSheet(`The score of proposal ${proposal} by reviewer ${reviewer} is ${score}.`);
    const key = proposal * reviewerCount + reviewer;
    if (seen.has(key)) throw new InvalidScoreSheet(`Reviewer ${reviewer} has scored proposal ${proposal} twice.`);
    seen.add(key);
  }
}

export function scoresByProposal({ proposalCount, scores }: ScoreSheet): SheetScore[][] {
  const groups = Array.from({ length: proposalCount }, (): SheetScore[] => []);
  for (const score of scores) groups[score.proposal]?.push(score);
  return groups;
}

export function scoresByReviewer({ reviewerCount, scores }: ScoreSheet): SheetScore[][] {
  const groups = Array.from({ length: reviewerCount }, (): SheetScore[] => []);
  for (const score of scores) groups[score.reviewer]?.push(score);
  return groups;
}

function isIndex(value: number, count: number): boolean {
  return Number.isInteger(value) && value >= 0 && value < count;
}
