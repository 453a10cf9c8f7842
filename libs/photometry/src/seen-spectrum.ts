import type { IntergalacticMedium } from './intergalactic.js';
import { LYMAN_ALPHA_NM } from './lines.js';
import { curveValueAt, type SampledCurve } from './sampled-curve.js';
import type { ContinuumLight } from './source-light.js';
import { linePhotonIntegral, type PointWeights, pointWeights, type Response } from './synthetic.js';
import {
  type Forest,
  forestFrom,
  type FrequencyCurve,
  galacticDustOf,
  hostDustOn,
  logarithmsOf,
  perFrequency,
} from './way.js';

/** Which parts of the way are taken into account. */
export interface Met {
  readonly hostDust: boolean;
  readonly intergalactic: boolean;
  readonly galacticDust: boolean;
}
/** The spectrum as it is given. */
export const NOTHING: Met = { hostDust: false, intergalactic: false, galacticDust: false };
/** As the light arrives above the atmosphere. */
export const EVERYTHING: Met = { hostDust: true, intergalactic: true, galacticDust: true };
/** As the light leaves the source. */
export const AT_SOURCE: Met = { ...NOTHING, hostDust: true };

/** Lyα itself is at the edge of the forest, not in it; line lists give it in one decimal less or more. */
export const LINE_MARGIN = 1e-4;

/** −0.4 ln 10: a magnitude as the logarithm of a factor. */
const LOG_FACTOR_PER_MAG = -0.4 * Math.LN10;

/**
 * The spectrum of a source with any part of what lies on its way, on its own scale: as f_ν it keeps its values when it is
 * stretched, so that a flat one has the same magnitude at any redshift.
 *
 * f_ν times transmissions and the response are taken as straight between the spectrum's points.
 */
export class SeenSpectrum {
  readonly shape: FrequencyCurve;
  readonly stretch: number;
  private forest: Forest | undefined;
  private forestFromNm = Infinity;
  private host: Parts['host'];
  private galactic: Parts['galactic'];
  private looked: Looked | undefined;

  constructor(
    private readonly light: Pick<ContinuumLight, 'spectrum' | 'hostDust' | 'medium' | 'galacticDust'>,
    private readonly redshift: number,
  ) {
    this.stretch = 1 + redshift;
    this.shape = perFrequency(light.spectrum.continuum);
  }

  /**
   * ∫ g S d ln λ with the narrow lines.
   *
   * @param stretch  1 + z, or 1 for a response in the rest frame
   */
  photons(response: Response, stretch: number, met: Met): number {
    const parts = this.partsMet(met, response.lowNm / stretch);
    const looked = this.lookAt(response, stretch);
    const key = (parts.host ? 1 : 0) + (parts.forest ? 2 : 0) + (parts.galactic ? 4 : 0);
    return (looked.photons[key] ??= this.continuumPhotons(looked, parts) + this.linePhotons(looked, met));
  }

  private continuumPhotons(looked: Looked, parts: Parts): number {
    const { wavelengthsNm, values } = this.shape;
    const { first, weights } = weightsOf(looked, wavelengthsNm);
    const { host, forest, galactic } = parts;
    const hasDust = host !== undefined || galactic !== undefined;
    const logs = galactic === undefined ? wavelengthsNm : logarithmsOf(wavelengthsNm);
    const logStretch = Math.log(looked.stretch);
    const forestFirst = forest?.first ?? 0;
    const forestEnd = forestFirst + (forest?.transmission.length ?? 0);
    let sum = 0;
    for (let k = 0; k < weights.length; k++) {
      const i = first + k;
      let seen = weights[k]! * values[i]!;
      if (seen === 0) continue;
      if (i < forestEnd) seen *= forest!.transmission[i - forestFirst]!;
      if (hasDust) {
        let mag = 0;
        if (host !== undefined) mag += host.visualMag * host.shape[i]!;
        if (galactic !== undefined) mag += galactic(logs[i]! + logStretch);
        seen *= Math.exp(LOG_FACTOR_PER_MAG * mag);
      }
      sum += seen;
    }
    return sum;
  }

  /** g at the point of an index, with what it met. */
  valueAtNode(index: number, met: Met): number {
    const { host, forest, galactic } = this.partsMet(met, 0);
    let mag = 0;
    if (host !== undefined) mag += host.visualMag * host.shape[index]!;
    if (galactic !== undefined) mag += galactic(Math.log(this.shape.wavelengthsNm[index]! * this.stretch));
    return (
      this.shape.values[index]! * (forest?.transmission[index - forest.first] ?? 1) * Math.exp(LOG_FACTOR_PER_MAG * mag)
    );
  }

  /** g at a rest wavelength, with what it met. */
  valueAt(restNm: number, met: Met): number {
    return curveValueAt(this.shape, restNm) * this.factorAt(restNm, met);
  }

  /** Part of the light that comes through at a rest wavelength. */
  factorAt(restNm: number, met: Met): number {
    const { medium } = this.light;
    const { host, galactic } = this.partsMet({ ...met, intergalactic: false }, restNm);
    const isAbsorbed = met.intergalactic && medium !== null && restNm < LYMAN_ALPHA_NM * (1 - LINE_MARGIN);
    const depth = isAbsorbed ? medium.opticalDepth(restNm * this.stretch, this.redshift) : 0;
    let mag = 0;
    if (host !== undefined) {
      const attenuation: SampledCurve = { wavelengthsNm: this.shape.wavelengthsNm, values: host.shape };
      mag += host.visualMag * curveValueAt(attenuation, restNm);
    }
    if (galactic !== undefined) mag += galactic(Math.log(restNm * this.stretch));
    return Math.exp(LOG_FACTOR_PER_MAG * mag - depth);
  }

  private linePhotons({ response, stretch }: Looked, met: Met): number {
    let sum = 0;
    for (const line of this.light.spectrum.lines) {
      const observedNm = line.restWavelengthNm * stretch;
      if (observedNm < response.lowNm || observedNm > response.highNm) continue;
      // λ² f_λ at rest wavelengths keeps λ F of a line at its rest wavelength.
      const flux = (line.flux / stretch) * this.factorAt(line.restWavelengthNm, met);
      sum += linePhotonIntegral(response, observedNm, flux);
    }
    return sum;
  }

  private lookAt(response: Response, stretch: number): Looked {
    if (this.looked?.response !== response || this.looked.stretch !== stretch) {
      this.looked = { response, stretch, photons: [] };
    }
    return this.looked;
  }

  /** Kept for what is looked at next, if that does not begin at shorter wavelengths. */
  private forestFrom(restNm: number, medium: IntergalacticMedium): Forest {
    if (this.forest === undefined || restNm < this.forestFromNm) {
      this.forestFromNm = restNm;
      this.forest = forestFrom(restNm, medium, this.shape.wavelengthsNm, this.redshift);
    }
    return this.forest;
  }

  /** Of the parts of the way that are to be met, those there are beyond a rest wavelength. */
  private partsMet(met: Met, fromRestNm: number): Parts {
    const { hostDust, medium, galacticDust } = this.light;
    const nodesNm = this.shape.wavelengthsNm;
    const isAbsorbed =
      met.intergalactic && medium !== null && this.redshift > 0 && fromRestNm < medium.jumpsRestNm.at(-1)!;
    return {
      host: met.hostDust && hostDust !== null ? (this.host ??= hostDustOn(hostDust, nodesNm)) : undefined,
      forest: isAbsorbed ? this.forestFrom(fromRestNm, medium) : undefined,
      galactic:
        met.galacticDust && galacticDust !== null ? (this.galactic ??= galacticDustOf(galacticDust)) : undefined,
    };
  }
}

/** A response that was looked at, with what was found: it is asked for with more and with less on the way. */
interface Looked {
  readonly response: Response;
  readonly stretch: number;
  /** By the parts that are met. */
  readonly photons: number[];
}

/** Of what was looked at last by anybody, so that lists of thousands need no new array for each of their ranges. */
let weighed: { looked: Looked; points: PointWeights } | undefined;
const SCRATCH = new Float64Array(2048);

function weightsOf(looked: Looked, nodesNm: Float64Array): PointWeights {
  if (weighed?.looked !== looked) {
    weighed = { looked, points: pointWeights(looked.response, nodesNm, looked.stretch, SCRATCH) };
  }
  return weighed.points;
}

/** What is on the way, as tables on the points of the spectrum. */
interface Parts {
  readonly host: { readonly shape: Float64Array; readonly visualMag: number } | undefined;
  readonly forest: Forest | undefined;
  readonly galactic: ((logObservedNm: number) => number) | undefined;
}
