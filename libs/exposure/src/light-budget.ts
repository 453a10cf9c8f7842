import { Ledger, type LedgerInput, type StepText } from '@faintward/photometry';
import type { StepId } from './types.js';

/** What each step from the top of the atmosphere to the detector is. The numbers are added by the pipeline. */
export const STEP_TEXTS: Readonly<Record<StepId, StepText>> = {
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

/** A light budget that goes on from the top of the atmosphere to the detector. */
export class LightBudget extends Ledger {
  step(id: StepId, deltaMag: number, inputs: LedgerInput[]): void {
    this.add(id, STEP_TEXTS[id], deltaMag, inputs);
  }

  /** A step that lets a fraction through. */
  addFraction(id: StepId, fraction: number, inputs: LedgerInput[]): void {
    this.step(id, -2.5 * Math.log10(fraction), inputs);
  }
}
