import { conv70 } from './conv70.js';
import { ladder73 } from './ladder73.js';
import { planck15 } from './planck15.js';
import { planck18 } from './planck18.js';
import { wmap9 } from './wmap9.js';
import type { CosmologyPreset } from './preset.js';

export type { CosmologyPreset } from './preset.js';

/** The presets by identifier, in the order in which a list should show them. */
export const COSMOLOGY_PRESETS = { planck18, planck15, wmap9, conv70, ladder73 } as const satisfies Record<
  string,
  CosmologyPreset
>;

/** Identifier of a preset. */
export type CosmologyPresetId = keyof typeof COSMOLOGY_PRESETS;

/** True if the text names a preset. */
export function isCosmologyPresetId(text: string): text is CosmologyPresetId {
  return Object.hasOwn(COSMOLOGY_PRESETS, text);
}
