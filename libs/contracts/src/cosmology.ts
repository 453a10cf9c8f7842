import { z } from 'zod';

export const CosmologyPresetId = z.enum(['planck18', 'planck15', 'wmap9', 'conv70', 'ladder73']);
export type CosmologyPresetId = z.infer<typeof CosmologyPresetId>;

/**
 * A cosmology of one's own. `omegaMatter` is baryons and cold dark matter; neutrinos are counted apart.
 * Without `omegaDarkEnergy` the model is flat.
 */
export const CosmologyParameters = z
  .strictObject({
    hubbleConstantKmSMpc: z.number().gt(0).max(1000),
    omegaMatter: z.number().min(0).max(10),
    omegaDarkEnergy: z.number().min(-10).max(10).optional(),
    w0: z.number().min(-10).max(10).optional(),
    wa: z.number().min(-10).max(10).optional(),
    cmbTemperatureK: z.number().min(0).max(100).optional(),
    effectiveNeutrinoCount: z.number().min(0).max(100).optional(),
    neutrinoMassesEv: z.array(z.number().min(0).max(1000)).max(20).optional(),
  })
  .meta({ id: 'CosmologyParameters' });
export type CosmologyParameters = z.infer<typeof CosmologyParameters>;

export const CosmologyChoice = z
  .union([CosmologyPresetId, CosmologyParameters], {
    error: 'Name a preset (planck18, planck15, wmap9, conv70, ladder73) or give parameters.',
  })
  .meta({ id: 'CosmologyChoice' });
export type CosmologyChoice = z.infer<typeof CosmologyChoice>;

export const CosmologyPreset = z
  .object({ id: CosmologyPresetId, title: z.string(), parameters: CosmologyParameters, source: z.string() })
  .meta({ id: 'CosmologyPreset' });
export type CosmologyPreset = z.infer<typeof CosmologyPreset>;
export const CosmologyPresetList = z.object({ rows: z.array(CosmologyPreset) }).meta({ id: 'CosmologyPresetList' });
