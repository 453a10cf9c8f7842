import type { ColourExcessScale, DustLaw } from './dust.js';
import type { IntergalacticMedium } from './intergalactic.js';
import type { LedgerInput } from './ledger.js';
import type { RestSpectrum } from './source-spectra.js';
import type { Response } from './synthetic.js';

/** Dust in the source, seen at rest wavelengths. */
export interface HostDustScreen {
  readonly law: DustLaw;
  readonly colourExcessMag: number;
  /** A(V) / E(B−V). Absent: the law's own. */
  readonly totalToSelective?: number;
}

/** Dust of the Milky Way, seen at observed wavelengths. */
export interface GalacticDustScreen {
  readonly law: DustLaw;
  /** As given, on its scale. */
  readonly colourExcessMag: number;
  readonly scale: ColourExcessScale;
}

/** What the value given already contains; what it does not contain is applied on top of it. */
export interface Includes {
  readonly hostDust: boolean;
  /** Of an observed light; a luminosity never contains it. */
  readonly galacticDust: boolean;
  readonly lensing: boolean;
}

/** Between the source and the top of the atmosphere. */
export interface OnTheWay {
  readonly hostDust: HostDustScreen | null;
  readonly galacticDust: GalacticDustScreen | null;
  /** Of the total flux; 1 for none. */
  readonly magnification: number;
  readonly medium: IntergalacticMedium | null;
  readonly includes: Includes;
}

/** Distances by redshift, as far as light needs them. */
export interface LuminosityDistances {
  /** In Mpc. */
  luminosityDistanceMpc(redshift: number): number;
}

/** The value that the light was given as, for the first line of its ledger. */
export interface QuotedMagnitude {
  readonly kind: 'apparentMagnitude' | 'absoluteMagnitude' | 'starFormationRate' | 'typical';
  /** In the system it was given in. */
  readonly magnitude: number;
  /** m_AB − m in that system; 0 for AB. */
  readonly toAbMag: number;
  readonly inputs: readonly LedgerInput[];
  /** Source of the value, where it is not the investigator's own. */
  readonly source?: string;
}

/**
 * Where a magnitude was quoted:
 * - `range`: the average over whatever is counted together, so that no colour enters (observed magnitudes only);
 * - `wavelength`: of the continuum at one wavelength;
 * - `response`: the average over a band.
 */
export type QuotedAt =
  | { readonly kind: 'range' }
  | { readonly kind: 'wavelength'; readonly wavelengthNm: number }
  | { readonly kind: 'response'; readonly response: Response; readonly label: string };

/** A light with a spectrum, normalised by a magnitude. */
export interface ContinuumLight extends OnTheWay {
  readonly kind: 'continuum';
  readonly quoted: QuotedMagnitude;
  /** `observed`: an apparent magnitude, at observed wavelengths. `rest`: an absolute one, at rest wavelengths. */
  readonly frame: 'observed' | 'rest';
  readonly at: QuotedAt;
  readonly spectrum: RestSpectrum;
  /** Cosmology that a published luminosity was derived with. Absent: the one in use. */
  readonly derivedWith?: LuminosityDistances;
}

/** The amount that a line was given as, for the first line of its ledger. */
export interface QuotedLine {
  /** `implied`: worked out backwards from a flux. */
  readonly kind: 'lineFlux' | 'lineLuminosity' | 'starFormationRate' | 'implied';
  /** erg s⁻¹ cm⁻² in the observed frame, erg s⁻¹ in the rest frame. */
  readonly amount: number;
  readonly inputs: readonly LedgerInput[];
  readonly source?: string;
}

/** What is seen under a line: it adds noise, not signal. As it arrives. */
export type LineContinuum =
  | { readonly kind: 'none' }
  | { readonly kind: 'magnitude'; readonly magnitudeAb: number }
  | { readonly kind: 'equivalentWidth'; readonly restEquivalentWidthNm: number };

/** A light that is a line. */
export interface LineLight extends OnTheWay {
  readonly kind: 'line';
  readonly quoted: QuotedLine;
  readonly frame: 'observed' | 'rest';
  readonly restWavelengthNm: number;
  /** Intrinsic full width at half maximum; 0: unresolved at any resolving power. */
  readonly velocityWidthKmS: number;
  readonly continuum: LineContinuum;
  /** Part of a line's photons that leaves the galaxy; 1 where the luminosity given is what leaves it. */
  readonly escapeFraction: number;
  readonly derivedWith?: LuminosityDistances;
}

/** How bright a source is and what its light meets, resolved: spectra and models in place of their names. */
export type SourceLight = ContinuumLight | LineLight;

/** Why there is no value, in words. */
export interface NoLight {
  readonly code: 'noFluxInBand' | 'lineOutsideBand' | 'spectrumEnds' | 'noFluxInQuotedBand' | 'noDistance';
  readonly message: string;
}
