import { InvalidCosmologyError, OutOfDomainError, type AllowedRange } from './errors.js';

/** What defines a Friedmann–Lemaître–Robertson–Walker model in this library. */
export interface CosmologyParameters {
  /** Hubble constant today, km s⁻¹ Mpc⁻¹. */
  readonly hubbleConstantKmSMpc: number;
  /**
   * Density of baryons and cold dark matter today over the critical density. Neutrinos are not part of it: papers often quote
   * matter *with* neutrinos (Planck 2018: 0.3111 with, 0.30966 without).
   */
  readonly omegaMatter: number;
  /** Density of dark energy today over the critical density. Left out: the model is exactly flat. */
  readonly omegaDarkEnergy?: number | undefined;
  /** Dark-energy equation of state today, w(a) = w0 + wa (1 − a). −1 (cosmological constant) if left out. */
  readonly w0?: number | undefined;
  /** Its change with scale factor. 0 if left out. */
  readonly wa?: number | undefined;
  /** Temperature of the microwave background today in K. 0 if left out: no photons and no neutrinos. */
  readonly cmbTemperatureK?: number | undefined;
  /** Effective number of neutrino species. 0 if left out. */
  readonly effectiveNeutrinoCount?: number | undefined;
  /**
   * Neutrino masses in eV, one per species; species beyond the list, up to ⌊effectiveNeutrinoCount⌋, are massless. Every
   * species carries an equal share of the effective number. Left out: all massless.
   */
  readonly neutrinoMassesEv?: readonly number[] | undefined;
}

/** Parameters with every default filled in; `omegaDarkEnergy` stays undefined in a flat model. */
export interface CompleteParameters {
  readonly hubbleConstantKmSMpc: number;
  readonly omegaMatter: number;
  readonly omegaDarkEnergy: number | undefined;
  readonly w0: number;
  readonly wa: number;
  readonly cmbTemperatureK: number;
  readonly effectiveNeutrinoCount: number;
  readonly neutrinoMassesEv: readonly number[];
}

/** What `createCosmology` accepts. Wide on purpose: strange universes are for {@link cosmologyWarnings}. */
export const PARAMETER_RANGES = {
  hubbleConstantKmSMpc: { minimum: 1, maximum: 1000 },
  omegaMatter: { minimum: 0, maximum: 10 },
  omegaDarkEnergy: { minimum: -10, maximum: 10 },
  w0: { minimum: -10, maximum: 2 },
  wa: { minimum: -20, maximum: 10 },
  cmbTemperatureK: { minimum: 0, maximum: 30 },
  effectiveNeutrinoCount: { minimum: 0, maximum: 20 },
  neutrinoMassesEv: { minimum: 0, maximum: 100 },
} as const satisfies Record<keyof CosmologyParameters, AllowedRange>;

const MAX_NEUTRINO_SPECIES = 20;

function check(name: keyof CosmologyParameters, value: number): number {
  const range = PARAMETER_RANGES[name];
  if (!(typeof value === 'number' && value >= range.minimum && value <= range.maximum)) {
    throw new OutOfDomainError(name, value, range);
  }
  return value;
}

/**
 * Fills in defaults and refuses values outside {@link PARAMETER_RANGES}.
 *
 * @throws {OutOfDomainError} naming the parameter, its value and the allowed range
 * @throws {InvalidCosmologyError} if the list of neutrino masses is too long or has masses without neutrinos to carry them
 */
export function completeParameters(parameters: CosmologyParameters): CompleteParameters {
  const masses = [...(parameters.neutrinoMassesEv ?? [])];
  if (masses.length > MAX_NEUTRINO_SPECIES) {
    throw new InvalidCosmologyError(`neutrinoMassesEv has ${masses.length} entries; at most ${MAX_NEUTRINO_SPECIES}`);
  }
  masses.forEach((mass) => check('neutrinoMassesEv', mass));
  const complete: CompleteParameters = {
    hubbleConstantKmSMpc: check('hubbleConstantKmSMpc', parameters.hubbleConstantKmSMpc),
    omegaMatter: check('omegaMatter', parameters.omegaMatter),
    omegaDarkEnergy:
      parameters.omegaDarkEnergy === undefined ? undefined : check('omegaDarkEnergy', parameters.omegaDarkEnergy),
    w0: check('w0', parameters.w0 ?? -1),
    wa: check('wa', parameters.wa ?? 0),
    cmbTemperatureK: check('cmbTemperatureK', parameters.cmbTemperatureK ?? 0),
    effectiveNeutrinoCount: check('effectiveNeutrinoCount', parameters.effectiveNeutrinoCount ?? 0),
    neutrinoMassesEv: Object.freeze(masses),
  };
  return Object.freeze(complete);
}
