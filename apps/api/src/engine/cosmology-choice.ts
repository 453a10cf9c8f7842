import type { SourceInCosmology } from '@faintward/contracts/light-report';
import { COSMOLOGY_PRESETS, distanceRows } from '@faintward/cosmology';
import type { Response } from '@faintward/photometry';
import { type ChosenCosmology, chooseCosmology } from './cosmologies.js';
import { lightFaults } from './light-faults.js';
import { isIntrinsic, type LightSetting } from './light.js';
import type { ReportInputs } from './light-report.js';
import { arrive, magnitudeIn, ultravioletMagnitudeOf } from './source.js';

/** The presets, and the cosmology in use where it is none of them. */
export function comparedCosmologies(chosen: ChosenCosmology): ChosenCosmology[] {
  const presets = (Object.keys(COSMOLOGY_PRESETS) as (keyof typeof COSMOLOGY_PRESETS)[]).map((id) =>
    chooseCosmology(id),
  );
  return presets.some(({ id }) => id === chosen.id) ? presets : [chosen, ...presets];
}

/** What another choice of cosmology would change for one source, its light being given as it is. */
export function compareCosmologies(
  { redshift, light, extent }: ReportInputs,
  setting: LightSetting,
  response: Response | undefined,
): SourceInCosmology[] {
  const isUsable = light !== null && lightFaults({ redshift, light, extent }).length === 0;
  const rows = comparedCosmologies(setting.cosmology).map((cosmology) => {
    const [distances] = distanceRows(cosmology.model, [redshift]);
    const arriving = isUsable ? arrive(light, extent, { ...setting, cosmology }) : undefined;
    const found = arriving === undefined || response === undefined ? undefined : magnitudeIn(arriving, response);
    return {
      cosmologyId: cosmology.id,
      title: cosmology.title,
      isChosen: cosmology.id === setting.cosmology.id,
      distanceModulusMag: distances?.distanceModulusMag ?? null,
      magnitudeAb: typeof found === 'number' ? found : null,
      absoluteMagnitudeAb: (arriving && ultravioletMagnitudeOf(arriving)) ?? null,
      kpcPerArcsec: distances?.kpcPerArcsec ?? 0,
      ageGyr: distances?.ageGyr ?? null,
    };
  });
  const chosen = rows.find(({ isChosen }) => isChosen);
  return rows.map((row) => ({
    ...row,
    deltaDistanceModulusMag: difference(row.distanceModulusMag, chosen?.distanceModulusMag ?? null),
    skyLimitedTimeFactor: timeFactor(
      difference(row.magnitudeAb, chosen?.magnitudeAb ?? null),
      light !== null && isIntrinsic(light),
    ),
  }));
}

function difference(value: number | null, reference: number | null): number | null {
  return value === null || reference === null ? null : value - reference;
}

/** Where the sky limits, time goes as flux⁻². */
function timeFactor(deltaMag: number | null, isGivenAsLuminosity: boolean): number | null {
  if (deltaMag === null) return null;
  return isGivenAsLuminosity ? 10 ** (0.8 * deltaMag) : 1;
}
