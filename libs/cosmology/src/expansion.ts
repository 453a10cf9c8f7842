import {
  BOLTZMANN,
  GRAVITATIONAL_CONSTANT,
  MEGAPARSEC,
  NEUTRINO_DENSITY_RATIO,
  NEUTRINO_TEMPERATURE_RATIO,
  SPEED_OF_LIGHT,
  STEFAN_BOLTZMANN,
} from './constants.js';
import { InvalidCosmologyError, NoBigBangError } from './errors.js';
import type { CompleteParameters } from './parameters.js';

/** Exponent and mass coefficient of the neutrino fit, Komatsu et al. 2011, ApJS 192, 18, eq. 26. */
const KOMATSU_EXPONENT = 1.83;
const KOMATSU_MASS_COEFFICIENT = 0.3173;

/**
 * A density today below this counts as none. It would decide nothing that could be measured, and products of still smaller
 * numbers leave the range in which a floating-point number has all its digits.
 */
const LEAST_DENSITY = 1e-30;

function presentOrNone(density: number): number {
  return Math.abs(density) < LEAST_DENSITY ? 0 : density;
}

/** 3 H0²/(8πG) in g cm⁻³. */
export function criticalDensityTodayGCm3(hubbleConstantKmSMpc: number): number {
  const perSecond = hubbleConstantKmSMpc / MEGAPARSEC.value;
  return ((3 * perSecond * perSecond) / (8 * Math.PI * GRAVITATIONAL_CONSTANT.value)) * 1e-3;
}

/** 4σT⁴/c³ over the critical density. */
function omegaPhotonsToday(temperatureK: number, criticalDensityGCm3: number): number {
  const lightSpeedMS = SPEED_OF_LIGHT.value * 1e3;
  return (4 * STEFAN_BOLTZMANN.value * temperatureK ** 4) / lightSpeedMS ** 3 / (criticalDensityGCm3 * 1e3);
}

/**
 * Density of all neutrinos over that of the photons, as a function of s = 1 + z.
 *
 * Komatsu et al. 2011, eq. 26. The fit is good to about 1e-3 in density; against the Fermi–Dirac integral distances move by
 * less than 7e-7 up to z = 10.
 */
function neutrinoToPhotonRatio(parameters: CompleteParameters): (s: number) => number {
  const { effectiveNeutrinoCount, neutrinoMassesEv, cmbTemperatureK } = parameters;
  const massive = neutrinoMassesEv.filter((mass) => mass > 0);
  if (massive.length === 0 || cmbTemperatureK === 0) {
    const constant = NEUTRINO_DENSITY_RATIO.value * effectiveNeutrinoCount;
    return () => constant;
  }
  const species = Math.max(Math.floor(effectiveNeutrinoCount), neutrinoMassesEv.length);
  const scale = (NEUTRINO_DENSITY_RATIO.value * effectiveNeutrinoCount) / species;
  const massless = species - massive.length;
  const thermalEnergyEv = BOLTZMANN.value * NEUTRINO_TEMPERATURE_RATIO.value * cmbTemperatureK;
  // Equal masses share one evaluation of the powers.
  const groups = [...new Set(massive)].map((mass) => ({
    count: massive.filter((other) => other === mass).length,
    coefficient: (KOMATSU_MASS_COEFFICIENT * mass) / thermalEnergyEv,
  }));
  return (s) => {
    let sum = massless;
    for (const { count, coefficient } of groups) {
      sum += count * (1 + (coefficient / s) ** KOMATSU_EXPONENT) ** (1 / KOMATSU_EXPONENT);
    }
    return scale * sum;
  };
}

/** Dark-energy density over its value today, as a function of s = 1 + z. Chevallier & Polarski 2001; Linder 2003. */
function darkEnergyGrowth(w0: number, wa: number): (s: number) => number {
  if (w0 === -1 && wa === 0) return () => 1;
  const exponent = 3 * (1 + w0 + wa);
  if (wa === 0) return (s) => s ** exponent;
  return (s) => s ** exponent * Math.exp((-3 * wa * (s - 1)) / s);
}

/** The Friedmann equation of one model. `s` is 1 + z throughout. */
export interface Expansion {
  readonly omegaMatter: number;
  readonly omegaDarkEnergy: number;
  readonly omegaCurvature: number;
  readonly omegaPhotons: number;
  /** Neutrinos today, massive ones included. */
  readonly omegaNeutrinos: number;
  /**
   * Smallest E² over the sum of the sizes of its terms, along the whole past: about 1 in ordinary models, small where the terms
   * nearly cancel, and then E² has lost that many of its digits.
   */
  readonly leastPurity: number;
  /** E² = (H/H0)². */
  squaredRate(s: number): number;
  /** E = H/H0. */
  rate(s: number): number;
  /** ρ_ν/ρ_γ. */
  neutrinoToPhotonRatio(s: number): number;
  /** ρ_DE/ρ_DE(today). */
  darkEnergyGrowth(s: number): number;
}

/**
 * E(z)² = Ωm s³ + Ωk s² + (Ωγ + Ων) s⁴ + Ω_DE f(s), s = 1 + z. Densities today below 1e-30 are taken for none.
 *
 * @throws {NoBigBangError} if E² is not positive at some s ≥ 1
 * @throws {InvalidCosmologyError} if E² comes so close to zero that rounding decides about distances
 * @see Hogg 1999, astro-ph/9905116, eq. 14 (without radiation); Komatsu et al. 2011, eq. 26 (neutrinos)
 */
export function createExpansion(parameters: CompleteParameters): Expansion {
  const omegaMatter = presentOrNone(parameters.omegaMatter);
  const omegaPhotons = presentOrNone(
    omegaPhotonsToday(parameters.cmbTemperatureK, criticalDensityTodayGCm3(parameters.hubbleConstantKmSMpc)),
  );
  const ratio = neutrinoToPhotonRatio(parameters);
  const omegaNeutrinos = omegaPhotons * ratio(1);
  const flat = parameters.omegaDarkEnergy === undefined;
  const omegaDarkEnergy = presentOrNone(parameters.omegaDarkEnergy ?? 1 - omegaMatter - omegaPhotons - omegaNeutrinos);
  const omegaCurvature = flat ? 0 : 1 - omegaMatter - omegaDarkEnergy - omegaPhotons - omegaNeutrinos;
  const growth = darkEnergyGrowth(parameters.w0, parameters.wa);

  const squaredRate = (s: number): number => {
    // Absent ingredients are skipped: 0 · ∞ at an enormous s would be NaN.
    const radiation = omegaPhotons === 0 ? 0 : omegaPhotons * (1 + ratio(s)) * s;
    const darkEnergy = omegaDarkEnergy === 0 ? 0 : omegaDarkEnergy * growth(s);
    return s * s * (omegaCurvature + s * (omegaMatter + radiation)) + darkEnergy;
  };
  const sizeOfTerms = (s: number): number =>
    squaredRate(s) +
    2 * Math.max(0, -omegaCurvature) * s * s +
    2 * Math.max(0, omegaDarkEnergy === 0 ? 0 : -omegaDarkEnergy * growth(s));
  const leastPurity = findLeastPurity(squaredRate, sizeOfTerms);
  const expansion: Expansion = {
    leastPurity,
    omegaMatter,
    omegaDarkEnergy,
    omegaCurvature,
    omegaPhotons,
    omegaNeutrinos,
    squaredRate,
    rate: (s) => Math.sqrt(squaredRate(s)),
    neutrinoToPhotonRatio: ratio,
    darkEnergyGrowth: growth,
  };
  return Object.freeze(expansion);
}

/** How far back, in ln(1 + z), the sign of E² is examined; the early universe is a pure power law long before. */
const EXAMINED_LOG = 40;

/** Below this E² has no more than nine good digits left; distances would be worth less. */
const PURITY_LIMIT = 1e-7;

/** Looks for the deepest dip of E²: on a grid much finer than anything in the Friedmann equation, then inside each dip of the grid. */
function findLeastPurity(squaredRate: (s: number) => number, sizeOfTerms: (s: number) => number): number {
  const purity = (x: number): number => {
    const s = Math.exp(x);
    const value = squaredRate(s) / sizeOfTerms(s);
    if (!(value > 0)) throw new NoBigBangError(Math.expm1(x));
    return value;
  };
  const step = 0.02;
  let before = purity(0);
  let here = before;
  let least = before;
  for (let x = 0; x <= EXAMINED_LOG; x += step) {
    const after = purity(x + step);
    if (here <= before && here <= after && here < 0.1) {
      let low = Math.max(0, x - step);
      let high = x + step;
      for (let i = 0; i < 60; i++) {
        const left = low + (high - low) / 3;
        const right = high - (high - low) / 3;
        if (purity(left) < purity(right)) high = right;
        else low = left;
      }
      here = purity(low);
      if (here < PURITY_LIMIT) {
        throw new InvalidCosmologyError(
          `this universe all but stands still at redshift ${Math.expm1(low).toPrecision(4)}; its distances cannot be computed`,
        );
      }
    }
    least = Math.min(least, here);
    before = here;
    here = after;
  }
  return least;
}
