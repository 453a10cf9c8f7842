import type { LineId, SpectralLine } from '../lines.js';
import type { FileProvenance } from '../provenance.js';
import type { SampledCurve } from '../sampled-curve.js';

/** A narrow emission line. */
export interface RestLine {
  readonly id: LineId;
  readonly label: string;
  /** In vacuum. */
  readonly restWavelengthNm: number;
  /** In the unit of the continuum × nm. */
  readonly flux: number;
  /** Full width at half maximum. */
  readonly velocityWidthKmS: number;
}

/** What a person must know before he trusts a spectrum. */
export interface SpectrumCaution {
  readonly code: string;
  readonly message: string;
  /** Rest wavelengths that it is about; null: all of them. */
  readonly appliesNm: { readonly lowNm: number; readonly highNm: number } | null;
}

/** The shape of a source's spectrum in its rest frame. */
export interface RestSpectrum {
  readonly label: string;
  readonly source: string;
  /** `given`: what the investigator brought. */
  readonly provenance: FileProvenance | 'given';
  /** f_λ on an arbitrary scale. */
  readonly continuum: SampledCurve;
  /** Narrow lines are carried apart and never sampled. */
  readonly lines: readonly RestLine[];
  /** Where the recipe or table says something; beyond, the continuum means nothing. */
  readonly validLowNm: number;
  readonly validHighNm: number;
  readonly cautions: readonly SpectrumCaution[];
}

/** FWHM in km/s that narrow lines of a galaxy are drawn with: common practice. */
export const NARROW_LINE_WIDTH_KM_S = 200;

/** A line with a flux, as narrow as those of a galaxy. */
export function restLine({ id, label, vacuumWavelengthNm }: SpectralLine, flux: number): RestLine {
  return { id, label, restWavelengthNm: vacuumWavelengthNm, flux, velocityWidthKmS: NARROW_LINE_WIDTH_KM_S };
}

/** A caution for rest wavelengths from one to another; without them, for all. */
export function caution(code: string, message: string, lowNm?: number, highNm?: number): SpectrumCaution {
  return {
    code,
    message,
    appliesNm: lowNm === undefined ? null : { lowNm, highNm: highNm ?? Infinity },
  };
}
