import type {
  ApplySetup,
  ApplySetupResult,
  Observation,
  ObservationListQuery,
  ObservationPatch,
  TimeRequest,
} from '@faintward/contracts/observations';
import type { Goal } from '@faintward/contracts/estimates';
import { Injectable } from '@nestjs/common';
import { canonicalJson } from '../../engine/canonical-json.js';
import { ProposalSpectra } from '../../engine/proposal-spectra.service.js';
import { goalFaults } from '../../engine/estimates.js';
import { inBatches, mapInSlices } from '../../engine/slices.js';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, invalidField, notFound, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { toPage } from '../../platform/pagination.js';
import { validationFailed } from '../../platform/validation.js';
import { FacilitiesReadModel, type ModeSetup } from '../facilities/facilities.read-model.js';
import { ProposalAccess, type ProposalForMember } from '../proposals/proposal-access.service.js';
import { type StoredTargetInputs, TargetsReadModel } from '../targets/targets.read-model.js';
import { type EstimateMemo, ObservationEstimates, type ObservationPlan } from './observation-estimates.service.js';
import { type NewObservationRow, ObservationsQueries } from './observations.queries.js';
import { ObservationsReadModel } from './observations.read-model.js';

/** Rows in one statement: keeps its one JSON parameter small, and the embedded database from keeping others waiting. */
const BATCH_SIZE = 150;

@Injectable()
export class ObservationsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: ObservationsQueries,
    private readonly readModel: ObservationsReadModel,
    private readonly estimates: ObservationEstimates,
    private readonly targets: TargetsReadModel,
    private readonly facilities: FacilitiesReadModel,
    private readonly spectra: ProposalSpectra,
    private readonly history: HistoryService,
  ) {}

  async list(actor: Actor, proposalId: string, query: ObservationListQuery) {
    await this.access.requireRead(actor, proposalId);
    const { rows, rowCount } = await this.readModel.listPage(proposalId, query);
    return toPage(rows, rowCount, query);
  }

  async timeRequest(actor: Actor, proposalId: string): Promise<TimeRequest> {
    await this.access.requireRead(actor, proposalId);
    return this.readModel.timeRequest(proposalId);
  }

  /** The same plan for many targets, estimated at once. */
  async apply(actor: Actor, proposalId: string, input: ApplySetup): Promise<ApplySetupResult> {
    const wanted = input.targetIds === 'all' ? 'all' : [...new Set(input.targetIds)];
    const memo: EstimateMemo = new Map();
    // Estimated before the transaction begins, in which only what somebody changes meanwhile is estimated again.
    await this.estimateAll(
      await this.access.requireTargets(actor, proposalId),
      await this.getMode(input.modeId, input.goal),
      input,
      await this.targets.listInputs(proposalId, wanted),
      memo,
    );
    return this.database.transaction(async () => {
      const proposal = await this.access.requireTargetsForChange(actor, proposalId);
      const mode = await this.getMode(input.modeId, input.goal);
      const targets = await this.targets.listInputs(proposalId, wanted);
      if (wanted === 'all' && targets.length === 0) {
        throw new DomainError('wrong-state', 'This proposal has no targets yet: add targets first.');
      }
      if (input.targetIds !== 'all') requireAll(input.targetIds, new Set(targets.map(({ targetId }) => targetId)));
      const { goal, conditions, repeatCount, modeId } = input;
      const rows = await this.estimateAll(proposal, mode, input, targets, memo);
      const replacedCount = input.replaceSameMode
        ? await this.queries.deleteOfTargets(
            proposalId,
            modeId,
            targets.map(({ targetId }) => targetId),
          )
        : 0;
      await inBatches(rows, BATCH_SIZE, (batch) =>
        this.queries.insertMany(proposalId, { modeId, goal, conditions, repeatCount }, batch),
      );
      const [only] = targets;
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'observation',
        subjectId: modeId,
        subjectName:
          targets.length === 1 && only !== undefined
            ? `${only.name}, ${mode.instrumentName} ${mode.modeName}`
            : `${targets.length} targets, ${mode.instrumentName} ${mode.modeName}`,
        action: replacedCount > 0 ? 'changed' : 'created',
        details: {
          goal: { before: null, after: goal },
          conditions: { before: null, after: conditions },
          repeatCount: { before: null, after: repeatCount },
          targetCount: { before: null, after: targets.length },
          replacedCount: { before: null, after: replacedCount },
        },
      });
      await this.access.touch(proposalId);
      return {
        createdCount: rows.length,
        replacedCount,
        feasibleCount: rows.filter(({ totalSeconds }) => totalSeconds !== null).length,
        infeasibleCount: rows.filter(({ estimate }) => estimate?.outcome === 'infeasible').length,
        lackingCount: rows.filter(({ estimate }) => estimate === null).length,
        totalSeconds: rows.reduce((sum, row) => sum + (row.totalSeconds ?? 0), 0),
      };
    });
  }

  async update(
    actor: Actor,
    proposalId: string,
    observationId: string,
    version: number,
    patch: ObservationPatch,
  ): Promise<Observation> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requireTargetsForChange(actor, proposalId);
      const before = await this.queries.findLocked(proposalId, observationId);
      if (before === undefined) throw notFound('observation');
      if (before.version !== version) throw staleVersion(await this.get(proposalId, observationId));
      const plan = {
        modeId: patch.modeId ?? before.modeId,
        goal: patch.goal ?? before.goal,
        conditions: patch.conditions ?? before.conditions,
        repeatCount: patch.repeatCount ?? before.repeatCount,
      };
      const mode = await this.getMode(plan.modeId, plan.goal, before.modeId);
      const [target] = await this.targets.listInputs(proposalId, [before.targetId]);
      if (target === undefined) throw new Error(`Observation ${observationId} has no target.`);
      const uploaded = await this.spectra.ofLights(proposalId, [target.light]);
      const columns = this.estimates.columnsFor(mode, proposal.cosmology, plan, uploaded)(target);
      await this.queries.update(observationId, { ...plan, ...columns });
      const { modeId, goal, conditions, repeatCount } = before;
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'observation',
        subjectId: observationId,
        subjectName: `${target.name}, ${mode.instrumentName} ${mode.modeName}`,
        action: 'changed',
        details: differences({ modeId, goal, conditions, repeatCount }, plan),
      });
      await this.access.touch(proposalId);
      return this.get(proposalId, observationId);
    });
  }

  /** Those of the given observations that are still there. */
  async remove(actor: Actor, proposalId: string, observationIds: readonly string[]) {
    return this.database.transaction(async () => {
      await this.access.requireTargetsForChange(actor, proposalId);
      const targetIds = await this.queries.deleteByIds(proposalId, observationIds);
      if (targetIds.length > 0) {
        const [name] = targetIds.length === 1 ? await this.targets.listInputs(proposalId, targetIds) : [];
        await this.history.record({
          personId: actor.personId,
          scope: 'proposal',
          scopeId: proposalId,
          subject: 'observation',
          subjectId: proposalId,
          subjectName: name?.name ?? `${targetIds.length} observations`,
          action: 'removed',
          details: { observationCount: { before: targetIds.length, after: 0 } },
        });
        await this.access.touch(proposalId);
      }
      return { removedCount: targetIds.length };
    });
  }

  /** Versions grow with every change: what stands in the memo under all of them is still right. */
  private async estimateAll(
    { proposalId, cosmology }: ProposalForMember,
    mode: ModeSetup,
    plan: ObservationPlan,
    targets: readonly StoredTargetInputs[],
    memo: EstimateMemo,
  ): Promise<NewObservationRow[]> {
    const context = `${mode.configurationVersion} ${canonicalJson(cosmology)}`;
    const uploaded = await this.spectra.ofLights(
      proposalId,
      targets.map(({ light }) => light),
    );
    const columnsOf = this.estimates.columnsFor(mode, cosmology, plan, uploaded);
    return mapInSlices(targets, (target) => {
      const key = `${target.targetId} ${target.version} ${context}`;
      const columns = memo.get(key) ?? columnsOf(target);
      memo.set(key, columns);
      return { targetId: target.targetId, ...columns };
    });
  }

  private async get(proposalId: string, observationId: string): Promise<Observation> {
    const observation = await this.readModel.find(proposalId, observationId);
    if (observation === undefined) throw notFound('observation');
    return observation;
  }

  /** @param keptModeId a mode that the observation has already: it may be kept when it is no longer offered */
  private async getMode(modeId: string, goal: Goal, keptModeId?: string): Promise<ModeSetup> {
    const mode = await this.facilities.findMode(modeId);
    if (mode === undefined || (!mode.isOffered && modeId !== keptModeId)) {
      throw invalidField('modeId', 'There is no such instrument mode, or it is not offered.');
    }
    const faults = goalFaults(goal, mode.configuration);
    if (faults.length > 0) throw validationFailed(faults);
    return mode;
  }
}

function requireAll(targetIds: readonly string[], known: ReadonlySet<string>): void {
  const faults = targetIds.flatMap((targetId, index) =>
    known.has(targetId) ? [] : [{ path: `targetIds.${index}`, message: 'This target is not in the list any more.' }],
  );
  if (faults.length > 0) throw validationFailed(faults);
}
