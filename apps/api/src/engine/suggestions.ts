import { Extent, Light, type SizeRelation } from '@faintward/contracts/light';
import type { LightSuggestion } from '@faintward/contracts/light-report';
import { type TypicalValue, type TypicalValueId, typicalValuesAt } from '@faintward/photometry';
import type { ChosenCosmology } from './cosmologies.js';
import { lightData } from './light-data.js';

export interface SuggestionWishes {
  relation?: SizeRelation | undefined;
  /** Of the source, where its light says so. */
  absoluteMagnitudeUv?: number | undefined;
}

/** What is typical at a redshift, as it would be taken up into a form: offered with its source, never used silently. */
export function suggestionsAt(
  redshift: number,
  cosmology: ChosenCosmology,
  { relation, absoluteMagnitudeUv }: SuggestionWishes = {},
): LightSuggestion[] {
  const values = typicalValuesAt(redshift, lightData().typical, {
    hubbleConstantKmSMpc: cosmology.parameters.hubbleConstantKmSMpc,
    ...(relation === undefined ? {} : { relation }),
    ...(absoluteMagnitudeUv === undefined ? {} : { absoluteMagnitudeUv }),
  });
  return values.map((typical) => ({
    id: typical.id,
    title: typical.title,
    valueText: typical.valueText,
    value: typical.value,
    unit: typical.unit,
    spreadText: typical.spreadText,
    source: typical.source,
    provenance: typical.provenance,
    validText: typical.validText,
    isExtrapolated: typical.isExtrapolated,
    ...takenUp(typical),
  }));
}

type TakenUp = Pick<LightSuggestion, 'light' | 'extent' | 'velocityWidthKmS'>;
const NOTHING: TakenUp = { light: null, extent: null, velocityWidthKmS: null };

/** What each would set in a form. */
const TAKEN_UP: Readonly<Record<TypicalValueId, (typical: TypicalValue) => TakenUp>> = {
  ultravioletMagnitude: () => ({
    ...NOTHING,
    light: Light.parse({ kind: 'typical', of: 'starFormingGalaxy' }),
  }),
  ultravioletSlope: () => NOTHING,
  shibuya2015: () => relationExtent('shibuya2015'),
  vanDerWel2014Late: () => relationExtent('vanDerWel2014Late'),
  vanDerWel2014Early: () => relationExtent('vanDerWel2014Early'),
  sersicIndex: () => NOTHING,
  galaxyLineWidth: ({ value }) => ({ ...NOTHING, velocityWidthKmS: value }),
  quasarLineWidth: ({ value }) => ({ ...NOTHING, velocityWidthKmS: value }),
  supernovaIaPeak: () => ({
    ...NOTHING,
    light: Light.parse({ kind: 'typical', of: 'supernovaIa', spectrum: { kind: 'supernovaIa' } }),
  }),
};

function takenUp(typical: TypicalValue): TakenUp {
  return TAKEN_UP[typical.id](typical);
}

function relationExtent(relation: SizeRelation): TakenUp {
  const sersicIndex = relation === 'vanDerWel2014Early' ? 4 : relation === 'vanDerWel2014Late' ? 1 : 1.5;
  return { ...NOTHING, extent: Extent.parse({ kind: 'typical', relation, sersicIndex }) };
}
