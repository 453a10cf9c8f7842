import type { Telescope } from '@faintward/contracts/facilities';
import ListSubheader from '@mui/material/ListSubheader';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import { offeredModes } from '../../../lib/offeredModes';
import { ConditionsFields, GoalFields } from '../../../ui/estimate/GoalFields';
import { parseNumber } from '../../../ui/form/parseNumber';
import { DraftChoice, DraftField, FieldGrid, FieldGroup } from '../../../ui/light/DraftFields';
import { LightFields } from '../../../ui/light/LightFields';
import { cosmologyOptions } from '../../../ui/light/lightWords';
import type { Sketch, SketchErrors } from '../sketch';

export interface SketchFormProps {
  sketch: Sketch;
  errors: SketchErrors;
  telescopes: readonly Telescope[];
  onChange: (change: Partial<Sketch>) => void;
}

/** What goes into an estimate: source, setup, goal, conditions. Draws; the page keeps the state. */
export function SketchForm({ sketch, errors, telescopes, onChange }: SketchFormProps) {
  const modes = offeredModes(telescopes);
  const chosen = modes.find((one) => one.mode.modeId === sketch.mode);
  const props = { draft: sketch, errors, onChange };
  const redshift = parseNumber(sketch.redshift);
  const isKnownRedshift = typeof redshift === 'number' && errors.redshift === undefined;
  return (
    <Stack sx={{ gap: 3 }}>
      <FieldGroup title="Source">
        <FieldGrid>
          <DraftField {...props} name="redshift" label="Redshift" />
          <DraftChoice {...props} name="cosmology" label="Cosmology" options={cosmologyOptions} />
        </FieldGrid>
      </FieldGroup>
      <LightFields
        draft={sketch}
        errors={errors}
        redshift={isKnownRedshift ? redshift : undefined}
        mayBeUnknown={false}
        onChange={(change) => onChange(change as Partial<Sketch>)}
      />
      <FieldGroup title="Setup">
        <FieldGrid columns={140}>
          <TextField
            select
            label="Instrument and mode"
            value={chosen ? sketch.mode : ''}
            onChange={(event) => onChange({ mode: event.target.value })}
            error={errors.mode !== undefined}
            helperText={
              errors.mode ??
              (chosen
                ? `${chosen.telescope.name}, ${chosen.telescope.diameterM} m · configuration ${chosen.mode.configurationVersion}`
                : undefined)
            }
            sx={{ gridColumn: '1 / -1' }}
          >
            {telescopes.flatMap((telescope) => [
              <ListSubheader key={telescope.telescopeId}>{telescope.name}</ListSubheader>,
              ...modes
                .filter((one) => one.telescope === telescope)
                .map((one) => (
                  <MenuItem key={one.mode.modeId} value={one.mode.modeId}>
                    {one.instrument.name} · {one.mode.name}
                  </MenuItem>
                )),
            ])}
          </TextField>
        </FieldGrid>
      </FieldGroup>
      <GoalFields {...props} isImaging={chosen?.mode.configuration.kind === 'imaging'} />
      <ConditionsFields {...props} />
    </Stack>
  );
}
