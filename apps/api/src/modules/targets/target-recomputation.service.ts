import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { TargetComputed } from '@faintward/contracts/targets';
import { findCloseDuplicates } from '@faintward/astronomy';
import { Injectable } from '@nestjs/common';
import { chooseCosmology } from '../../engine/cosmologies.js';
import type { UploadedSpectra } from '../../engine/light.js';
import { ProposalSpectra } from '../../engine/proposal-spectra.service.js';
import { ProposalSkies } from '../../engine/proposal-sky.service.js';
import { inBatches } from '../../engine/slices.js';
import { computeTargetColumns, type SkyOfSemester } from '../../engine/target-columns.js';
import { type EstimateMemo, ObservationEstimates } from '../observations/observation-estimates.service.js';
import { DUPLICATE_RADIUS_ARCSEC } from './named-places.js';
import { TargetsQueries } from './targets.queries.js';
import { type StoredTargetInputs, TargetsReadModel } from './targets.read-model.js';

/** Rows in one statement: keeps its one JSON parameter small, and the embedded database from keeping others waiting. */
export const BATCH_SIZE = 250;

/** What {@link TargetRecomputation.prepareAll} worked out before the transaction. */
export interface PreparedRecomputation {
  sky: SkyOfSemester;
  columns: Map<string, TargetComputed>;
  estimates: EstimateMemo;
}

/** Keeps what is computed of targets in step with what it is computed from. Call it in the transaction of the change. */
@Injectable()
export class TargetRecomputation {
  constructor(
    private readonly queries: TargetsQueries,
    private readonly readModel: TargetsReadModel,
    private readonly skies: ProposalSkies,
    private readonly observations: ObservationEstimates,
    private readonly spectra: ProposalSpectra,
  ) {}

  /** Everything of a proposal: after a change of its cosmology, or to bring old results to this version of the engine. */
  async recomputeAll(
    proposalId: string,
    semesterId: string,
    cosmology: CosmologyChoice,
    prepared?: PreparedRecomputation,
  ): Promise<{ targetCount: number; observationCount: number }> {
    const rows = await this.readModel.listInputs(proposalId, 'all');
    const sky = await this.skies.ofSemester(semesterId);
    const known = prepared?.sky === sky ? prepared.columns : new Map<string, TargetComputed>();
    const missing = rows.filter((row) => !known.has(keyOf(row)));
    const computed = await computeTargetColumns(
      missing,
      chooseCosmology(cosmology),
      sky,
      await this.uploadedOf(proposalId, missing),
    );
    missing.forEach((row, index) => {
      const columns = computed[index];
      if (columns !== undefined) known.set(keyOf(row), columns);
    });
    const changed = rows.flatMap((row) => {
      const columns = known.get(keyOf(row));
      return columns === undefined ? [] : [{ targetId: row.targetId, computed: columns }];
    });
    // Before the targets' versions grow, by which the estimates that were prepared are known.
    const observationCount = await this.observations.recompute(proposalId, cosmology, 'all', prepared?.estimates);
    await inBatches(changed, BATCH_SIZE, (batch) => this.queries.updateComputed(batch));
    return { targetCount: rows.length, observationCount };
  }

  /**
   * Works out what {@link recomputeAll} will store, and stores nothing. Called before the transaction, so that the transaction
   * computes again only what somebody has changed in between.
   */
  async prepareAll(proposalId: string, semesterId: string, cosmology: CosmologyChoice): Promise<PreparedRecomputation> {
    const rows = await this.readModel.listInputs(proposalId, 'all');
    const sky = await this.skies.ofSemester(semesterId);
    const computed = await computeTargetColumns(
      rows,
      chooseCosmology(cosmology),
      sky,
      await this.uploadedOf(proposalId, rows),
    );
    const columns = new Map<string, TargetComputed>();
    rows.forEach((row, index) => {
      const of = computed[index];
      if (of !== undefined) columns.set(keyOf(row), of);
    });
    return { sky, columns, estimates: await this.observations.prepare(proposalId, cosmology) };
  }

  private uploadedOf(proposalId: string, rows: readonly StoredTargetInputs[]): Promise<UploadedSpectra> {
    return this.spectra.ofLights(
      proposalId,
      rows.map(({ light }) => light),
    );
  }

  /** Finds again which targets share a place; after targets came, went, moved or were renamed. */
  async refreshDuplicates(proposalId: string): Promise<void> {
    const places = await this.readModel.listPlaces(proposalId);
    const neighbours = new Map(
      findCloseDuplicates(
        places.map(({ rightAscensionDeg, declinationDeg }) => ({ raDeg: rightAscensionDeg, decDeg: declinationDeg })),
        DUPLICATE_RADIUS_ARCSEC,
      ).map(({ index, nearestIndex }) => [index, places[nearestIndex]?.name ?? null]),
    );
    const changed = places.flatMap(({ targetId, nearestDuplicateName }, index) => {
      const nearestName = neighbours.get(index) ?? null;
      return nearestName === nearestDuplicateName ? [] : [{ targetId, nearestName }];
    });
    if (changed.length > 0) await this.queries.updateDuplicates(changed);
  }
}

/** Versions grow with every change: columns of the same key are columns of the same inputs. */
function keyOf({ targetId, version }: StoredTargetInputs): string {
  return `${targetId} ${version}`;
}
