import type { CosmologyPreset } from '@faintward/contracts/cosmology';
import type { DistancesRequest, DistancesResponse } from '@faintward/contracts/distances';
import type { Estimate, EstimateRequest, Setup } from '@faintward/contracts/estimates';
import { Injectable } from '@nestjs/common';
import { chooseCosmology, listCosmologyPresets } from '../../engine/cosmologies.js';
import { computeDistances } from '../../engine/distances.js';
import { estimateOnce, type EstimateSetup } from '../../engine/estimates.js';
import { invalidField } from '../../platform/domain-error.js';
import { validationFailed } from '../../platform/validation.js';
import { FacilitiesReadModel } from '../facilities/facilities.read-model.js';

/** The calculators that need no account. */
@Injectable()
export class EstimatesService {
  constructor(private readonly facilities: FacilitiesReadModel) {}

  listCosmologies(): { rows: CosmologyPreset[] } {
    return { rows: listCosmologyPresets() };
  }

  computeDistances(request: DistancesRequest): Promise<DistancesResponse> {
    return computeDistances(request);
  }

  /** @throws {DomainError} `validation-failed` naming the inputs that cannot be computed with */
  async estimate(request: EstimateRequest): Promise<Estimate> {
    const cosmology = chooseCosmology(request.cosmology);
    const setup = await this.getSetup(request.setup);
    const outcome = estimateOnce(request, setup, cosmology);
    if (!outcome.ok) throw validationFailed(outcome.faults);
    return outcome.estimate;
  }

  private async getSetup(setup: Setup): Promise<EstimateSetup> {
    if (!('modeId' in setup)) return setup;
    const mode = await this.facilities.findMode(setup.modeId, setup.configurationVersion);
    if (mode === undefined) {
      throw setup.configurationVersion === undefined
        ? invalidField('setup.modeId', 'There is no such instrument mode.')
        : invalidField('setup.configurationVersion', 'There is no such mode, or no such version of its configuration.');
    }
    return { telescope: mode.telescope, site: mode.site, mode: mode.configuration };
  }
}
