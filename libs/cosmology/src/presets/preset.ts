import type { CosmologyParameters } from '../parameters.js';

/** A named set of parameters with its source. */
export interface CosmologyPreset {
  readonly id: string;
  readonly title: string;
  readonly parameters: CosmologyParameters;
  /** Published standard uncertainties of single parameters, where the source was checked. */
  readonly uncertainties: Partial<Record<'hubbleConstantKmSMpc' | 'omegaMatter', number>>;
  readonly reference: string;
  /** What a reader of the source would otherwise stumble over. */
  readonly note?: string;
}
