/** τ = coefficient · ratio^power while ratio = λ_observed / λ_line is below `ratioBelow` (null: no bound). */
export interface LineBranch {
  readonly ratioBelow: number | null;
  readonly power: number;
  /** One for each line. */
  readonly coefficients: readonly number[];
}

/** One kind of absorber in all lines. Its branches stand in order of ratio; the first that applies counts. */
export interface LineSeries {
  readonly name: string;
  readonly branches: readonly LineBranch[];
}

/** coefficient · (1 + z)^redshiftPower · ratio^ratioPower, ratio = λ_observed / λ_limit. */
export interface ContinuumTerm {
  readonly coefficient: number;
  readonly redshiftPower: number;
  readonly ratioPower: number;
}

export interface ContinuumBranch {
  readonly ratioBelow: number | null;
  readonly terms: readonly ContinuumTerm[];
}

export interface ContinuumEpoch {
  readonly redshiftBelow: number | null;
  readonly branches: readonly ContinuumBranch[];
}

/** One kind of absorber beyond the Lyman limit: a sum of terms, by epoch and branch. The first that applies counts. */
export interface ContinuumSeries {
  readonly name: string;
  readonly epochs: readonly ContinuumEpoch[];
}

/** What the mean absorption by neutral hydrogen on the way is made of. */
export interface IntergalacticTable {
  readonly id: 'inoue2014' | 'madau1995';
  readonly lymanLimitNm: number;
  /** Descending, from Lyα to the last line before the limit. */
  readonly lineWavelengthsNm: readonly number[];
  readonly lineSeries: readonly LineSeries[];
  readonly continuum: readonly ContinuumSeries[];
  /** Lines of other elements, where the publication has them. */
  readonly metals?: LineSeries | undefined;
}

/** The branches of the epoch that a redshift belongs to. */
export function branchesAt({ epochs }: ContinuumSeries, redshift: number): readonly ContinuumBranch[] {
  return epochs.find(({ redshiftBelow }) => redshiftBelow === null || redshift < redshiftBelow)?.branches ?? [];
}
