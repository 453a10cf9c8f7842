import type { CosmologyPreset } from './preset.js';

export const conv70 = {
  id: 'conv70',
  title: 'Convention 70 / 0.3 / 0.7',
  parameters: { hubbleConstantKmSMpc: 70, omegaMatter: 0.3, omegaDarkEnergy: 0.7 },
  uncertainties: {},
  reference: 'A convention of the literature, rounded; not a measurement. No radiation.',
} as const satisfies CosmologyPreset;
