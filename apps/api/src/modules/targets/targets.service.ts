import {
  type CosmicTime,
  MAX_TARGET_COUNT,
  type NewTarget,
  type Target,
  type TargetInput,
  type TargetListQuery,
  type TargetPatch,
} from '@faintward/contracts/targets';
import { distanceRows } from '@faintward/cosmology';
import { writeDelimitedText } from '@faintward/tables';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { lightFaults } from '../../engine/light-faults.js';
import { ProposalSpectra } from '../../engine/proposal-spectra.service.js';
import { ProposalSkies } from '../../engine/proposal-sky.service.js';
import { computeTargetColumns } from '../../engine/target-columns.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, notFound, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { toPage } from '../../platform/pagination.js';
import { validationFailed } from '../../platform/validation.js';
import { ObservationEstimates } from '../observations/observation-estimates.service.js';
import { ProposalAccess, type ProposalForMember } from '../proposals/proposal-access.service.js';
import { completeInput, inputOf, patchedInput } from './target-inputs.js';
import { TargetRecomputation } from './target-recomputation.service.js';
import { EXPORT_COLUMNS, exportRow } from './targets-table.js';
import { TargetsQueries } from './targets.queries.js';
import { TargetsReadModel } from './targets.read-model.js';

/** Redshifts that the axis of cosmic time is marked with. */
const TICK_REDSHIFTS = [0, 0.5, 1, 2, 3, 4, 5, 6, 8, 10, 15, 20, 30];
/** Ages that it is marked with, as far as the universe is older. */
const TICK_AGES_GYR = [0.3, 0.5, 1, 2, 4, 6, 8, 10];

@Injectable()
export class TargetsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: TargetsQueries,
    private readonly readModel: TargetsReadModel,
    private readonly recomputation: TargetRecomputation,
    private readonly observations: ObservationEstimates,
    private readonly skies: ProposalSkies,
    private readonly spectra: ProposalSpectra,
    private readonly history: HistoryService,
  ) {}

  async list(actor: Actor, proposalId: string, query: TargetListQuery) {
    await this.access.requireRead(actor, proposalId);
    const { rows, rowCount } = await this.readModel.listPage(proposalId, query);
    return toPage(rows, rowCount, query);
  }

  async get(actor: Actor, proposalId: string, targetId: string): Promise<Target> {
    await this.access.requireRead(actor, proposalId);
    return this.getStored(proposalId, targetId);
  }

  async cosmicTime(actor: Actor, proposalId: string): Promise<CosmicTime> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const { model } = chooseCosmology(proposal.cosmology);
    const ticks = distanceRows(model, TICK_REDSHIFTS).flatMap(({ redshift, ageGyr }) =>
      ageGyr === undefined ? [] : [{ redshift, ageGyr }],
    );
    const ageTodayGyr = ticks[0]?.ageGyr ?? model.ageGyr(0);
    return {
      points: await this.readModel.cosmicTimePoints(proposalId),
      ticks,
      ageTicks: TICK_AGES_GYR.filter((ageGyr) => ageGyr < ageTodayGyr).map((ageGyr) => ({
        ageGyr,
        redshift: model.redshiftAtAgeGyr(ageGyr),
      })),
      ageTodayGyr,
    };
  }

  async exportCsv(actor: Actor, proposalId: string): Promise<{ fileName: string; text: string }> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const rows = await this.readModel.listAll(proposalId);
    return {
      fileName: `${proposal.label.replace(/[^\w-]/g, '_')}-targets.csv`,
      text: writeDelimitedText(EXPORT_COLUMNS, rows.map(exportRow)),
    };
  }

  async create(actor: Actor, proposalId: string, input: NewTarget): Promise<Target> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requireTargetsForChange(actor, proposalId);
      requireRoom((await this.readModel.count(proposalId)) + 1);
      const values = completeInput(input);
      const targetId = await this.queries.insert(proposalId, {
        ...values,
        position: (await this.queries.lastPosition(proposalId)) + 1,
        computed: await this.compute(proposal, values),
      });
      await this.recomputation.refreshDuplicates(proposalId);
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'target',
        subjectId: targetId,
        subjectName: values.name,
        action: 'created',
        details: differences<object>({}, values),
      });
      await this.access.touch(proposalId);
      return this.getStored(proposalId, targetId);
    });
  }

  /** Changes a target and, in the same transaction, everything that is computed from it. */
  async update(
    actor: Actor,
    proposalId: string,
    targetId: string,
    version: number,
    patch: TargetPatch,
  ): Promise<Target> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requireTargetsForChange(actor, proposalId);
      const stored = await this.queries.findLocked(proposalId, targetId);
      if (stored === undefined) throw notFound('target');
      if (stored.version !== version) throw staleVersion(await this.getStored(proposalId, targetId));
      const before = inputOf(stored);
      const after = patchedInput(before, patch);
      const details = differences(before, after);
      if (Object.keys(details).length === 0) return this.getStored(proposalId, targetId);
      await this.queries.update(targetId, { ...after, computed: await this.compute(proposal, after) });
      if ('redshift' in details || 'light' in details || 'extent' in details) {
        await this.observations.recompute(proposalId, proposal.cosmology, [targetId]);
      }
      if ('rightAscensionDeg' in details || 'declinationDeg' in details || 'name' in details) {
        await this.recomputation.refreshDuplicates(proposalId);
      }
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'target',
        subjectId: targetId,
        subjectName: after.name,
        action: 'changed',
        details,
      });
      await this.access.touch(proposalId);
      return this.getStored(proposalId, targetId);
    });
  }

  /** Removes those of the given targets that are still there, with their observations. */
  async remove(actor: Actor, proposalId: string, targetIds: readonly string[]) {
    return this.database.transaction(async () => {
      await this.access.requireTargetsForChange(actor, proposalId);
      const removed = await this.queries.delete(proposalId, targetIds);
      const [first] = removed;
      if (first !== undefined) {
        await this.recomputation.refreshDuplicates(proposalId);
        await this.history.record({
          personId: actor.personId,
          scope: 'proposal',
          scopeId: proposalId,
          subject: 'target',
          subjectId: removed.length === 1 ? first.targetId : proposalId,
          subjectName: removed.length === 1 ? first.name : `${removed.length} targets`,
          action: 'removed',
          details: { names: { before: removed.map(({ name }) => name), after: null } },
        });
        await this.access.touch(proposalId);
      }
      return { removedCount: removed.length };
    });
  }

  private async compute(proposal: ProposalForMember, values: TargetInput) {
    const sky = await this.skies.ofSemester(proposal.semesterId);
    const uploaded = await this.spectra.ofLights(proposal.proposalId, [values.light]);
    const faults = lightFaults({ ...values, uploaded });
    if (faults.length > 0) throw validationFailed(faults);
    const [computed] = await computeTargetColumns([values], chooseCosmology(proposal.cosmology), sky, uploaded);
    if (computed === undefined) throw new Error('A target got no columns.');
    return computed;
  }

  private async getStored(proposalId: string, targetId: string): Promise<Target> {
    const target = await this.readModel.find(proposalId, targetId);
    if (target === undefined) throw notFound('target');
    return target;
  }
}

/** @throws {DomainError} `conflict` when a list would become longer than allowed */
export function requireRoom(targetCount: number): void {
  if (targetCount <= MAX_TARGET_COUNT) return;
  throw new DomainError(
    'conflict',
    `A proposal holds at most ${MAX_TARGET_COUNT} targets; this would make it ${targetCount}. Nothing was stored.`,
  );
}
