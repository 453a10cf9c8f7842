import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type { LightReport, ProposalCosmologies, TargetLightQuery } from '@faintward/contracts/light-report';
import { distanceRows } from '@faintward/cosmology';
import { Injectable } from '@nestjs/common';
import { type ChosenCosmology, chooseCosmology } from '../../engine/cosmologies.js';
import { comparedCosmologies } from '../../engine/cosmology-choice.js';
import { isIntrinsic } from '../../engine/light.js';
import { lightReport } from '../../engine/light-report.js';
import { ProposalSkies } from '../../engine/proposal-sky.service.js';
import { ProposalSpectra } from '../../engine/proposal-spectra.service.js';
import type { Actor } from '../../platform/actor.js';
import { notFound } from '../../platform/domain-error.js';
import { type EstimateMemo, ObservationEstimates } from '../observations/observation-estimates.service.js';
import { ProposalAccess } from '../proposals/proposal-access.service.js';
import { TargetsReadModel } from '../targets/targets.read-model.js';

/** Draws of a stored target's report: the same every time it is looked at. */
const SAMPLE_COUNT = 2000;
const SEED = 1;
/** A change of less than this part of a time is rounding. */
const UNCHANGED = 1e-9;

/** The light of a proposal's targets, for its team. */
@Injectable()
export class ProposalLightService {
  constructor(
    private readonly access: ProposalAccess,
    private readonly targets: TargetsReadModel,
    private readonly observations: ObservationEstimates,
    private readonly skies: ProposalSkies,
    private readonly spectra: ProposalSpectra,
  ) {}

  async report(actor: Actor, proposalId: string, targetId: string, query: TargetLightQuery): Promise<LightReport> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const target = await this.targets.find(proposalId, targetId);
    if (target === undefined) throw notFound('target');
    const { zenithSeeingArcsec } = await this.skies.ofSemester(proposal.semesterId);
    const { redshift, redshiftUncertainty, light, extent } = target;
    return lightReport(
      {
        redshift,
        redshiftUncertainty,
        light,
        extent,
        bandId: query.bandId ?? null,
        seeingArcsec: zenithSeeingArcsec,
        apertureRadiusArcsec: query.apertureRadiusArcsec ?? null,
        sampleCount: SAMPLE_COUNT,
        seed: SEED,
      },
      {
        cosmology: chooseCosmology(proposal.cosmology),
        uploaded: await this.spectra.ofLights(proposalId, [light]),
      },
    );
  }

  /** What another cosmology would change in the whole proposal. Everything is computed anew; nothing is stored. */
  async compareCosmologies(actor: Actor, proposalId: string): Promise<ProposalCosmologies> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const targets = await this.targets.listInputs(proposalId, 'all');
    const chosen = chooseCosmology(proposal.cosmology);
    const redshifts = targets.map(({ redshift }) => redshift);
    const reference = await this.observations.prepare(proposalId, proposal.cosmology);
    const rows: ProposalCosmologies['rows'] = [];
    for (const cosmology of comparedCosmologies(chosen)) {
      const isChosen = cosmology.id === chosen.id;
      const estimates = isChosen ? reference : await this.observations.prepare(proposalId, choiceOf(cosmology));
      rows.push({
        cosmologyId: cosmology.id,
        title: cosmology.title,
        isChosen,
        ...distanceChanges(redshifts, cosmology, chosen),
        ...timeChanges(estimates, reference),
      });
    }
    return {
      targetCount: targets.length,
      observationCount: reference.size,
      apparentCount: targets.filter(({ light }) => light !== null && !isIntrinsic(light)).length,
      intrinsicCount: targets.filter(({ light }) => light !== null && isIntrinsic(light)).length,
      rows,
    };
  }
}

function choiceOf({ id, parameters, source }: ChosenCosmology): CosmologyChoice {
  return source === null ? parameters : (id as CosmologyChoice);
}

function distanceChanges(redshifts: readonly number[], cosmology: ChosenCosmology, chosen: ChosenCosmology) {
  const here = distanceRows(cosmology.model, redshifts);
  const there = distanceRows(chosen.model, redshifts);
  const deltas: number[] = [];
  const ratios: number[] = [];
  here.forEach((row, index) => {
    const other = there[index];
    if (row.distanceModulusMag === undefined || other?.distanceModulusMag === undefined) return;
    deltas.push(row.distanceModulusMag - other.distanceModulusMag);
    if (row.kpcPerArcsec !== undefined && other.kpcPerArcsec !== undefined) {
      ratios.push(row.kpcPerArcsec / other.kpcPerArcsec);
    }
  });
  return {
    medianDeltaDistanceModulusMag: median(deltas),
    largestDeltaDistanceModulusMag: deltas.reduce<number | null>(
      (largest, delta) => (largest === null || Math.abs(delta) > Math.abs(largest) ? delta : largest),
      null,
    ),
    medianScaleRatio: median(ratios),
  };
}

function timeChanges(estimates: EstimateMemo, reference: EstimateMemo) {
  let requestedSeconds = 0;
  let infeasibleCount = 0;
  let changedObservationCount = 0;
  for (const [key, { totalSeconds, estimate }] of estimates) {
    requestedSeconds += totalSeconds ?? 0;
    if (estimate !== null && totalSeconds === null) infeasibleCount += 1;
    const before = reference.get(key)?.totalSeconds ?? null;
    const isSame =
      totalSeconds === before ||
      (totalSeconds !== null && before !== null && Math.abs(totalSeconds / before - 1) < UNCHANGED);
    if (!isSame) changedObservationCount += 1;
  }
  return { requestedSeconds, infeasibleCount, changedObservationCount };
}

function median(values: readonly number[]): number | null {
  if (values.length === 0) return null;
  const sorted = [...values].sort((a, b) => a - b);
  const middle = sorted.length >> 1;
  const upper = sorted[middle] ?? null;
  if (sorted.length % 2 === 1 || upper === null) return upper;
  return ((sorted[middle - 1] ?? upper) + upper) / 2;
}
