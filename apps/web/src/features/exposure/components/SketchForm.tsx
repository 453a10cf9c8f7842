import type { Telescope } from '@faintward/contracts/facilities';
import ListSubheader from '@mui/material/ListSubheader';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import { parseNumber } from '../../../ui/form/parseNumber';
import { DraftChoice, DraftField, FieldGrid, FieldGroup } from '../../../ui/light/DraftFields';
import { LightFields } from '../../../ui/light/LightFields';
import { cosmologyOptions } from '../../../ui/light/lightWords';
import { offeredModes, type Sketch, type SketchErrors } from '../sketch';

export interface SketchFormProps {
  sketch: Sketch;
  errors: SketchErrors;
  telescopes: readonly Telescope[];
  onChange: (change: Partial<Sketch>) => void;
}

/** What goes into an estimate: source, setup, goal, conditions. Draws; the page keeps the state. */
export function SketchForm({ sketch, errors, telescopes, onChange }: SketchFormProps) {
  const modes = offeredModes(telescopes);
  const chosen = modes.find((one) => one.id === sketch.mode);
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
                  <MenuItem key={one.id} value={one.id}>
                    {one.instrument.name} · {one.mode.name}
                  </MenuItem>
                )),
            ])}
          </TextField>
        </FieldGrid>
      </FieldGroup>
      <FieldGroup title="Goal">
        <FieldGrid columns={140}>
          <DraftChoice
            {...props}
            wide
            name="goal"
            label="What is asked"
            options={[
              ['signalToNoise', 'time for a signal-to-noise ratio'],
              ['lineSignificance', 'time for a line at n sigma'],
              ['exposureTime', 'signal-to-noise ratio in a time'],
            ]}
          />
          {sketch.goal !== 'exposureTime' && (
            <DraftField
              {...props}
              name="snr"
              label={sketch.goal === 'lineSignificance' ? 'Significance' : 'S/N'}
              unit={sketch.goal === 'lineSignificance' ? 'σ' : undefined}
            />
          )}
          {sketch.goal !== 'lineSignificance' && (
            <DraftChoice
              {...props}
              name="per"
              label="per"
              options={[
                ['aperture', 'aperture'],
                ['arcsec2', 'square arcsecond'],
                ['pixel', 'pixel'],
                ['resolutionElement', 'resolution element'],
              ]}
            />
          )}
          <DraftField
            {...props}
            name="single"
            label="One exposure"
            unit="s"
            {...(sketch.goal === 'exposureTime' ? {} : { hint: 'empty: within its bounds' })}
          />
          {sketch.goal === 'exposureTime' && <DraftField {...props} name="count" label="Exposures" />}
        </FieldGrid>
      </FieldGroup>
      <FieldGroup title="Conditions">
        <FieldGrid columns={140}>
          <DraftField {...props} name="seeing" label="Seeing" unit="″" hint="zenith, 500 nm" />
          <DraftField {...props} name="airmass" label="Airmass" />
          <DraftChoice
            {...props}
            name="moon"
            label="Moon class"
            options={[
              ['dark', 'dark'],
              ['grey', 'grey'],
              ['bright', 'bright'],
            ]}
          />
          <DraftChoice
            {...props}
            name="transparency"
            label="Transparency"
            options={[
              ['clear', 'clear'],
              ['thinCloud', 'thin cloud'],
            ]}
          />
        </FieldGrid>
      </FieldGroup>
    </Stack>
  );
}
