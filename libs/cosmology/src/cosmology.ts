import { gaussLegendre } from '@faintward/numerics';
import { GIGAYEAR, MEGAPARSEC, SPEED_OF_LIGHT } from './constants.js';
import { transverseFactor, transverseSlope, volumeFactor } from './curvature.js';
import { AntipodeError, InvalidCosmologyError, OutOfDomainError } from './errors.js';
import { createExpansion, criticalDensityTodayGCm3, type Expansion } from './expansion.js';
import {
  angularDiameterDistanceMaximum,
  antipodeRedshift,
  redshiftAtAge,
  redshiftAtComovingDistance,
  redshiftAtLookbackTime,
  redshiftAtLuminosityDistance,
  redshiftsAtAngularDiameterDistance,
} from './inverses.js';
import { comovingBetween, timeBetween, timeSinceBigBang } from './line-of-sight.js';
import { completeParameters, type CompleteParameters, type CosmologyParameters } from './parameters.js';
import { COSMOLOGY_PRESETS, isCosmologyPresetId, type CosmologyPresetId } from './presets/index.js';
import { createPathProfile, type PathProfile } from './path-profile.js';

/** Largest redshift any function accepts: the model holds further, but nothing observed with light lies beyond. */
export const MAX_REDSHIFT = 1e4;

/** One arcsecond in radians. */
const ARCSECOND = Math.PI / 648000;

/** The redshift at which an angular-diameter distance is largest, and that distance. */
export interface AngularDiameterDistanceMaximum {
  readonly redshift: number;
  readonly distanceMpc: number;
}

/**
 * A homogeneous, isotropic universe: immutable, every result a function of its arguments alone. Made by
 * {@link createCosmology}.
 *
 * Every function of a redshift is valid for 0 ≤ z ≤ {@link MAX_REDSHIFT} and throws {@link OutOfDomainError} elsewhere (NaN
 * included); those that need a transverse distance throw {@link AntipodeError} at and beyond the antipode of a closed universe.
 * Integrals are adaptive; relative errors stay near 1e-14 for every redshift down to zero. Distances are in megaparsec, times
 * in Julian gigayears.
 *
 * @see Hogg 1999, astro-ph/9905116 (distances, volumes, times); Komatsu et al. 2011, ApJS 192, 18, eq. 26 (neutrinos)
 */
export class Cosmology {
  /** Identifier of the preset this model was made from. */
  readonly presetId: CosmologyPresetId | undefined;
  readonly parameters: CompleteParameters;
  /** Baryons and cold dark matter today. */
  readonly omegaMatter: number;
  readonly omegaDarkEnergy: number;
  /** 1 − Σ of the others: positive if open, negative if closed, exactly 0 if `omegaDarkEnergy` was left out. */
  readonly omegaCurvature: number;
  readonly omegaPhotons: number;
  /** All neutrinos today, massive ones included. */
  readonly omegaNeutrinos: number;
  /** c/H0. */
  readonly hubbleDistanceMpc: number;
  /** 1/H0. */
  readonly hubbleTimeGyr: number;
  /** 3H0²/(8πG). */
  readonly criticalDensityTodayGCm3: number;

  readonly #expansion: Expansion;
  #profile: PathProfile | undefined;

  /** @internal use {@link createCosmology} */
  constructor(parameters: CosmologyParameters, presetId?: CosmologyPresetId) {
    this.presetId = presetId;
    this.parameters = completeParameters(parameters);
    this.#expansion = createExpansion(this.parameters);
    this.omegaMatter = this.#expansion.omegaMatter;
    this.omegaDarkEnergy = this.#expansion.omegaDarkEnergy;
    this.omegaCurvature = this.#expansion.omegaCurvature;
    this.omegaPhotons = this.#expansion.omegaPhotons;
    this.omegaNeutrinos = this.#expansion.omegaNeutrinos;
    this.hubbleDistanceMpc = SPEED_OF_LIGHT.value / this.parameters.hubbleConstantKmSMpc;
    this.hubbleTimeGyr = MEGAPARSEC.value / this.parameters.hubbleConstantKmSMpc / GIGAYEAR.value;
    this.criticalDensityTodayGCm3 = criticalDensityTodayGCm3(this.parameters.hubbleConstantKmSMpc);
    Object.freeze(this);
  }

  // ── Expansion ─────────────────────────────────────────────────────────────────────────────────────────────────────

  /** E(z) = H(z)/H0. */
  expansionRateRatio(redshift: number): number {
    return this.#expansion.rate(1 + checkRedshift(redshift));
  }

  /** H(z) in km s⁻¹ Mpc⁻¹. */
  hubbleKmSMpc(redshift: number): number {
    return this.parameters.hubbleConstantKmSMpc * this.expansionRateRatio(redshift);
  }

  /** 1/(1+z). */
  scaleFactor(redshift: number): number {
    return 1 / (1 + checkRedshift(redshift));
  }

  /** Temperature of the microwave background in K, T0 (1+z). */
  cmbTemperatureK(redshift: number): number {
    return this.parameters.cmbTemperatureK * (1 + checkRedshift(redshift));
  }

  /** 3H(z)²/(8πG) in g cm⁻³. */
  criticalDensityGCm3(redshift: number): number {
    return this.criticalDensityTodayGCm3 * this.#expansion.squaredRate(1 + checkRedshift(redshift));
  }

  /** Density of baryons and cold dark matter over the critical density at that redshift. */
  omegaMatterAt(redshift: number): number {
    const s = 1 + checkRedshift(redshift);
    return (this.omegaMatter * s ** 3) / this.#expansion.squaredRate(s);
  }

  /** Density of dark energy over the critical density at that redshift. */
  omegaDarkEnergyAt(redshift: number): number {
    const s = 1 + checkRedshift(redshift);
    return (this.omegaDarkEnergy * this.#expansion.darkEnergyGrowth(s)) / this.#expansion.squaredRate(s);
  }

  /** Curvature term over E² at that redshift. */
  omegaCurvatureAt(redshift: number): number {
    const s = 1 + checkRedshift(redshift);
    return (this.omegaCurvature * s * s) / this.#expansion.squaredRate(s);
  }

  /** Density of photons over the critical density at that redshift. */
  omegaPhotonsAt(redshift: number): number {
    const s = 1 + checkRedshift(redshift);
    return (this.omegaPhotons * s ** 4) / this.#expansion.squaredRate(s);
  }

  /** Density of all neutrinos over the critical density at that redshift. */
  omegaNeutrinosAt(redshift: number): number {
    return this.omegaPhotonsAt(redshift) * this.#expansion.neutrinoToPhotonRatio(1 + redshift);
  }

  // ── Distances ─────────────────────────────────────────────────────────────────────────────────────────────────────

  /** Line-of-sight comoving distance in Mpc. Hogg 1999, eq. 15. Defined beyond the antipode too. */
  comovingDistanceMpc(redshift: number): number {
    return this.hubbleDistanceMpc * this.#comoving(redshift);
  }

  /**
   * Transverse comoving distance in Mpc. Hogg 1999, eq. 16.
   *
   * @throws {AntipodeError} at and beyond the antipode of a closed universe
   */
  transverseComovingDistanceMpc(redshift: number): number {
    return this.hubbleDistanceMpc * this.#transverse(redshift, this.#comoving(redshift));
  }

  /** Angular-diameter distance in Mpc, D_M/(1+z). Hogg 1999, eq. 18. */
  angularDiameterDistanceMpc(redshift: number): number {
    return this.transverseComovingDistanceMpc(redshift) / (1 + redshift);
  }

  /** Luminosity distance in Mpc, (1+z) D_M. Hogg 1999, eq. 21. */
  luminosityDistanceMpc(redshift: number): number {
    return this.transverseComovingDistanceMpc(redshift) * (1 + redshift);
  }

  /**
   * Angular-diameter distance in Mpc of an object at z2 seen by an observer at z1 ≤ z2, as lensing needs it.
   *
   * From the comoving distance between the two, so that it holds for open, flat and closed universes alike (Hogg 1999, eq. 19,
   * is the same where the curvature is not negative).
   *
   * @throws {OutOfDomainError} if z2 < z1, or either is out of range
   * @throws {AntipodeError} if z2 is at or beyond the antipode of the observer at z1
   */
  angularDiameterDistanceBetweenMpc(redshift1: number, redshift2: number): number {
    checkRedshift(redshift1, 'redshift1');
    checkRedshift(redshift2, 'redshift2', redshift1);
    const comoving = comovingBetween(this.#expansion, Math.log1p(redshift1), Math.log1p(redshift2));
    const q = this.omegaCurvature * comoving * comoving;
    if (q <= -Math.PI * Math.PI) {
      const limit = antipodeRedshift(this.#expansion, this.#pathProfile(), Math.log1p(redshift1));
      throw new AntipodeError(redshift2, limit ?? redshift2);
    }
    return (this.hubbleDistanceMpc * comoving * transverseFactor(q)) / (1 + redshift2);
  }

  /** Distance modulus in magnitudes, 5 log₁₀(D_L/10 pc); undefined at z = 0, where it has no finite value. */
  distanceModulusMag(redshift: number): number | undefined {
    const distance = this.luminosityDistanceMpc(redshift);
    return distance === 0 ? undefined : distanceModulusFromMpc(distance);
  }

  /**
   * Change of the distance modulus with redshift, magnitudes per unit z; undefined at z = 0.
   *
   * (5/ln 10)·[1/(1+z) + c √(1 + Ωk D_M²/D_H²)/(H D_M)], the derivative of Hogg 1999, eq. 25 and 16.
   */
  distanceModulusSlopeMag(redshift: number): number | undefined {
    const comoving = this.#comoving(redshift);
    const transverse = this.#transverse(redshift, comoving);
    if (transverse === 0) return undefined;
    const s = 1 + redshift;
    const slope = transverseSlope(this.omegaCurvature * comoving * comoving);
    return (5 / Math.LN10) * (1 / s + slope / (this.#expansion.rate(s) * transverse));
  }

  // ── Angular scale ─────────────────────────────────────────────────────────────────────────────────────────────────

  /** Proper transverse size in kpc of one arcsecond; undefined at z = 0, where the inverse scale has no finite value. */
  kpcPerArcsec(redshift: number): number | undefined {
    const distance = this.angularDiameterDistanceMpc(redshift);
    return distance === 0 ? undefined : distance * 1e3 * ARCSECOND;
  }

  /** Comoving transverse size in kpc of one arcsecond; undefined at z = 0. */
  comovingKpcPerArcsec(redshift: number): number | undefined {
    const distance = this.transverseComovingDistanceMpc(redshift);
    return distance === 0 ? undefined : distance * 1e3 * ARCSECOND;
  }

  /** Angle in arcseconds of one proper transverse kpc; undefined at z = 0. */
  arcsecPerKpc(redshift: number): number | undefined {
    const scale = this.kpcPerArcsec(redshift);
    return scale === undefined ? undefined : 1 / scale;
  }

  // ── Volumes ───────────────────────────────────────────────────────────────────────────────────────────────────────

  /** Comoving volume of the whole sky out to that redshift, Mpc³. Hogg 1999, eq. 29. */
  comovingVolumeMpc3(redshift: number): number {
    const comoving = this.#comoving(redshift);
    const q = this.omegaCurvature * comoving * comoving;
    return 4 * Math.PI * (this.hubbleDistanceMpc * comoving) ** 3 * volumeFactor(q);
  }

  /**
   * Comoving volume of the whole sky between two redshifts, Mpc³; thin shells keep their relative accuracy.
   *
   * @throws {OutOfDomainError} if z2 < z1, or either is out of range
   */
  comovingVolumeBetweenMpc3(redshift1: number, redshift2: number): number {
    const near = this.#comoving(checkRedshift(redshift1, 'redshift1'));
    checkRedshift(redshift2, 'redshift2', redshift1);
    const thickness = comovingBetween(this.#expansion, Math.log1p(redshift1), Math.log1p(redshift2));
    // Surface of spheres, integrated outwards: exact in flat space, where it is a square, and an entire function elsewhere.
    const area = (depth: number): number => {
      const distance = near + depth;
      return (distance * transverseFactor(this.omegaCurvature * distance * distance)) ** 2;
    };
    return 4 * Math.PI * this.hubbleDistanceMpc ** 3 * gaussLegendre(area, 0, thickness, 40);
  }

  /** Comoving volume per unit redshift and solid angle, Mpc³ sr⁻¹, D_H D_M²/E. Hogg 1999, eq. 28. */
  differentialComovingVolumeMpc3Sr(redshift: number): number {
    const transverse = this.transverseComovingDistanceMpc(redshift);
    return (this.hubbleDistanceMpc * transverse * transverse) / this.expansionRateRatio(redshift);
  }

  // ── Times ─────────────────────────────────────────────────────────────────────────────────────────────────────────

  /** Time from that redshift until today, Gyr. Hogg 1999, eq. 30. */
  lookbackTimeGyr(redshift: number): number {
    return this.hubbleTimeGyr * timeBetween(this.#expansion, 0, Math.log1p(checkRedshift(redshift)));
  }

  /** Time from the big bang to that redshift, Gyr; Infinity in a model without a beginning (empty but for a Λ or fading dark energy). */
  ageGyr(redshift: number): number {
    return this.hubbleTimeGyr * timeSinceBigBang(this.#expansion, Math.log1p(checkRedshift(redshift)));
  }

  // ── Inverses: relative error of the redshift below 1e-11 where the quantity itself is steep enough ────────────────

  /**
   * Redshift at which the universe had that age in Gyr.
   *
   * @throws {NoSolutionError} if it was never that old, or was so only beyond {@link MAX_REDSHIFT}
   */
  redshiftAtAgeGyr(ageGyr: number): number {
    return redshiftAtAge(this.#expansion, this.#pathProfile(), ageGyr, this.hubbleTimeGyr);
  }

  /**
   * Redshift from which light needed that many Gyr.
   *
   * @throws {NoSolutionError} if it is negative or longer than from {@link MAX_REDSHIFT}
   */
  redshiftAtLookbackTimeGyr(lookbackTimeGyr: number): number {
    return redshiftAtLookbackTime(this.#expansion, this.#pathProfile(), lookbackTimeGyr, this.hubbleTimeGyr);
  }

  /**
   * Redshift at that line-of-sight comoving distance in Mpc.
   *
   * @throws {NoSolutionError} if it is negative or beyond {@link MAX_REDSHIFT}
   */
  redshiftAtComovingDistanceMpc(comovingDistanceMpc: number): number {
    return redshiftAtComovingDistance(
      this.#expansion,
      this.#pathProfile(),
      comovingDistanceMpc,
      this.hubbleDistanceMpc,
    );
  }

  /**
   * Redshift at that luminosity distance in Mpc. In a closed universe the luminosity distance can turn back on the way to the
   * antipode; then the redshift on the near side of the turning point is returned.
   *
   * @throws {NoSolutionError} if no redshift up to {@link MAX_REDSHIFT} has it
   */
  redshiftAtLuminosityDistanceMpc(luminosityDistanceMpc: number): number {
    return redshiftAtLuminosityDistance(
      this.#expansion,
      this.#pathProfile(),
      luminosityDistanceMpc,
      this.hubbleDistanceMpc,
    );
  }

  /**
   * Redshift at that distance modulus in magnitudes.
   *
   * @throws {NoSolutionError} as {@link redshiftAtLuminosityDistanceMpc}
   */
  redshiftAtDistanceModulusMag(distanceModulusMag: number): number {
    return this.redshiftAtLuminosityDistanceMpc(10 ** ((distanceModulusMag - 25) / 5));
  }

  /**
   * All redshifts, ascending, at that angular-diameter distance in Mpc: as a rule two, one on each side of the maximum; one at
   * the maximum, or where the far one lies beyond {@link MAX_REDSHIFT}.
   *
   * @throws {NoSolutionError} if it is negative or larger than the maximum
   */
  redshiftsAtAngularDiameterDistanceMpc(angularDiameterDistanceMpc: number): readonly number[] {
    return redshiftsAtAngularDiameterDistance(
      this.#expansion,
      this.#pathProfile(),
      angularDiameterDistanceMpc,
      this.hubbleDistanceMpc,
    );
  }

  /**
   * All redshifts, ascending, at which one arcsecond spans that many proper kpc.
   *
   * @throws {NoSolutionError} if no redshift has that scale
   */
  redshiftsAtKpcPerArcsec(kpcPerArcsec: number): readonly number[] {
    return this.redshiftsAtAngularDiameterDistanceMpc(kpcPerArcsec / (1e3 * ARCSECOND));
  }

  /** The (first) maximum of the angular-diameter distance; undefined where it only ever grows. */
  angularDiameterDistanceMaximum(): AngularDiameterDistanceMaximum | undefined {
    return angularDiameterDistanceMaximum(this.#expansion, this.#pathProfile(), this.hubbleDistanceMpc);
  }

  /** Redshift of the antipode of a closed universe; undefined if there is none up to {@link MAX_REDSHIFT}. */
  antipodeRedshift(): number | undefined {
    return antipodeRedshift(this.#expansion, this.#pathProfile(), 0);
  }

  // ── Inside ────────────────────────────────────────────────────────────────────────────────────────────────────────

  /** @internal for the batch tables of this library */
  get expansion(): Expansion {
    return this.#expansion;
  }

  #comoving(redshift: number): number {
    return comovingBetween(this.#expansion, 0, Math.log1p(checkRedshift(redshift)));
  }

  #transverse(redshift: number, comoving: number): number {
    const q = this.omegaCurvature * comoving * comoving;
    if (q <= -Math.PI * Math.PI) throw new AntipodeError(redshift, this.antipodeRedshift() ?? redshift);
    return comoving * transverseFactor(q);
  }

  #pathProfile(): PathProfile {
    this.#profile ??= createPathProfile(this.#expansion, Math.log1p(MAX_REDSHIFT));
    return this.#profile;
  }
}

/**
 * A model from a preset or from parameters.
 *
 * @throws {OutOfDomainError} naming the parameter that is out of range
 * @throws {InvalidCosmologyError} if the preset is unknown or the parameters contradict each other
 * @throws {NoBigBangError} if H² is not positive at some redshift
 */
export function createCosmology(source: CosmologyPresetId | CosmologyParameters): Cosmology {
  if (typeof source !== 'string') return new Cosmology(source);
  if (!isCosmologyPresetId(source)) {
    const known = Object.keys(COSMOLOGY_PRESETS).join(', ');
    throw new InvalidCosmologyError(`no cosmology is called ${JSON.stringify(source)}; known are ${known}`);
  }
  return new Cosmology(COSMOLOGY_PRESETS[source].parameters, source);
}

/** Distance modulus of a luminosity distance in Mpc (> 0). Hogg 1999, eq. 25. */
export function distanceModulusFromMpc(luminosityDistanceMpc: number): number {
  return 5 * Math.log10(luminosityDistanceMpc) + 25;
}

/** @throws {OutOfDomainError} unless minimum ≤ redshift ≤ MAX_REDSHIFT */
export function checkRedshift(redshift: number, name = 'redshift', minimum = 0): number {
  if (!(typeof redshift === 'number' && redshift >= minimum && redshift <= MAX_REDSHIFT)) {
    throw new OutOfDomainError(name, redshift, { minimum, maximum: MAX_REDSHIFT });
  }
  return redshift;
}
