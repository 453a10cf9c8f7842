import type { FieldError } from '@faintward/contracts/errors';
import type { Conditions, Estimate, EstimateRequest, Goal } from '@faintward/contracts/estimates';
import type { ModeConfiguration, Site } from '@faintward/contracts/facilities';
import type { Extent, Light } from '@faintward/contracts/light';
import {
  type Estimate as EngineEstimate,
  type EstimateInput,
  estimate,
  type Extent as EngineExtent,
  DITHER_MINIMUM_COUNT,
  ENGINE_VERSION,
  OutOfDomainError,
} from '@faintward/exposure';
import { canonicalJson, sha256 } from './canonical-json.js';
import type { ChosenCosmology } from './cosmologies.js';
import { lightFaults, toEngineLight } from './light.js';

/** What a target is to an estimate. */
export interface EstimateTarget {
  redshift: number;
  light: Light;
  extent: Extent;
  magnification?: number | undefined;
}

/** Telescope, site and mode, whether the observatory's or typed in full. */
export interface EstimateSetup {
  telescope: { diameterM: number; obstructionDiameterM: number };
  site: Pick<Site, 'zenithSeeingArcsec'> & { outerScaleM?: number | null | undefined };
  mode: ModeConfiguration;
}

/** All that an estimate depends on beside the target and the engine's version. */
export interface EstimatePlan {
  cosmology: ChosenCosmology;
  setup: EstimateSetup;
  goal: Goal;
  conditions: Conditions;
  apertureRadiusArcsec?: number | undefined;
  wavelengthNm?: number | undefined;
}

export type EstimateOutcome = { ok: true; estimate: Estimate } | { ok: false; faults: FieldError[] };

/**
 * Estimates many targets under one plan.
 *
 * @returns a function from a target to its estimate, or to the inputs that do not fit together, with their paths in an
 *   {@link EstimateRequest}
 */
export function estimator(plan: EstimatePlan): (target: EstimateTarget) => EstimateOutcome {
  const { telescope, mode } = plan.setup;
  const { zenithSeeingArcsec, outerScaleM } = plan.setup.site;
  const shared: Omit<EstimateInput, 'target'> = {
    cosmology: plan.cosmology.distances,
    site: { zenithSeeingArcsec, ...(outerScaleM == null ? {} : { outerScaleM }) },
    telescope: { diameterM: telescope.diameterM, obstructionDiameterM: telescope.obstructionDiameterM },
    mode,
    goal: plan.goal,
    conditions: plan.conditions,
    ...(plan.apertureRadiusArcsec === undefined ? {} : { apertureRadiusArcsec: plan.apertureRadiusArcsec }),
    ...(plan.wavelengthNm === undefined ? {} : { wavelengthNm: plan.wavelengthNm }),
  };
  // The plan is the same for thousands of targets: its part of the hashed text is written once.
  const planJson = canonicalJson({ ...shared, cosmology: plan.cosmology.parameters });
  return (target) => {
    const faults = lightFaults(target, 'target.');
    if (faults.length > 0) return { ok: false, faults };
    const inputHash = sha256(`{"plan":${planJson},"target":${canonicalJson(target)}}`);
    try {
      const computed = estimate({
        ...shared,
        target: {
          redshift: target.redshift,
          light: toEngineLight(target.light, mode),
          extent: toEngineExtent(target.extent),
          ...(target.magnification === undefined ? {} : { magnification: target.magnification }),
        },
      });
      return { ok: true, estimate: toEstimate(computed, plan.cosmology.id, inputHash) };
    } catch (error) {
      if (error instanceof OutOfDomainError) return { ok: false, faults: [toFault(error)] };
      throw error;
    }
  };
}

/** What is wrong with a goal for a mode, whatever the target. Paths begin with `goal`. */
export function goalFaults(goal: Goal, mode: ModeConfiguration): FieldError[] {
  const faults: FieldError[] = [];
  const { minimumExposureSeconds, maximumExposureSeconds } = mode.exposureLimits;
  const { exposureSeconds } = goal;
  if (
    exposureSeconds !== undefined &&
    (exposureSeconds < minimumExposureSeconds || exposureSeconds > maximumExposureSeconds)
  ) {
    faults.push({
      path: 'goal.exposureSeconds',
      message: `This mode exposes for ${minimumExposureSeconds} s to ${maximumExposureSeconds} s at a time.`,
    });
  }
  if (goal.kind !== 'lineSignificance' && goal.per === 'resolutionElement' && mode.kind === 'imaging') {
    faults.push({
      path: 'goal.per',
      message: 'An image has no resolution elements: ask for a ratio per aperture, per square arcsecond or per pixel.',
    });
  }
  if (
    goal.kind === 'exposureTime' &&
    mode.skySubtraction?.kind === 'ditheredFrames' &&
    goal.exposureCount < DITHER_MINIMUM_COUNT.value
  ) {
    faults.push({
      path: 'goal.exposureCount',
      message: `This mode takes the sky from dithered frames, of which it needs at least ${DITHER_MINIMUM_COUNT.value}.`,
    });
  }
  return faults;
}

function toEngineExtent(extent: Extent): EngineExtent {
  switch (extent.kind) {
    case 'point':
    case 'uniform':
      return { kind: extent.kind };
    case 'sersic':
      return {
        kind: 'sersic',
        index: extent.sersicIndex,
        axisRatio: extent.axisRatio,
        ...(extent.unit === 'kpc'
          ? { halfLightRadiusKpc: extent.halfLightRadius }
          : { halfLightRadiusArcsec: extent.halfLightRadius }),
      };
  }
}

function toEstimate(computed: EngineEstimate, cosmologyId: string, inputHash: string): Estimate {
  const { warnings, ...rest } = computed;
  return {
    ...rest,
    cosmologyId,
    inputHash,
    notices: warnings.map(({ code, message }) => ({ code, message, severity: 'warning' })),
  };
}

/** Names of the engine's fields that differ from those of the request. */
const REQUEST_NAMES: readonly (readonly [RegExp, string])[] = [
  [/^target\.light\.absoluteMagnitudeAb$/, 'target.light.magnitudeAb'],
  [/^target\.light\.lineFluxErgSCm2$/, 'target.light.fluxErgSCm2'],
  [/^target\.light\.lineLuminosityErgS$/, 'target.light.luminosityErgS'],
  [/^target\.light\.intrinsicWidthKmS$/, 'target.light.velocityWidthKmS'],
  [/^target\.light\.slopeBeta$/, 'target.light.spectralSlopeBeta'],
  [/^target\.extent\.halfLightRadius(Kpc|Arcsec)$/, 'target.extent.halfLightRadius'],
  [/^target\.extent\.index$/, 'target.extent.sersicIndex'],
  [/^(mode|site|telescope)\./, 'setup.$1.'],
];

function toFault(error: OutOfDomainError): FieldError {
  let path = error.field;
  // Of an apparent magnitude the request names the value without its system.
  if (path === 'target.light.magnitudeAb') path = 'target.light.magnitude';
  for (const [pattern, replacement] of REQUEST_NAMES) path = path.replace(pattern, replacement);
  const given = typeof error.value === 'number' || typeof error.value === 'string' ? `; ${error.value} was given` : '';
  return { path, message: `Must be ${error.allowed}${given}.` };
}

/** An estimate for somebody who has no proposal. */
export function estimateOnce(
  request: EstimateRequest,
  setup: EstimateSetup,
  cosmology: ChosenCosmology,
): EstimateOutcome {
  const faults = goalFaults(request.goal, setup.mode);
  if (faults.length > 0) return { ok: false, faults };
  return estimator({
    cosmology,
    setup,
    goal: request.goal,
    conditions: request.conditions,
    apertureRadiusArcsec: request.apertureRadiusArcsec,
    wavelengthNm: request.wavelengthNm,
  })(request.target);
}

export { ENGINE_VERSION };
