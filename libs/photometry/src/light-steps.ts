import type { StepText } from './ledger.js';

const HOGG_2002 = 'Hogg, Baldry, Blanton & Eisenstein 2002, astro-ph/0210394';

/** The steps that a ledger of light can have. */
export type LightStepId =
  | 'apparent-magnitude'
  | 'absolute-magnitude'
  | 'typical-magnitude'
  | 'implied-magnitude'
  | 'implied-line-luminosity'
  | 'star-formation-rate'
  | 'vega-to-ab'
  | 'line-flux'
  | 'line-luminosity'
  | 'line-star-formation-rate'
  | 'escape-fraction'
  | 'literature-cosmology'
  | 'distance-modulus'
  | 'redshift-bandwidth'
  | 'spectrum'
  | 'host-dust'
  | 'intergalactic'
  | 'lensing'
  | 'galactic-dust';

/** What each step from the source to the top of the atmosphere is. */
export const LIGHT_STEPS: Readonly<Record<LightStepId, StepText>> = {
  'apparent-magnitude': {
    stage: 'source',
    title: 'Apparent magnitude as given',
    formula: 'm',
    source: 'the investigator',
  },
  'absolute-magnitude': {
    stage: 'source',
    title: 'Absolute magnitude as given',
    formula: 'M, at 10 pc',
    source: 'the investigator',
  },
  'typical-magnitude': {
    stage: 'source',
    title: 'Absolute magnitude typical of its kind: a suggestion, not a measurement',
    formula: 'M, at 10 pc',
    source: 'the literature',
  },
  'implied-magnitude': {
    stage: 'source',
    title: 'Absolute magnitude that the brightness given implies',
    formula: 'M, at 10 pc and the rest wavelength seen in the middle of the range, before all that follows',
    source: 'from the investigator’s magnitude, by the steps that follow',
  },
  'implied-line-luminosity': {
    stage: 'source',
    title: 'Line luminosity that the flux given implies, as the AB magnitude with as many photons at 10 pc',
    formula: '−2.5 log10[λ L / (4π (10 pc)²) S(λ) / (c ∫ S d ln λ)] − 48.60',
    source: 'from the investigator’s flux, by the steps that follow',
  },
  'star-formation-rate': {
    stage: 'source',
    title: 'Ultraviolet light of the star-formation rate',
    formula: '−2.5 log10[L_ν / (4π (10 pc)²)] − 48.60',
    source: 'calibration named',
  },
  'vega-to-ab': {
    stage: 'source',
    title: 'From the Vega to the AB system',
    formula: 'm_AB − m_Vega of the band',
    source: 'Blanton & Roweis 2007, AJ 133, 734',
  },
  'line-flux': {
    stage: 'source',
    title: 'Line flux, as the AB magnitude with as many photons in the range',
    formula: '−2.5 log10[λ F S(λ) / (c ∫ S d ln λ)] − 48.60',
    source: 'definition of the AB system',
  },
  'line-luminosity': {
    stage: 'source',
    title: 'Line luminosity, as the AB magnitude with as many photons at 10 pc',
    formula: '−2.5 log10[λ L / (4π (10 pc)²) S(λ) / (c ∫ S d ln λ)] − 48.60',
    source: 'definition of the AB system',
  },
  'line-star-formation-rate': {
    stage: 'source',
    title: 'Line of the star-formation rate, as the AB magnitude with as many photons at 10 pc',
    formula: '−2.5 log10[λ L / (4π (10 pc)²) S(λ) / (c ∫ S d ln λ)] − 48.60',
    source: 'calibration named',
  },
  'escape-fraction': {
    stage: 'source',
    title: 'Part of the line that leaves the galaxy',
    formula: '−2.5 log10 f_esc',
    source: 'the investigator',
  },
  'literature-cosmology': {
    stage: 'source',
    title: 'From the cosmology the luminosity was derived with',
    formula: '−(DM − DM_literature): what was measured is the apparent light',
    source: 'definition of the distance modulus',
  },
  'distance-modulus': {
    stage: 'space',
    title: 'Distance modulus',
    formula: '5 log10(D_L / 10 pc)',
    source: 'Hogg 1999, astro-ph/9905116, section 9',
  },
  'redshift-bandwidth': {
    stage: 'space',
    title: 'Stretched bandwidth',
    formula: '−2.5 log10(1 + z)',
    source: HOGG_2002,
  },
  spectrum: {
    stage: 'space',
    title: 'Spectrum between the light as quoted and the range looked at',
    formula: '−2.5 log10 of the ratio of ∫ λ f_λ S dλ / ∫ S d ln λ',
    source: HOGG_2002,
  },
  'host-dust': {
    stage: 'space',
    title: 'Dust in the source',
    formula: 'A(λ) = k(λ) E(B−V) at the rest wavelength, averaged over the photons',
    source: 'law named',
  },
  intergalactic: {
    stage: 'space',
    title: 'Hydrogen between the galaxies, the mean of many lines of sight',
    formula: '−2.5 log10 of the mean of e^−τ(λ, z) over the photons',
    source: 'model named',
  },
  lensing: {
    stage: 'space',
    title: 'Lensing magnification',
    formula: '−2.5 log10 μ',
    source: 'definition of magnification',
  },
  'galactic-dust': {
    stage: 'space',
    title: 'Dust of the Milky Way',
    formula: 'A(λ) = [A(λ)/A(V)] R_V E(B−V) at the observed wavelength, averaged over the photons',
    source: 'law named; scale of E(B−V): Schlafly & Finkbeiner 2011, ApJ 737, 103',
  },
};
