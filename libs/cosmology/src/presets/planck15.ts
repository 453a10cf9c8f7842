import type { CosmologyPreset } from './preset.js';

export const planck15 = {
  id: 'planck15',
  title: 'Planck 2015',
  parameters: {
    hubbleConstantKmSMpc: 67.74,
    omegaMatter: 0.3075,
    cmbTemperatureK: 2.7255,
    effectiveNeutrinoCount: 3.046,
    neutrinoMassesEv: [0, 0, 0.06],
  },
  uncertainties: {},
  reference: 'Planck Collaboration 2015 XIII, A&A 594, A13 (2016), table 4, last column',
  note: 'omegaMatter is baryons and cold dark matter; the table quotes all matter, neutrinos included.',
} as const satisfies CosmologyPreset;
