import Stack from '@mui/material/Stack';
import { parseNumber } from '../../../ui/form/parseNumber';
import { DraftChoice, DraftField, FieldGrid, FieldGroup } from '../../../ui/light/DraftFields';
import { LightFields } from '../../../ui/light/LightFields';
import { cosmologyOptions } from '../../../ui/light/lightWords';
import { RedshiftFields } from '../../../ui/light/RedshiftFields';
import type { DistributionTable, SourceErrors, SourceState } from '../source';

/** A source and what is asked of it. Draws; the page keeps the state. */
export function SourceForm({
  state,
  table,
  errors,
  onChange,
  onTableChange,
}: {
  state: SourceState;
  table: DistributionTable;
  errors: SourceErrors;
  onChange: (change: Partial<SourceState>) => void;
  onTableChange: (table: DistributionTable) => void;
}) {
  const redshift = parseNumber(state.redshift);
  const props = { draft: state, errors, onChange };
  return (
    <Stack sx={{ gap: 3 }}>
      <FieldGroup title="Redshift">
        <Stack sx={{ gap: 2.25 }}>
          <RedshiftFields
            draft={{ ...state, table }}
            errors={errors}
            onChange={({ table: nextTable, ...change }) => {
              if (nextTable !== undefined) onTableChange(nextTable);
              onChange(change);
            }}
          />
          <FieldGrid>
            <DraftChoice {...props} name="cosmology" label="Cosmology" options={cosmologyOptions} />
          </FieldGrid>
        </Stack>
      </FieldGroup>
      <LightFields
        draft={state}
        errors={errors}
        redshift={typeof redshift === 'number' && errors.redshift === undefined ? redshift : undefined}
        onChange={onChange}
      />
      <FieldGroup title="Image">
        <FieldGrid>
          <DraftField {...props} name="seeing" label="Seeing, zenith, 500 nm" unit="″" />
          <DraftField {...props} name="aperture" label="Aperture radius" unit="″" hint="empty: best against sky" />
        </FieldGrid>
      </FieldGroup>
    </Stack>
  );
}
