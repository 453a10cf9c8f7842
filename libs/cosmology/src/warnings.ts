import { createCosmology } from './cosmology.js';
import type { CosmologyParameters } from './parameters.js';

/** Something about a model or a redshift that its user should know, though it can be computed. */
export interface CosmologyWarning {
  readonly code:
    | 'unusual-hubble-constant'
    | 'early-dark-energy'
    | 'strong-curvature'
    | 'closed-universe-turns-back'
    | 'no-neutrinos'
    | 'neutrinos-without-effect'
    | 'redshift-beyond-known-sources';
  readonly message: string;
}

/** Hubble constants between these are not remarked on (common practice). */
const USUAL_HUBBLE = { minimum: 40, maximum: 110 };
/** |Ωk| beyond this is remarked on (common practice; measurements agree with 0 within 0.01). */
const STRONG_CURVATURE = 0.1;
/** Redshifts beyond this are remarked on: no source of light is known there but the microwave background. */
const HIGHEST_SOURCE_REDSHIFT = 30;

/**
 * What is unusual about a set of parameters; empty if nothing is.
 *
 * @throws the errors of {@link createCosmology} for parameters that describe no universe at all
 */
export function cosmologyWarnings(parameters: CosmologyParameters): readonly CosmologyWarning[] {
  const cosmology = createCosmology(parameters);
  const complete = cosmology.parameters;
  const warnings: CosmologyWarning[] = [];
  const hubble = complete.hubbleConstantKmSMpc;
  if (hubble < USUAL_HUBBLE.minimum || hubble > USUAL_HUBBLE.maximum) {
    warnings.push({
      code: 'unusual-hubble-constant',
      message: `A Hubble constant of ${hubble} km/s/Mpc is outside ${USUAL_HUBBLE.minimum} to ${USUAL_HUBBLE.maximum}.`,
    });
  }
  if (complete.w0 + complete.wa >= 0 && cosmology.omegaDarkEnergy !== 0) {
    warnings.push({
      code: 'early-dark-energy',
      message: `With w0 + wa = ${complete.w0 + complete.wa} dark energy does not fade towards the early universe.`,
    });
  }
  if (Math.abs(cosmology.omegaCurvature) > STRONG_CURVATURE) {
    warnings.push({
      code: 'strong-curvature',
      message: `The curvature density is ${cosmology.omegaCurvature.toFixed(3)}; observations agree with a flat universe.`,
    });
  }
  const quarter = quarterTurnRedshift(cosmology);
  if (quarter !== undefined && quarter <= HIGHEST_SOURCE_REDSHIFT) {
    warnings.push({
      code: 'closed-universe-turns-back',
      message: `This universe is so closed that transverse distances shrink again beyond redshift ${quarter.toFixed(2)}.`,
    });
  }
  const hot = complete.cmbTemperatureK > 0;
  if (hot && complete.effectiveNeutrinoCount === 0) {
    warnings.push({
      code: 'no-neutrinos',
      message: 'There are photons but no neutrinos; measured cosmologies have an effective number near 3.04.',
    });
  }
  const carriesMass = complete.neutrinoMassesEv.some((mass) => mass > 0);
  if (
    (!hot && complete.effectiveNeutrinoCount > 0) ||
    (carriesMass && (!hot || complete.effectiveNeutrinoCount === 0))
  ) {
    warnings.push({
      code: 'neutrinos-without-effect',
      message:
        'Neutrinos count only together with a microwave-background temperature and an effective number above zero.',
    });
  }
  return warnings;
}

/** What is unusual about the redshift of a source; empty if nothing is. */
export function redshiftWarnings(redshift: number): readonly CosmologyWarning[] {
  if (!(redshift > HIGHEST_SOURCE_REDSHIFT)) return [];
  return [
    {
      code: 'redshift-beyond-known-sources',
      message: `Redshift ${redshift} is beyond ${HIGHEST_SOURCE_REDSHIFT}: no source of light is known there but the microwave background.`,
    },
  ];
}

/** Redshift a quarter of the way around a closed universe, where the transverse distance is largest. */
function quarterTurnRedshift(cosmology: ReturnType<typeof createCosmology>): number | undefined {
  if (!(cosmology.omegaCurvature < 0)) return undefined;
  const quarter = (Math.PI / 2 / Math.sqrt(-cosmology.omegaCurvature)) * cosmology.hubbleDistanceMpc;
  if (quarter > cosmology.comovingDistanceMpc(HIGHEST_SOURCE_REDSHIFT)) return undefined;
  return cosmology.redshiftAtComovingDistanceMpc(quarter);
}
