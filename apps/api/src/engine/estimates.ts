import type { FieldError } from '@faintward/contracts/errors';
import type { Conditions, Estimate, EstimateRequest, Goal } from '@faintward/contracts/estimates';
import type { ModeConfiguration, Site } from '@faintward/contracts/facilities';
import type { Extent, Light } from '@faintward/contracts/light';
import { AntipodeError } from '@faintward/cosmology';
import {
  type Estimate as EngineEstimate,
  type EstimateInput,
  estimate,
  DITHER_MINIMUM_COUNT,
  ENGINE_VERSION,
  OutOfDomainError,
} from '@faintward/exposure';
import { canonicalJson, sha256 } from './canonical-json.js';
import type { ChosenCosmology } from './cosmologies.js';
import { toEngineExtent } from './extent.js';
import { lightFaults } from './light-faults.js';
import { NO_UPLOADS, type UploadedSpectra } from './light.js';
import { resolveLight } from './resolve-light.js';
import { lightData } from './light-data.js';
import { arrive, ultravioletMagnitudeOf } from './source.js';

/** What a target is to an estimate. */
export interface EstimateTarget {
  redshift: number;
  light: Light;
  extent: Extent;
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
  /** Spectra that lights of these targets name. */
  uploaded?: UploadedSpectra | undefined;
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
  const { cosmology, uploaded = NO_UPLOADS } = plan;
  const { version: referenceDataVersion } = lightData();
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
  const planJson = canonicalJson({ ...shared, cosmology: cosmology.parameters, referenceDataVersion });
  return (target) => {
    const faults = lightFaults({ ...target, uploaded }, 'target.');
    if (faults.length > 0) return { ok: false, faults };
    const inputHash = sha256(`{"plan":${planJson},"target":${canonicalJson(target)}}`);
    try {
      const { redshift, light, extent } = target;
      const setting = { redshift, cosmology, uploaded };
      const computed = estimate({
        ...shared,
        target: {
          redshift,
          light: resolveLight(light, setting, mode),
          extent: toEngineExtent(extent, {
            redshift,
            absoluteMagnitudeUv:
              extent.kind === 'typical' ? ultravioletMagnitudeOf(arrive(light, extent, setting)) : undefined,
          }),
        },
      });
      return { ok: true, estimate: toEstimate(computed, cosmology.id, referenceDataVersion, inputHash) };
    } catch (error) {
      if (error instanceof OutOfDomainError) return { ok: false, faults: [toFault(error, target.light)] };
      if (error instanceof AntipodeError) return { ok: false, faults: [antipodeFault(error)] };
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

function toEstimate(
  computed: EngineEstimate,
  cosmologyId: string,
  referenceDataVersion: string,
  inputHash: string,
): Estimate {
  const { warnings, ...rest } = computed;
  return {
    ...rest,
    cosmologyId,
    referenceDataVersion,
    inputHash,
    notices: warnings.map(({ code, message }) => ({ code, message, severity: 'warning' })),
  };
}

/** Names of the engine's fields that differ from those of the request. */
const REQUEST_NAMES: readonly (readonly [RegExp, string])[] = [
  [/^target\.extent\.halfLightRadius(Kpc|Arcsec)$/, 'target.extent.halfLightRadius'],
  [/^target\.extent\.index$/, 'target.extent.sersicIndex'],
  [/^(mode|site|telescope)\./, 'setup.$1.'],
];

function toFault(error: OutOfDomainError, light: Light): FieldError {
  let path = error.field;
  if (path === 'target.light.amount' || path === 'target.light.magnitude') path = `target.light.${amountOf(light)}`;
  for (const [pattern, replacement] of REQUEST_NAMES) path = path.replace(pattern, replacement);
  const given = typeof error.value === 'number' || typeof error.value === 'string' ? `; ${error.value} was given` : '';
  return { path, message: `Must be ${error.allowed}${given}.` };
}

/** The field of a light that its brightness stands in. */
function amountOf(light: Light): string {
  switch (light.kind) {
    case 'lineFlux':
      return 'fluxErgSCm2';
    case 'lineLuminosity':
      return 'luminosityErgS';
    case 'starFormationRate':
      return 'solarMassesPerYear';
    case 'typical':
      return 'of';
    case 'apparentMagnitude':
    case 'absoluteMagnitude':
      return 'magnitude';
  }
}

function antipodeFault(error: AntipodeError): FieldError {
  return {
    path: 'target.redshift',
    message: `This closed universe has its antipode at redshift ${error.allowed.maximum.toPrecision(6)}; beyond it nothing can be computed.`,
  };
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
