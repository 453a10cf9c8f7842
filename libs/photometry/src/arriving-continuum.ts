import { DUST_LAWS } from './dust.js';
import { LYMAN_ALPHA_NM, LYMAN_LIMIT_NM } from './lines.js';
import { Ledger, ledgerInput, type LedgerInput } from './ledger.js';
import { LIGHT_STEPS, type LightStepId } from './light-steps.js';
import { lensingMag } from './lensing.js';
import { curveValueAt, firstAbove, type SampledCurve } from './sampled-curve.js';
import type { RestLine } from './source-spectra.js';
import type { ContinuumLight, LuminosityDistances, NoLight } from './source-light.js';
import {
  abMagnitudeOfFrequency,
  abMagnitudeOfPhotons,
  frequencyIntegral,
  linePhotonIntegral,
  responseShare,
  type Response,
} from './synthetic.js';
import { forestTransmission, galacticDustOf, hostDustOn, perFrequency } from './way.js';

/** Below this share of its photons a band is dark: the mean models say nothing reliable about the rest. */
export const DARK_TRANSMISSION = 0.01;
/** Part of a band's photons of a flat f_ν that a spectrum must reach to stand for the band. */
const NEEDED_COVERAGE = 0.5;
const FULL_COVERAGE = 0.99;

/** Which parts of the way are taken into account. */
interface Met {
  hostDust: boolean;
  intergalactic: boolean;
  galacticDust: boolean;
}
const NOTHING: Met = { hostDust: false, intergalactic: false, galacticDust: false };
const EVERYTHING: Met = { hostDust: true, intergalactic: true, galacticDust: true };

export interface LightCaution {
  code: string;
  message: string;
}

/**
 * The continuum of a source as it arrives above the atmosphere, with the narrow lines drawn into it.
 *
 * All magnitudes are of the same sampled spectrum, so the steps of a ledger add up to the synthetic magnitude of what
 * {@link arrivingCurve} of `arriving-spectrum.ts` draws.
 *
 * f_ν and response are taken as straight between their points: a flat f_ν is exact, another power law on the common rest
 * grid within 1e-6 mag. The intergalactic medium is the mean of many lines of sight.
 */
export class ArrivingContinuum {
  readonly kind = 'continuum';
  private readonly stretch: number;
  /** g = λ² f_λ ∝ f_ν at rest wavelengths, which is straight between its points. */
  private readonly shape: SampledCurve;
  private readonly nodesNm: Float64Array;
  private readonly values: Float64Array;
  private forest: Float64Array | undefined;
  private host: { shape: Float64Array; visualMag: number } | undefined;
  private galactic: ((observedNm: number) => number) | undefined;
  private quoted: number | NoLight | undefined;

  /**
   * @param distances  asked only where the light is given as a luminosity
   * @param isSurface  the light is per arcsec², which lensing leaves as it is
   */
  constructor(
    readonly light: ContinuumLight,
    readonly redshift: number,
    private readonly distances: LuminosityDistances,
    private readonly isSurface = false,
  ) {
    this.stretch = 1 + redshift;
    this.shape = perFrequency(light.spectrum.continuum);
    this.nodesNm = this.shape.wavelengthsNm;
    this.values = this.shape.values;
  }

  /** AB magnitude above the atmosphere, or why there is none. */
  magnitudeIn(response: Response): number | NoLight {
    const dark = this.whyDark(response);
    if (dark !== undefined) return dark;
    const quoted = this.quotedMag();
    if (typeof quoted === 'object') return quoted;
    const arriving = this.spectrumMag(response, EVERYTHING);
    const reference = quoted ?? this.spectrumMag(response, this.included());
    return this.abMagnitude() + this.distanceMag() + this.bandwidthMag() + arriving - reference + this.lensingStepMag();
  }

  /** Adds the steps to a ledger, up to the top of the atmosphere; answers why there is no light, if so. */
  addSteps(ledger: Ledger, response: Response): NoLight | undefined {
    const { light, redshift } = this;
    const add = (id: LightStepId, deltaMag: number, inputs: LedgerInput[], source?: string): void => {
      const text = LIGHT_STEPS[id];
      ledger.add(id, source === undefined ? text : { ...text, source }, deltaMag, inputs);
    };
    add(QUOTED_STEPS[light.quoted.kind], light.quoted.magnitude, [...light.quoted.inputs], light.quoted.source);
    if (light.quoted.toAbMag !== 0)
      add('vega-to-ab', light.quoted.toAbMag, [ledgerInput('vegaToAbMag', light.quoted.toAbMag, 'mag')]);
    if (light.frame === 'rest') {
      const now = this.modulus(this.distances);
      if (light.derivedWith !== undefined) {
        const then = this.modulus(light.derivedWith);
        add('literature-cosmology', then - now, [
          ledgerInput('literatureDistanceModulusMag', then, 'mag'),
          ledgerInput('distanceModulusMag', now, 'mag'),
        ]);
      }
      add('distance-modulus', now, [
        ledgerInput('redshift', redshift),
        ledgerInput('luminosityDistanceMpc', this.distances.luminosityDistanceMpc(redshift), 'Mpc'),
      ]);
      add('redshift-bandwidth', this.bandwidthMag(), [ledgerInput('redshift', redshift)]);
    }
    const dark = this.whyDark(response) ?? this.whyQuotedDark();
    if (dark !== undefined) return dark;

    const included = this.included();
    let met = NOTHING;
    let quotedMet = NOTHING;
    let here = this.spectrumMag(response, met);
    let quoted = this.quotedSpectrumMag(quotedMet) ?? here;
    if (light.at.kind !== 'range') {
      add('spectrum', here - quoted, [
        ledgerInput('quotedAtNm', quotedWavelengthNm(light), 'nm'),
        ledgerInput('pivotWavelengthNm', response.pivotWavelengthNm, 'nm'),
      ]);
    }
    const pass = (id: LightStepId, part: keyof Met, isIncluded: boolean, inputs: LedgerInput[], source: string) => {
      met = { ...met, [part]: true };
      const next = this.spectrumMag(response, met);
      let deltaMag = next - here;
      here = next;
      if (isIncluded) {
        quotedMet = { ...quotedMet, [part]: true };
        const nextQuoted = this.quotedSpectrumMag(quotedMet) ?? this.spectrumMag(response, quotedMet);
        deltaMag -= nextQuoted - quoted;
        quoted = nextQuoted;
      }
      add(id, deltaMag, inputs, source);
    };
    if (light.hostDust !== null) {
      pass(
        'host-dust',
        'hostDust',
        included.hostDust,
        [ledgerInput('colourExcessMag', light.hostDust.colourExcessMag, 'mag')],
        DUST_LAWS[light.hostDust.law].source,
      );
    }
    if (light.medium !== null && redshift > 0) {
      pass(
        'intergalactic',
        'intergalactic',
        included.intergalactic,
        [ledgerInput('redshift', redshift), ledgerInput('lymanAlphaNm', LYMAN_ALPHA_NM * this.stretch, 'nm')],
        light.medium.source,
      );
    }
    const lensing = this.lensingStepMag();
    if (lensing !== 0) add('lensing', lensing, [ledgerInput('magnification', light.magnification)]);
    if (light.galacticDust !== null) {
      pass(
        'galactic-dust',
        'galacticDust',
        included.galacticDust,
        [ledgerInput('colourExcessMag', light.galacticDust.colourExcessMag, 'mag')],
        DUST_LAWS[light.galacticDust.law].source,
      );
    }
    return undefined;
  }

  /** Part of the photons of a range that the intergalactic medium lets through; undefined where the source emits none. */
  intergalacticTransmission(response: Response): number | undefined {
    const emitted = this.photons(response, this.stretch, { ...EVERYTHING, intergalactic: false });
    return emitted > 0 ? this.photons(response, this.stretch, EVERYTHING) / emitted : undefined;
  }

  /** λ² f_λ on the spectrum's scale at the point of an index, as it arrives or without absorption outside the source. */
  perFrequencyAtNode(index: number, isAbsorbed: boolean): number {
    return this.values[index]! * this.factorAt(index, isAbsorbed ? EVERYTHING : { ...NOTHING, hostDust: true });
  }

  /** What of a narrow line of the spectrum comes through, as it arrives and without absorption outside the source. */
  lineFactors(restNm: number): { arrives: number; unabsorbed: number } {
    return {
      arrives: this.factorAtRest(restNm, EVERYTHING),
      unabsorbed: this.factorAtRest(restNm, { ...NOTHING, hostDust: true }),
    };
  }

  /** A narrow line of the spectrum as it arrives; undefined where the light has no scale of its own or nothing arrives. */
  lineStrength(line: RestLine): { fluxErgSCm2: number; observedEquivalentWidthNm: number } | undefined {
    const normalisation = this.normalisationMag();
    const continuum = curveValueAt(this.light.spectrum.continuum, line.restWavelengthNm);
    if (typeof normalisation !== 'number' || !(continuum > 0)) return undefined;
    const { arrives } = this.lineFactors(line.restWavelengthNm);
    return {
      // The scale is that of λ² f_λ at rest wavelengths: a flux per rest wavelength falls by 1 + z where it is observed.
      fluxErgSCm2: (line.flux / this.stretch) * arrives * 10 ** (-0.4 * normalisation),
      observedEquivalentWidthNm: (line.flux / continuum) * this.stretch,
    };
  }

  /**
   * What is added to a magnitude of the spectrum on its own scale to give the arriving one; undefined where the
   * light was quoted as the average over the range looked at, so that only that range has a magnitude.
   */
  normalisationMag(): number | NoLight | undefined {
    const quoted = this.quotedMag();
    if (typeof quoted !== 'number') return quoted;
    return this.abMagnitude() + this.distanceMag() + this.bandwidthMag() + this.lensingStepMag() - quoted;
  }

  /**
   * AB absolute magnitude of the continuum at a rest wavelength, as it leaves the source, without lensing: undefined where
   * there is no distance or no such light.
   */
  absoluteMagnitudeAt(restNm: number): number | undefined {
    const quoted = this.quotedMag();
    const value = curveValueAt(this.shape, restNm);
    if (typeof quoted !== 'number' || !(value > 0) || this.isSurface || this.redshift === 0) return undefined;
    const { light } = this;
    const emitted = abMagnitudeOfFrequency(value * this.factorAtRest(restNm, { ...NOTHING, hostDust: true }));
    const now = this.modulus(this.distances);
    const unlensed = light.includes.lensing ? -lensingMag(light.magnification) : 0;
    const toSource = light.frame === 'observed' ? -now + 2.5 * Math.log10(this.stretch) : this.distanceMag() - now;
    return this.abMagnitude() - quoted + emitted + toSource + unlensed;
  }

  cautions(response: Response): LightCaution[] {
    const { spectrum } = this.light;
    const restLowNm = response.lowNm / this.stretch;
    const restHighNm = response.highNm / this.stretch;
    const cautions = spectrum.cautions
      .filter(({ appliesNm }) => appliesNm === null || (appliesNm.lowNm < restHighNm && appliesNm.highNm > restLowNm))
      .map(({ code, message }) => ({ code, message }));
    const coverage = this.coverage(response);
    if (coverage < FULL_COVERAGE && coverage >= NEEDED_COVERAGE) {
      cautions.push({
        code: 'spectrumCoversPart',
        message: `The spectrum covers ${Math.round(100 * coverage)} % of this range; what lies beyond it counts as dark.`,
      });
    }
    const lymanAlphaNm = LYMAN_ALPHA_NM * this.stretch;
    if (this.light.medium !== null && lymanAlphaNm > response.lowNm && lymanAlphaNm < response.highNm) {
      cautions.push({
        code: 'lymanBreakInBand',
        message: `The Lyman break at ${inMicrons(lymanAlphaNm)} falls inside this range: its magnitude depends on the redshift and on the line of sight.`,
      });
    }
    return cautions;
  }

  private included(): Met {
    const { includes, frame } = this.light;
    return {
      hostDust: includes.hostDust,
      intergalactic: frame === 'observed',
      galacticDust: includes.galacticDust && frame === 'observed',
    };
  }

  private abMagnitude(): number {
    return this.light.quoted.magnitude + this.light.quoted.toAbMag;
  }

  private distanceMag(): number {
    if (this.light.frame === 'observed') return 0;
    return this.modulus(this.light.derivedWith ?? this.distances);
  }

  private bandwidthMag(): number {
    return this.light.frame === 'observed' ? 0 : -2.5 * Math.log10(this.stretch);
  }

  private modulus(distances: LuminosityDistances): number {
    return 5 * Math.log10(distances.luminosityDistanceMpc(this.redshift)) + 25;
  }

  private lensingStepMag(): number {
    const { magnification, includes } = this.light;
    return this.isSurface || includes.lensing || magnification === 1 ? 0 : lensingMag(magnification);
  }

  /**
   * Magnitude of the spectrum on its own scale. As f_ν it keeps its values when it is stretched, so that a flat one has the
   * same magnitude at any redshift.
   */
  private spectrumMag(response: Response, met: Met): number {
    return abMagnitudeOfPhotons(this.photons(response, this.stretch, met), response);
  }

  /** The same where the magnitude was quoted; undefined where that is the range looked at. */
  private quotedSpectrumMag(met: Met): number | undefined {
    const { at, frame } = this.light;
    const stretch = frame === 'observed' ? this.stretch : 1;
    switch (at.kind) {
      case 'range':
        return undefined;
      case 'response':
        return abMagnitudeOfPhotons(this.photons(at.response, stretch, met), at.response);
      case 'wavelength': {
        const restNm = at.wavelengthNm / stretch;
        return abMagnitudeOfFrequency(curveValueAt(this.shape, restNm) * this.factorAtRest(restNm, met));
      }
    }
  }

  /** Magnitude of the spectrum where the light was quoted; undefined where that is the range looked at itself. */
  private quotedMag(): number | NoLight | undefined {
    if (this.light.at.kind === 'range') return undefined;
    return (this.quoted ??= this.whyQuotedDark() ?? this.quotedSpectrumMag(this.included()) ?? NaN);
  }

  private whyQuotedDark(): NoLight | undefined {
    const { at, frame, medium } = this.light;
    if (at.kind === 'range') return undefined;
    const stretch = frame === 'observed' ? this.stretch : 1;
    const place = at.kind === 'response' ? at.label : `${Number(at.wavelengthNm.toPrecision(4))} nm`;
    if (at.kind === 'response') {
      const plain = this.photons(at.response, stretch, NOTHING);
      if (!(plain > 0)) {
        return {
          code: 'noFluxInQuotedBand',
          message: `The spectrum chosen has no light in ${place}, where the magnitude is quoted.`,
        };
      }
      if (frame === 'observed' && medium !== null) {
        const left = this.photons(at.response, stretch, { ...NOTHING, intergalactic: true });
        if (left < DARK_TRANSMISSION * plain) {
          return {
            code: 'noFluxInQuotedBand',
            message: `The magnitude is quoted in ${place}, where no light of redshift ${this.redshift} arrives: ${this.breakText()}.`,
          };
        }
      }
      return undefined;
    }
    const restNm = at.wavelengthNm / stretch;
    if (curveValueAt(this.shape, restNm) > 0) return undefined;
    return {
      code: 'noFluxInQuotedBand',
      message: `The spectrum chosen has no light at ${place}, where the magnitude is quoted.`,
    };
  }

  private whyDark(response: Response): NoLight | undefined {
    const coverage = this.coverage(response);
    if (coverage < NEEDED_COVERAGE) {
      const { validLowNm, validHighNm } = this.light.spectrum;
      return {
        code: 'spectrumEnds',
        message: `The spectrum reaches from ${inMicrons(validLowNm * this.stretch)} to ${inMicrons(validHighNm * this.stretch)} at this redshift and says nothing about this range.`,
      };
    }
    const plain = this.photons(response, this.stretch, NOTHING);
    if (!(plain > 0)) return this.noFlux();
    if (this.light.medium === null || this.redshift === 0) return undefined;
    if (response.lowNm >= LYMAN_ALPHA_NM * this.stretch) return undefined;
    const left = this.photons(response, this.stretch, { ...NOTHING, intergalactic: true });
    return left < DARK_TRANSMISSION * plain ? this.noFlux() : undefined;
  }

  private noFlux(): NoLight {
    return { code: 'noFluxInBand', message: `No flux in this band: ${this.breakText()}.` };
  }

  private breakText(): string {
    const isForestDark =
      this.light.medium !== null &&
      Math.exp(-this.light.medium.opticalDepth(0.97 * LYMAN_ALPHA_NM * this.stretch, this.redshift)) < 0.1;
    const breakNm = (isForestDark ? LYMAN_ALPHA_NM : LYMAN_LIMIT_NM) * this.stretch;
    return `the Lyman break is at ${inMicrons(breakNm)}`;
  }

  /** Part of a flat f_ν's photons in the response that lies where the spectrum is known. */
  private coverage(response: Response): number {
    const low = this.light.spectrum.validLowNm * this.stretch;
    const high = this.light.spectrum.validHighNm * this.stretch;
    if (low <= response.lowNm && high >= response.highNm) return 1;
    return responseShare(response, low, high);
  }

  private photons(response: Response, stretch: number, met: Met): number {
    const { nodesNm } = this;
    const first = Math.max(firstAbove(nodesNm, response.lowNm / stretch) - 1, 0);
    const end = Math.min(firstAbove(nodesNm, response.highNm / stretch) + 1, nodesNm.length);
    if (end - first < 2) return 0;
    const seen = this.seen(first, end, stretch, met);
    return frequencyIntegral(response, nodesNm, seen, stretch, first) + this.linePhotons(response, stretch, met);
  }

  /** Values from one point to before another, with what they met. */
  private seen(first: number, end: number, stretch: number, met: Met): Float64Array {
    const seen = this.values.slice(first, end);
    const { light } = this;
    if (met.hostDust && light.hostDust !== null) {
      const { shape, visualMag } = this.hostDust();
      for (let i = first; i < end; i++) seen[i - first]! *= 10 ** (-0.4 * visualMag * shape[i]!);
    }
    if (met.intergalactic && light.medium !== null && this.redshift > 0) {
      const forest = this.forestOf();
      const last = Math.min(end, forest.length);
      for (let i = first; i < last; i++) seen[i - first]! *= forest[i]!;
    }
    if (met.galacticDust && light.galacticDust !== null) {
      const attenuationMag = this.galacticDust();
      for (let i = first; i < end; i++) {
        seen[i - first]! *= 10 ** (-0.4 * attenuationMag(this.nodesNm[i]! * stretch));
      }
    }
    return seen;
  }

  private linePhotons(response: Response, stretch: number, met: Met): number {
    let sum = 0;
    for (const line of this.light.spectrum.lines) {
      const observedNm = line.restWavelengthNm * stretch;
      if (observedNm < response.lowNm || observedNm > response.highNm) continue;
      // λ² f_λ at rest wavelengths keeps λ F of a line at its rest wavelength.
      const flux = (line.flux / stretch) * this.factorAtRest(line.restWavelengthNm, met);
      sum += linePhotonIntegral(response, observedNm, flux);
    }
    return sum;
  }

  private factorAt(index: number, met: Met): number {
    const { light } = this;
    let mag = 0;
    let factor = 1;
    if (met.hostDust && light.hostDust !== null) mag += this.hostDust().visualMag * this.hostDust().shape[index]!;
    if (met.intergalactic && light.medium !== null && this.redshift > 0) factor = this.forestOf()[index] ?? 1;
    if (met.galacticDust && light.galacticDust !== null)
      mag += this.galacticDust()(this.nodesNm[index]! * this.stretch);
    return factor * 10 ** (-0.4 * mag);
  }

  private factorAtRest(restNm: number, met: Met): number {
    const { light, nodesNm } = this;
    let mag = 0;
    let depth = 0;
    if (met.hostDust && light.hostDust !== null) {
      const { shape, visualMag } = this.hostDust();
      mag += visualMag * curveValueAt({ wavelengthsNm: nodesNm, values: shape }, restNm);
    }
    if (met.intergalactic && light.medium !== null && restNm < LYMAN_ALPHA_NM * (1 - LINE_MARGIN)) {
      depth = light.medium.opticalDepth(restNm * this.stretch, this.redshift);
    }
    if (met.galacticDust && light.galacticDust !== null) mag += this.galacticDust()(restNm * this.stretch);
    return Math.exp(-depth) * 10 ** (-0.4 * mag);
  }

  private forestOf(): Float64Array {
    return (this.forest ??= forestTransmission(this.light.medium!, this.nodesNm, this.redshift));
  }

  private hostDust() {
    return (this.host ??= hostDustOn(this.light.hostDust!, this.nodesNm));
  }

  private galacticDust() {
    return (this.galactic ??= galacticDustOf(this.light.galacticDust!));
  }
}

/** Lyα itself is at the edge of the forest, not in it; line lists give it in one decimal less or more. */
const LINE_MARGIN = 1e-4;

const QUOTED_STEPS = {
  apparentMagnitude: 'apparent-magnitude',
  absoluteMagnitude: 'absolute-magnitude',
  starFormationRate: 'star-formation-rate',
  typical: 'typical-magnitude',
} as const satisfies Record<ContinuumLight['quoted']['kind'], LightStepId>;

function quotedWavelengthNm({ at }: ContinuumLight): number {
  if (at.kind === 'range') return NaN;
  return at.kind === 'wavelength' ? at.wavelengthNm : at.response.pivotWavelengthNm;
}

/** A wavelength for a sentence: `1.13 µm`. */
export function inMicrons(wavelengthNm: number): string {
  return `${Number((wavelengthNm / 1000).toPrecision(3))} µm`;
}
