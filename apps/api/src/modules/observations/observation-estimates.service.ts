import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { Conditions, Estimate, Goal } from '@faintward/contracts/estimates';
import type { Extent, Light } from '@faintward/contracts/light';
import { Injectable } from '@nestjs/common';
import { canonicalJson } from '../../engine/canonical-json.js';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { inBatches, mapInSlices } from '../../engine/slices.js';
import { estimator, type EstimateOutcome, type EstimateTarget } from '../../engine/estimates.js';
import { NO_UPLOADS, type UploadedSpectra } from '../../engine/light.js';
import { ProposalSpectra } from '../../engine/proposal-spectra.service.js';
import { FacilitiesReadModel, type ModeSetup } from '../facilities/facilities.read-model.js';
import { TargetsReadModel } from '../targets/targets.read-model.js';
import { ObservationsQueries } from './observations.queries.js';

export interface LitTarget {
  redshift: number;
  light: Light | null;
  extent: Extent;
}

export interface ObservationPlan {
  goal: Goal;
  conditions: Conditions;
  repeatCount: number;
}

/** What is stored of an estimate, beside the plan that it is of. */
export interface EstimateColumns {
  configurationVersion: number;
  estimate: Estimate | null;
  lacking: string | null;
  totalSeconds: number | null;
  openShutterSeconds: number | null;
}

/** Rows in one statement: keeps a parameter within a megabyte or two, and the embedded database from keeping others waiting. */
const BATCH_SIZE = 150;

/** Estimates that were worked out already, by what they depend on. */
export type EstimateMemo = Map<string, EstimateColumns>;

/** Estimates of stored observations. Whoever changes what they depend on calls it in the same transaction. */
@Injectable()
export class ObservationEstimates {
  constructor(
    private readonly queries: ObservationsQueries,
    private readonly facilities: FacilitiesReadModel,
    private readonly targets: TargetsReadModel,
    private readonly spectra: ProposalSpectra,
  ) {}

  /** A function from targets to what is stored of their estimates under one plan. */
  columnsFor(
    mode: ModeSetup,
    cosmology: CosmologyChoice,
    plan: ObservationPlan,
    uploaded: UploadedSpectra = NO_UPLOADS,
  ): (target: LitTarget) => EstimateColumns {
    const estimateOf = estimator({
      cosmology: chooseCosmology(cosmology),
      setup: { telescope: mode.telescope, site: mode.site, mode: mode.configuration },
      goal: plan.goal,
      conditions: plan.conditions,
      uploaded,
    });
    return ({ redshift, light, extent }) => {
      const outcome = light === null ? undefined : estimateOf({ redshift, light, extent } satisfies EstimateTarget);
      return toColumns(outcome, mode.configurationVersion, plan.repeatCount);
    };
  }

  /**
   * Computes the observations of some targets again, or of all targets of a proposal, with the configurations in force.
   *
   * @param memo what {@link prepare} worked out before the transaction
   * @returns the number of observations
   */
  async recompute(
    proposalId: string,
    cosmology: CosmologyChoice,
    targetIds: readonly string[] | 'all',
    memo: EstimateMemo = new Map(),
  ): Promise<number> {
    const changed = await this.compute(proposalId, cosmology, targetIds, memo);
    await inBatches(changed, BATCH_SIZE, (batch) => this.queries.updateEstimates(batch));
    return changed.length;
  }

  /** Works out what {@link recompute} will store, and stores nothing: for before the transaction. */
  async prepare(proposalId: string, cosmology: CosmologyChoice): Promise<EstimateMemo> {
    const memo: EstimateMemo = new Map();
    await this.compute(proposalId, cosmology, 'all', memo);
    return memo;
  }

  private async compute(
    proposalId: string,
    cosmology: CosmologyChoice,
    targetIds: readonly string[] | 'all',
    memo: EstimateMemo,
  ): Promise<(EstimateColumns & { observationId: string })[]> {
    const rows = await this.queries.listPlans(proposalId, targetIds);
    if (rows.length === 0) return [];
    const modeIds = [...new Set(rows.map(({ modeId }) => modeId))];
    const modes = new Map(
      (await this.facilities.listModes(modeIds.map((modeId) => ({ modeId })))).map((mode) => [mode.modeId, mode]),
    );
    const lit = new Map(
      (await this.targets.listInputs(proposalId, targetIds)).map((target) => [target.targetId, target]),
    );
    const uploaded = await this.spectra.ofLights(
      proposalId,
      [...lit.values()].map(({ light }) => light),
    );
    const byPlan = new Map<string, (target: LitTarget) => EstimateColumns>();
    return mapInSlices(rows, (row) => {
      const mode = modes.get(row.modeId);
      const target = lit.get(row.targetId);
      if (mode === undefined || target === undefined)
        throw new Error(`Observation ${row.observationId} has lost its mode or target.`);
      // Versions grow with every change, so that what was worked out for these holds as long as they are the same.
      const memoKey = [row.observationId, row.version, target.version, mode.configurationVersion].join(' ');
      const known = memo.get(memoKey);
      if (known !== undefined) return { observationId: row.observationId, ...known };
      const planKey = canonicalJson([row.modeId, row.goal, row.conditions, row.repeatCount]);
      const columnsOf = byPlan.get(planKey) ?? this.columnsFor(mode, cosmology, row, uploaded);
      byPlan.set(planKey, columnsOf);
      const columns = columnsOf(target);
      memo.set(memoKey, columns);
      return { observationId: row.observationId, ...columns };
    });
  }
}

function toColumns(
  outcome: EstimateOutcome | undefined,
  configurationVersion: number,
  repeatCount: number,
): EstimateColumns {
  const none = { configurationVersion, estimate: null, totalSeconds: null, openShutterSeconds: null };
  if (outcome === undefined) return { ...none, lacking: 'The target has no brightness yet.' };
  if (!outcome.ok) return { ...none, lacking: outcome.faults.map((fault) => explain(fault)).join(' ') };
  const { estimate } = outcome;
  if (estimate.outcome === 'infeasible') return { ...none, estimate, lacking: null };
  return {
    configurationVersion,
    estimate,
    lacking: null,
    totalSeconds: estimate.totalSeconds * repeatCount,
    openShutterSeconds: estimate.openShutterSeconds * repeatCount,
  };
}

/** Why a goal and a target do not go together, in words of the target's row rather than of a request. */
function explain({ path, message }: { path: string; message: string }): string {
  switch (path) {
    case 'goal.kind':
      return 'A goal of a line’s significance needs the brightness of a line.';
    case 'goal.per':
      return 'A ratio per square arcsecond needs an extended target.';
    default:
      return message;
  }
}
