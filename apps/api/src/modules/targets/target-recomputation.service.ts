import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import { findCloseDuplicates } from '@faintward/astronomy';
import { Injectable } from '@nestjs/common';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { ProposalSkies } from '../../engine/proposal-sky.service.js';
import { computeTargetColumns } from '../../engine/target-columns.js';
import { ObservationEstimates } from '../observations/observation-estimates.service.js';
import { DUPLICATE_RADIUS_ARCSEC } from './named-places.js';
import { TargetsQueries } from './targets.queries.js';
import { TargetsReadModel } from './targets.read-model.js';

/** Rows in one statement: keeps its one JSON parameter within some megabytes. */
export const BATCH_SIZE = 1000;

/** Keeps what is computed of targets in step with what it is computed from. Call it in the transaction of the change. */
@Injectable()
export class TargetRecomputation {
  constructor(
    private readonly queries: TargetsQueries,
    private readonly readModel: TargetsReadModel,
    private readonly skies: ProposalSkies,
    private readonly observations: ObservationEstimates,
  ) {}

  /** Everything of a proposal: after a change of its cosmology, or to bring old results to this version of the engine. */
  async recomputeAll(
    proposalId: string,
    semesterId: string,
    cosmology: CosmologyChoice,
  ): Promise<{ targetCount: number; observationCount: number }> {
    const rows = await this.readModel.listInputs(proposalId, 'all');
    const computed = computeTargetColumns(rows, chooseCosmology(cosmology), await this.skies.ofSemester(semesterId));
    const changed = rows.flatMap(({ targetId }, index) => {
      const columns = computed[index];
      return columns === undefined ? [] : [{ targetId, computed: columns }];
    });
    for (let start = 0; start < changed.length; start += BATCH_SIZE) {
      await this.queries.updateComputed(changed.slice(start, start + BATCH_SIZE));
    }
    const observationCount = await this.observations.recompute(proposalId, cosmology, 'all');
    return { targetCount: rows.length, observationCount };
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
