import type { CosmologyChoice, CosmologyParameters, CosmologyPreset } from '@faintward/contracts/cosmology';
import type { FieldError } from '@faintward/contracts/errors';
import {
  COSMOLOGY_PRESETS,
  type Cosmology,
  createCosmology,
  InvalidCosmologyError,
  NoBigBangError,
  OutOfDomainError,
} from '@faintward/cosmology';
import { type DistanceModel, tabulatedDistances } from '@faintward/exposure';
import { validationFailed } from '../platform/validation.js';
import { canonicalJson, sha256 } from './canonical-json.js';

/** A cosmology ready for use, with how results name it. */
export interface ChosenCosmology {
  /** A preset's name, or `own-` and the beginning of a hash of the parameters. */
  readonly id: string;
  readonly title: string;
  readonly source: string | null;
  readonly parameters: CosmologyParameters;
  readonly model: Cosmology;
  /** Distances as the exposure engine takes them, from the same tables as those of the target grid. */
  readonly distances: DistanceModel;
}

/** Largest redshift of a source that can be stored; a proposal's cosmology has to reach it. */
const MAX_SOURCE_REDSHIFT = 30;
/** Making a model and its tables takes tens of milliseconds; people come back to the same few. */
const KEPT_COUNT = 64;
const kept = new Map<string, ChosenCosmology>();

/**
 * The model of a preset or of own parameters.
 *
 * @param path where the choice stands in the request, for the error
 * @throws {DomainError} `validation-failed` naming the parameter that cannot be used
 */
export function chooseCosmology(choice: CosmologyChoice, path = 'cosmology'): ChosenCosmology {
  const key = canonicalJson(choice);
  const known = kept.get(key);
  if (known !== undefined) {
    kept.delete(key);
    kept.set(key, known);
    return known;
  }
  const chosen = makeCosmology(choice, path);
  kept.set(key, chosen);
  for (const oldest of kept.keys()) {
    if (kept.size <= KEPT_COUNT) break;
    kept.delete(oldest);
  }
  return chosen;
}

/**
 * The same for the cosmology of a proposal, which has to give every source that can be stored a distance and an age.
 *
 * @throws {DomainError} `validation-failed`
 */
export function chooseProposalCosmology(choice: CosmologyChoice, path = 'cosmology'): ChosenCosmology {
  const chosen = chooseCosmology(choice, path);
  const antipode = chosen.model.antipodeRedshift();
  if (antipode !== undefined && antipode <= MAX_SOURCE_REDSHIFT) {
    throw validationFailed([
      {
        path,
        message:
          `This closed universe has its antipode at redshift ${antipode.toFixed(2)}, beyond which distances turn back; ` +
          `a proposal’s cosmology must reach redshift ${MAX_SOURCE_REDSHIFT}.`,
      },
    ]);
  }
  if (!Number.isFinite(chosen.model.ageGyr(0))) {
    throw validationFailed([
      { path, message: 'This universe has no beginning, so that its sources would have no age.' },
    ]);
  }
  return chosen;
}

function makeCosmology(choice: CosmologyChoice, path: string): ChosenCosmology {
  if (typeof choice === 'string') {
    const preset = COSMOLOGY_PRESETS[choice];
    return chosenOf(createCosmology(choice), choice, preset.title, preset.reference);
  }
  try {
    const id = `own-${sha256(canonicalJson(choice)).slice(0, 12)}`;
    return chosenOf(createCosmology(choice), id, 'Own parameters', null);
  } catch (error) {
    const fault = faultOf(error, path);
    throw fault === undefined ? error : validationFailed([fault]);
  }
}

function faultOf(error: unknown, path: string): FieldError | undefined {
  if (error instanceof NoBigBangError) return { path: `${path}.omegaDarkEnergy`, message: sentence(error.message) };
  if (error instanceof OutOfDomainError) {
    const { minimum, maximum } = error.allowed;
    return {
      path: `${path}.${error.argument}`,
      message: `Must lie between ${minimum} and ${maximum}, not ${error.value}.`,
    };
  }
  if (error instanceof InvalidCosmologyError) return { path, message: sentence(error.message) };
  return undefined;
}

function sentence(text: string): string {
  return `${text.charAt(0).toUpperCase()}${text.slice(1)}.`;
}

function chosenOf(model: Cosmology, id: string, title: string, source: string | null): ChosenCosmology {
  const { omegaDarkEnergy, neutrinoMassesEv, ...others } = model.parameters;
  const parameters: CosmologyParameters = {
    ...others,
    neutrinoMassesEv: [...neutrinoMassesEv],
    ...(omegaDarkEnergy === undefined ? {} : { omegaDarkEnergy }),
  };
  return { id, title, source, parameters, model, distances: tabulatedDistances(model) };
}

/** The presets as the api lists them. */
export function listCosmologyPresets(): CosmologyPreset[] {
  return (Object.keys(COSMOLOGY_PRESETS) as (keyof typeof COSMOLOGY_PRESETS)[]).map((id) => {
    const { title, parameters, source } = chooseCosmology(id);
    return { id, title, parameters, source: source ?? '' };
  });
}
