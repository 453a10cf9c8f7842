import { ContinuumMagnitudes, NEEDED_COVERAGE } from './continuum-magnitudes.js';
import { DUST_LAWS } from './dust.js';
import { LYMAN_ALPHA_NM } from './lines.js';
import { type Ledger, ledgerInput, type LedgerInput } from './ledger.js';
import { LIGHT_STEPS, type LightStepId } from './light-steps.js';
import { lensingMag } from './lensing.js';
import { distanceModulusMag, inMicrons, NO_DISTANCE } from './no-light.js';
import { curveValueAt } from './sampled-curve.js';
import { AT_SOURCE, EVERYTHING, type Met, NOTHING } from './seen-spectrum.js';
import type { RestLine } from './source-spectra.js';
import type { ContinuumLight, NoLight } from './source-light.js';
import { abMagnitudeOfFrequency, type Response } from './synthetic.js';

const FULL_COVERAGE = 0.99;

/** What a person must know before he trusts a value. */
export interface LightCaution {
  code: string;
  message: string;
}

/**
 * The continuum of a source as it arrives above the atmosphere, with the narrow lines drawn into it: its magnitudes, told step by
 * step, and what is drawn of it. All are of the same sampled spectrum, so the steps of a ledger add up to the synthetic magnitude
 * of what `drawnSpectrum` draws.
 */
export class ArrivingContinuum extends ContinuumMagnitudes {
  readonly kind = 'continuum';

  /** Adds the steps to a ledger, up to the top of the atmosphere; answers why there is no light, if so. */
  addSteps(ledger: Ledger, response: Response): NoLight | undefined {
    const { light, redshift } = this;
    const add = adderTo(ledger);
    add(QUOTED_STEPS[light.quoted.kind], light.quoted.magnitude, [...light.quoted.inputs], light.quoted.source);
    if (light.quoted.toAbMag !== 0)
      add('vega-to-ab', light.quoted.toAbMag, [ledgerInput('vegaToAbMag', light.quoted.toAbMag, 'mag')]);
    if (light.frame === 'rest') {
      if (redshift === 0) return NO_DISTANCE;
      const now = distanceModulusMag(this.distances, redshift);
      if (light.derivedWith !== undefined) {
        const then = distanceModulusMag(light.derivedWith, redshift);
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
    const modulus = distanceModulusMag(this.distances, redshift);
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
}

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

type Adder = (id: LightStepId, deltaMag: number, inputs: LedgerInput[], source?: string) => void;

function adderTo(ledger: Ledger): Adder {
  return (id, deltaMag, inputs, source) => {
    const text = LIGHT_STEPS[id];
    ledger.add(id, source === undefined ? text : { ...text, source }, deltaMag, inputs);
  };
}
