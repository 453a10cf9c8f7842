import { DraftChoice, DraftField, FieldGrid, FieldGroup, type DraftProps } from './DraftFields';
import type { LightDraft } from './lightDraft';
import { extentOptions, relationOptions } from './lightWords';
import { SuggestionLine } from './Suggestions';

/** How a source is spread on the sky. */
export function ExtentFields({ redshift, ...props }: DraftProps<LightDraft> & { redshift: number | undefined }) {
  const { draft } = props;
  const { relation } = draft;
  return (
    <FieldGroup title="Size">
      <FieldGrid>
        <DraftChoice {...props} wide name="extent" label="How it is spread" options={extentOptions} />
        {draft.extent === 'sersic' && (
          <>
            <DraftField {...props} name="radius" label="Half-light radius" />
            <DraftChoice
              {...props}
              name="radiusUnit"
              label="Unit"
              options={[
                ['kpc', 'kpc'],
                ['arcsec', 'arcsec'],
              ]}
            />
            <DraftField {...props} name="sersic" label="Sérsic index" hint="1 disc, 4 spheroid" />
            <DraftField {...props} name="axisRatio" label="Axis ratio" hint="1 is round" />
          </>
        )}
        {draft.extent === 'typical' && (
          <>
            <DraftChoice
              {...props}
              wide
              name="relation"
              label="Relation of size and redshift"
              options={relationOptions}
            />
            {relation !== 'shibuya2015' && <DraftField {...props} name="stellarMass" label="Stellar mass" unit="M☉" />}
            <DraftField {...props} name="typicalSersic" label="Sérsic index" hint="1 disc, 4 spheroid" />
            <DraftField {...props} name="axisRatio" label="Axis ratio" hint="1 is round" />
            <SuggestionLine
              redshift={redshift}
              relation={relation}
              find={({ extent }) => extent?.kind === 'typical' && extent.relation === relation}
            />
          </>
        )}
      </FieldGrid>
    </FieldGroup>
  );
}
