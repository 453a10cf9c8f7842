import { DUST_LAWS } from './dust.js';
import { LYMAN_ALPHA_NM, LYMAN_LIMIT_NM } from './lines.js';
import { type Ledger, ledgerInput, type LedgerInput } from './ledger.js';
import { LIGHT_STEPS, type LightStepId } from './light-steps.js';
import { lensingMag } from './lensing.js';
import { curveValueAt } from './sampled-curve.js';
import { AT_SOURCE, EVERYTHING, type Met, NOTHING, SeenSpectrum } from './seen-spectrum.js';
import type { RestLine } from './source-spectra.js';
import type { ContinuumLight, LuminosityDistances, NoLight, QuotedAt } from './source-light.js';
import { abMagnitudeOfFrequency, abMagnitudeOfPhotons, responseShare, type Response } from './synthetic.js';

/** Below this share of its photons a band is dark: the mean models say nothing reliable about the rest. */
export const DARK_TRANSMISSION = 0.01;
/** Part of a band's photons of a flat f_ν that a spectrum must reach to stand for the band. */
const NEEDED_COVERAGE = 0.5;
const FULL_COVERAGE = 0.99;

/** What a person must know before he trusts a value. */
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
  private readonly seen: SeenSpectrum;
  private readonly stretch: number;
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
    this.seen = new SeenSpectrum(light, redshift);
  }

  /** AB magnitude above the atmosphere, or why there is none. */
  magnitudeIn(response: Response): number | NoLight {
    const arriving = this.arrivingMag(response);
    if (typeof arriving === 'object') return arriving;
    const quoted = this.quotedMag();
    if (typeof quoted === 'object') return quoted;
    const reference = quoted ?? this.spectrumMag(response, this.included());
    return this.abMagnitude() + this.distanceMag() + this.bandwidthMag() + arriving - reference + this.lensingStepMag();
  }

  /** Adds the steps to a ledger, up to the top of the atmosphere; answers why there is no light, if so. */
  addSteps(ledger: Ledger, response: Response): NoLight | undefined {
    const { light, redshift } = this;
    const add = adderTo(ledger);
    add(QUOTED_STEPS[light.quoted.kind], light.quoted.magnitude, [...light.quoted.inputs], light.quoted.source);
    if (light.quoted.toAbMag !== 0)
      add('vega-to-ab', light.quoted.toAbMag, [ledgerInput('vegaToAbMag', light.quoted.toAbMag, 'mag')]);
    if (light.frame === 'rest') {
      if (redshift === 0) return NO_DISTANCE;
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
    for (const mag of [this.arrivingMag(response), this.quotedMag()]) if (typeof mag === 'object') return mag;

    if (light.at.kind !== 'range') {
      const quoted = this.quotedSpectrumMag(NOTHING) ?? NaN;
      this.addSpectrum(add, response, quoted, quotedWavelengthNm(light));
    }
    const quotedMag = (met: Met): number => this.quotedSpectrumMag(met) ?? this.spectrumMag(response, met);
    this.addWay(add, response, this.included(), quotedMag, this.lensingStepMag());
    return undefined;
  }

  /**
   * The same way from its beginning, where an observed brightness was given: from the luminosity that it implies, through all that
   * lies between, to the same total. The luminosity is that at the rest wavelength seen in the middle of the range, before host
   * dust and lensing.
   *
   * Only for a light with a distance that has a scale of its own; otherwise as {@link addSteps}.
   */
  addStepsFromSource(ledger: Ledger, response: Response): NoLight | undefined {
    const { light, redshift } = this;
    const normalisation = this.normalisationMag();
    const restNm = response.pivotWavelengthNm / this.stretch;
    const emitted = this.seen.valueAt(restNm, NOTHING);
    const isPossible = light.frame === 'observed' && redshift > 0 && !this.isSurface && emitted > 0;
    if (!isPossible || typeof normalisation !== 'number') return this.addSteps(ledger, response);
    const dark = this.arrivingMag(response);
    if (typeof dark === 'object') return this.addSteps(ledger, response);
    const add = adderTo(ledger);
    const quoted = abMagnitudeOfFrequency(emitted);
    const modulus = this.modulus(this.distances);
    const bandwidth = -2.5 * Math.log10(this.stretch);
    const lensing = light.magnification === 1 ? 0 : lensingMag(light.magnification);
    add('implied-magnitude', normalisation + quoted - lensing - modulus - bandwidth, [
      ...light.quoted.inputs,
      ledgerInput('restWavelengthNm', restNm, 'nm'),
    ]);
    add('distance-modulus', modulus, [
      ledgerInput('redshift', redshift),
      ledgerInput('luminosityDistanceMpc', this.distances.luminosityDistanceMpc(redshift), 'Mpc'),
    ]);
    add('redshift-bandwidth', bandwidth, [ledgerInput('redshift', redshift)]);
    this.addSpectrum(add, response, quoted, restNm * this.stretch);
    this.addWay(add, response, NOTHING, () => NaN, lensing);
    return undefined;
  }

  private addSpectrum(add: Adder, response: Response, quotedMag: number, quotedAtNm: number): void {
    add('spectrum', this.spectrumMag(response, NOTHING) - quotedMag, [
      ledgerInput('quotedAtNm', quotedAtNm, 'nm'),
      ledgerInput('pivotWavelengthNm', response.pivotWavelengthNm, 'nm'),
    ]);
  }

  /** Dust, hydrogen and lenses, in the order the light meets them. What the value given contains only adds its colour. */
  private addWay(
    add: Adder,
    response: Response,
    included: Met,
    quotedMag: (met: Met) => number,
    lensing: number,
  ): void {
    const { light, redshift } = this;
    let met = NOTHING;
    let quotedMet = NOTHING;
    let here = this.spectrumMag(response, met);
    let quoted = quotedMag(quotedMet);
    const pass = (id: LightStepId, part: keyof Met, isIncluded: boolean, inputs: LedgerInput[], source: string) => {
      met = { ...met, [part]: true };
      const next = this.spectrumMag(response, met);
      let deltaMag = next - here;
      here = next;
      if (isIncluded) {
        quotedMet = { ...quotedMet, [part]: true };
        const nextQuoted = quotedMag(quotedMet);
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
  }

  /** Part of the photons of a range that the intergalactic medium lets through; undefined where the source emits none. */
  intergalacticTransmission(response: Response): number | undefined {
    const emitted = this.seen.photons(response, this.stretch, { ...EVERYTHING, intergalactic: false });
    return emitted > 0 ? this.seen.photons(response, this.stretch, EVERYTHING) / emitted : undefined;
  }

  /** λ² f_λ on the spectrum's scale at the point of an index, as it arrives or without absorption outside the source. */
  perFrequencyAtNode(index: number, isAbsorbed: boolean): number {
    return this.seen.valueAtNode(index, isAbsorbed ? EVERYTHING : AT_SOURCE);
  }

  /** What of a narrow line of the spectrum comes through, as it arrives and without absorption outside the source. */
  lineFactors(restNm: number): { arrives: number; unabsorbed: number } {
    return {
      arrives: this.seen.factorAt(restNm, EVERYTHING),
      unabsorbed: this.seen.factorAt(restNm, AT_SOURCE),
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
    const value = this.seen.valueAt(restNm, AT_SOURCE);
    if (typeof quoted !== 'number' || !(value > 0) || this.isSurface || this.redshift === 0) return undefined;
    const { light } = this;
    const emitted = abMagnitudeOfFrequency(value);
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
      const beyondNm = restLowNm < spectrum.validLowNm ? restLowNm : restHighNm;
      const beyond = curveValueAt(spectrum.continuum, beyondNm) > 0 ? 'is its continuation, a guess' : 'counts as dark';
      cautions.push({
        code: 'spectrumCoversPart',
        message: `The spectrum covers ${Math.round(100 * coverage)} % of this range; what lies beyond it ${beyond}.`,
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

  /** Magnitude of the spectrum on its own scale. */
  private spectrumMag(response: Response, met: Met): number {
    return abMagnitudeOfPhotons(this.seen.photons(response, this.stretch, met), response);
  }

  /** The same where the magnitude was quoted; undefined where that is the range looked at. */
  private quotedSpectrumMag(met: Met): number | undefined {
    const { at, frame } = this.light;
    const stretch = frame === 'observed' ? this.stretch : 1;
    switch (at.kind) {
      case 'range':
        return undefined;
      case 'response':
        return abMagnitudeOfPhotons(this.seen.photons(at.response, stretch, met), at.response);
      case 'wavelength':
        return abMagnitudeOfFrequency(this.seen.valueAt(at.wavelengthNm / stretch, met));
    }
  }

  /** Magnitude of the spectrum where the light was quoted; undefined where that is the range looked at itself. */
  private quotedMag(): number | NoLight | undefined {
    if (this.light.at.kind === 'range') return undefined;
    return (this.quoted ??= this.whyQuotedDark() ?? this.quotedSpectrumMag(this.included()) ?? NaN);
  }

  private whyQuotedDark(): NoLight | undefined {
    const { at, frame } = this.light;
    if (at.kind === 'range') return undefined;
    if (frame === 'rest' && this.redshift === 0) return NO_DISTANCE;
    if (!this.isQuotedDark(at)) return undefined;
    const place = at.kind === 'response' ? `in ${at.label}` : `at ${Number(at.wavelengthNm.toPrecision(4))} nm`;
    const isEmitted = (this.quotedSpectrumMag(NOTHING) ?? 0) < Infinity;
    return {
      code: 'noFluxInQuotedBand',
      message:
        frame === 'observed' && isEmitted
          ? `The magnitude is quoted ${place}, where no light of redshift ${this.redshift} arrives: ${this.breakText()}.`
          : `The spectrum chosen has no light ${place}, where the magnitude is quoted.`,
    };
  }

  private isQuotedDark(at: Exclude<QuotedAt, { kind: 'range' }>): boolean {
    const stretch = this.light.frame === 'observed' ? this.stretch : 1;
    const included = this.included();
    if (at.kind === 'response') return this.isDark(at.response, stretch, included);
    const restNm = at.wavelengthNm / stretch;
    const transmission = included.intergalactic ? this.seen.factorAt(restNm, ONLY_HYDROGEN) : 1;
    return !(curveValueAt(this.seen.shape, restNm) > 0 && transmission >= DARK_TRANSMISSION);
  }

  /** Magnitude of the spectrum as it arrives, on its own scale, or why nothing does. */
  private arrivingMag(response: Response): number | NoLight {
    if (this.coverage(response) < NEEDED_COVERAGE) {
      const { validLowNm, validHighNm } = this.light.spectrum;
      return {
        code: 'spectrumEnds',
        message: `The spectrum reaches from ${inMicrons(validLowNm * this.stretch)} to ${inMicrons(validHighNm * this.stretch)} at this redshift and says nothing about this range.`,
      };
    }
    return this.isDark(response, this.stretch, EVERYTHING) ? this.noFlux() : this.spectrumMag(response, EVERYTHING);
  }

  /**
   * Whether less than {@link DARK_TRANSMISSION} of what the source would shine in the range, were there no hydrogen in it or on the
   * way, is left. Where its spectrum begins inside the range, at the Lyman limit, a flat f_ν stands for what is missing.
   */
  private isDark(response: Response, stretch: number, met: Met): boolean {
    const emitted = this.seen.photons(response, stretch, { ...met, intergalactic: false });
    if (!(emitted > 0)) return true;
    const litFromNm = this.seen.shape.litFromNm * stretch;
    const lit = litFromNm > response.lowNm ? responseShare(response, litFromNm, response.highNm) : 1;
    return this.seen.photons(response, stretch, met) * lit < DARK_TRANSMISSION * emitted;
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
}

const ONLY_HYDROGEN: Met = { ...NOTHING, intergalactic: true };

/** A luminosity at redshift 0. */
export const NO_DISTANCE: NoLight = {
  code: 'noDistance',
  message: 'At redshift 0 there is no distance, which a luminosity needs.',
};

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

type Adder = (id: LightStepId, deltaMag: number, inputs: LedgerInput[], source?: string) => void;

function adderTo(ledger: Ledger): Adder {
  return (id, deltaMag, inputs, source) => {
    const text = LIGHT_STEPS[id];
    ledger.add(id, source === undefined ? text : { ...text, source }, deltaMag, inputs);
  };
}
