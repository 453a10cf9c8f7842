import type { CosmologyPreset } from './preset.js';

export const planck18 = {
  id: 'planck18',
  title: 'Planck 2018',
  parameters: {
    hubbleConstantKmSMpc: 67.66,
    omegaMatter: 0.30966,
    cmbTemperatureK: 2.7255,
    effectiveNeutrinoCount: 3.046,
    neutrinoMassesEv: [0, 0, 0.06],
  },
  uncertainties: { hubbleConstantKmSMpc: 0.42, omegaMatter: 0.0056 },
  reference: 'Planck Collaboration 2018 VI, A&A 641, A6 (2020), table 2, last column (TT,TE,EE + lowE + lensing + BAO)',
  note: 'The table quotes 0.3111 for all matter, neutrinos included; 0.30966 is baryons and cold dark matter.',
} as const satisfies CosmologyPreset;
