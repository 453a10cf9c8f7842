import type { LightStep, StepId, StepInput, StepStage } from './types.js';

interface StepText {
  stage: StepStage;
  title: string;
  formula: string;
  source: string;
}

const HOGG_2002 = 'Hogg, Baldry, Blanton & Eisenstein 2002, astro-ph/0210394';

/** What every step is, wherever it occurs. The numbers are added by the pipeline. */
export const STEP_TEXTS: Readonly<Record<StepId, StepText>> = {
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
  'line-flux': {
    stage: 'source',
    title: 'Line flux, as the AB magnitude with as many photons',
    formula: '−2.5 log10[F λ / (h c) / (N_AB=0 · Δln λ)]',
    source: 'definition of the AB system',
  },
  'line-luminosity': {
    stage: 'source',
    title: 'Line luminosity, as the AB magnitude with as many photons at 10 pc',
    formula: '−2.5 log10[L / (4π (10 pc)²) · λ / (h c) / (N_AB=0 · Δln λ)]',
    source: 'definition of the AB system',
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
  'spectral-slope': {
    stage: 'space',
    title: 'Spectrum between the given wavelength and the band',
    formula: '−2.5 log10[∫ (λ/λ₀)^(2+β) d ln λ / ∫ d ln λ]',
    source: HOGG_2002,
  },
  'hydrogen-absorption': {
    stage: 'space',
    title: 'Part of the band taken by hydrogen',
    formula: 'no light below λ_cut (1 + z)',
    source: 'first approximation: Lyman limit at any redshift, Lyα from z = 6 on',
  },
  lensing: {
    stage: 'space',
    title: 'Lensing magnification',
    formula: '−2.5 log10 μ',
    source: 'definition of magnification',
  },
  'atmospheric-extinction': {
    stage: 'atmosphere',
    title: 'Atmospheric extinction',
    formula: 'k X',
    source: 'Bouguer’s law; coefficient of the mode',
  },
  'thin-cloud': {
    stage: 'atmosphere',
    title: 'Thin cloud',
    formula: 'constant',
    source: 'common practice',
  },
  throughput: {
    stage: 'instrument',
    title: 'Telescope, instrument and detector',
    formula: '−2.5 log10 η',
    source: 'configuration of the mode',
  },
  aperture: {
    stage: 'instrument',
    title: 'Light outside the aperture',
    formula: '−2.5 log10 of the enclosed fraction',
    source: 'Gaussian image; Sérsic 1968 profile, see Graham & Driver 2005, PASA 22, 118',
  },
  slit: {
    stage: 'instrument',
    title: 'Light beside the slit',
    formula: '−2.5 log10 erf(√ln2 · w/FWHM)',
    source: 'Gaussian image',
  },
  extraction: {
    stage: 'instrument',
    title: 'Light beyond the extracted length',
    formula: '−2.5 log10 erf(√ln2 · l/FWHM)',
    source: 'Gaussian image',
  },
  'solid-angle': {
    stage: 'instrument',
    title: 'Solid angle of the patch',
    formula: '−2.5 log10(Ω / arcsec²)',
    source: 'definition of surface brightness',
  },
  'goal-share': {
    stage: 'instrument',
    title: 'Share that the goal refers to',
    formula: '−2.5 log10 of the share',
    source: 'definition of the goal',
  },
  collecting: {
    stage: 'counting',
    title: 'Mirror area and bandwidth',
    formula: '−2.5 log10(N_AB=0 · A · Δln λ); the sum is −2.5 log10 of electrons per second',
    source: 'Oke & Gunn 1983, ApJ 266, 713 (AB system)',
  },
};

/** Adds up the light budget. The total is the sum of the steps in order, to the last bit. */
export class LightBudget {
  readonly steps: LightStep[] = [];
  totalMag = 0;

  add(id: StepId, deltaMag: number, inputs: StepInput[]): void {
    this.totalMag += deltaMag;
    const text = STEP_TEXTS[id];
    this.steps.push({
      id,
      stage: text.stage,
      title: text.title,
      deltaMag,
      totalMag: this.totalMag,
      formula: text.formula,
      inputs,
      source: text.source,
    });
  }

  /** A step that lets a fraction through. */
  addFraction(id: StepId, fraction: number, inputs: StepInput[]): void {
    this.add(id, -2.5 * Math.log10(fraction), inputs);
  }
}

export function stepInput(name: string, value: number, unit = ''): StepInput {
  return { name, value, unit };
}
