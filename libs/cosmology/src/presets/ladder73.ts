import type { CosmologyPreset } from './preset.js';

export const ladder73 = {
  id: 'ladder73',
  title: 'Distance ladder 73.04',
  parameters: { hubbleConstantKmSMpc: 73.04, omegaMatter: 0.3, omegaDarkEnergy: 0.7 },
  uncertainties: { hubbleConstantKmSMpc: 1.04 },
  reference: 'Hubble constant: Riess et al. 2022, ApJL 934, L7',
  note: 'The ladder measures the Hubble constant only; the densities 0.3 and 0.7 are assumed. No radiation.',
} as const satisfies CosmologyPreset;
