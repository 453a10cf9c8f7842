import { LYMAN_ALPHA_NM, LYMAN_LIMIT_NM } from './lines.js';
import { lensingMag } from './lensing.js';
import { DARK_TRANSMISSION, distanceModulusMag, inMicrons, NO_DISTANCE } from './no-light.js';
import { curveValueAt } from './sampled-curve.js';
import { AT_SOURCE, EVERYTHING, type Met, NOTHING, SeenSpectrum } from './seen-spectrum.js';
import type { ContinuumLight, LuminosityDistances, NoLight, QuotedAt } from './source-light.js';
import { abMagnitudeOfFrequency, abMagnitudeOfPhotons, responseShare, type Response } from './synthetic.js';

/** Part of a band's photons of a flat f_ν that a spectrum must reach to stand for the band. */
export const NEEDED_COVERAGE = 0.5;
const ONLY_HYDROGEN: Met = { ...NOTHING, intergalactic: true };

/**
 * Magnitudes of a continuum above the atmosphere, in any response, or why there is none.
 *
 * f_ν and response are taken as straight between their points: a flat f_ν is exact, another power law on the common rest
 * grid within 1e-6 mag. The intergalactic medium is the mean of many lines of sight.
 */
export class ContinuumMagnitudes {
  protected readonly seen: SeenSpectrum;
  protected readonly stretch: number;
  private quoted: number | NoLight | undefined;

  /**
   * @param distances  asked only where the light is given as a luminosity
   * @param isSurface  the light is per arcsec², which lensing leaves as it is
   */
  constructor(
    readonly light: ContinuumLight,
    readonly redshift: number,
    protected readonly distances: LuminosityDistances,
    protected readonly isSurface = false,
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

  /** Part of the photons of a range that the intergalactic medium lets through; undefined where the source emits none. */
  intergalacticTransmission(response: Response): number | undefined {
    const emitted = this.seen.photons(response, this.stretch, { ...EVERYTHING, intergalactic: false });
    return emitted > 0 ? this.seen.photons(response, this.stretch, EVERYTHING) / emitted : undefined;
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
    const now = distanceModulusMag(this.distances, this.redshift);
    const unlensed = light.includes.lensing ? -lensingMag(light.magnification) : 0;
    const toSource = light.frame === 'observed' ? -now + 2.5 * Math.log10(this.stretch) : this.distanceMag() - now;
    return this.abMagnitude() - quoted + emitted + toSource + unlensed;
  }

  protected included(): Met {
    const { includes, frame } = this.light;
    return {
      hostDust: includes.hostDust,
      intergalactic: frame === 'observed',
      galacticDust: includes.galacticDust && frame === 'observed',
    };
  }

  protected abMagnitude(): number {
    return this.light.quoted.magnitude + this.light.quoted.toAbMag;
  }

  protected distanceMag(): number {
    if (this.light.frame === 'observed') return 0;
    return distanceModulusMag(this.light.derivedWith ?? this.distances, this.redshift);
  }

  protected bandwidthMag(): number {
    return this.light.frame === 'observed' ? 0 : -2.5 * Math.log10(this.stretch);
  }

  protected lensingStepMag(): number {
    const { magnification, includes } = this.light;
    return this.isSurface || includes.lensing || magnification === 1 ? 0 : lensingMag(magnification);
  }

  /** Magnitude of the spectrum on its own scale. */
  protected spectrumMag(response: Response, met: Met): number {
    return abMagnitudeOfPhotons(this.seen.photons(response, this.stretch, met), response);
  }

  /** The same where the magnitude was quoted; undefined where that is the range looked at. */
  protected quotedSpectrumMag(met: Met): number | undefined {
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
  protected quotedMag(): number | NoLight | undefined {
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
  protected arrivingMag(response: Response): number | NoLight {
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
  protected coverage(response: Response): number {
    const low = this.light.spectrum.validLowNm * this.stretch;
    const high = this.light.spectrum.validHighNm * this.stretch;
    if (low <= response.lowNm && high >= response.highNm) return 1;
    return responseShare(response, low, high);
  }
}
