import type { CosmologyPreset } from './preset.js';

export const wmap9 = {
  id: 'wmap9',
  title: 'WMAP nine-year',
  parameters: {
    hubbleConstantKmSMpc: 69.32,
    omegaMatter: 0.2865,
    cmbTemperatureK: 2.725,
    effectiveNeutrinoCount: 3.04,
  },
  uncertainties: {},
  reference: 'Hinshaw et al. 2013, ApJS 208, 19, table 4, last column (WMAP + eCMB + BAO + H0)',
} as const satisfies CosmologyPreset;
