import { BandId } from '@faintward/contracts/light';
import Box from '@mui/material/Box';
import InputAdornment from '@mui/material/InputAdornment';
import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import type { LightDraft, LightErrors, LightField } from '../lightDraft';

export interface LightFieldsProps {
  draft: LightDraft;
  errors: LightErrors;
  disabled?: boolean;
  onChange: (field: LightField, value: string) => void;
}

/** What is known of a target's light and size. Draws; its owner keeps the draft. */
export function LightFields(props: LightFieldsProps) {
  const { draft } = props;
  const isLine = draft.light === 'lineFlux' || draft.light === 'lineLuminosity';
  return (
    <Box sx={{ display: 'grid', gap: 1.75, gridTemplateColumns: 'repeat(auto-fill, minmax(150px, 1fr))' }}>
      <Choice
        {...props}
        wide
        name="light"
        label="What is known of its light"
        options={[
          ['none', 'nothing yet'],
          ['apparentMagnitude', 'apparent magnitude in a band'],
          ['absoluteMagnitude', 'absolute magnitude'],
          ['lineFlux', 'flux of a line'],
          ['lineLuminosity', 'luminosity of a line'],
        ]}
      />
      {draft.light === 'apparentMagnitude' && (
        <>
          <Field {...props} name="magnitude" label="Magnitude" unit={draft.extent === 'uniform' ? 'mag/″²' : 'mag'} />
          <Choice {...props} name="band" label="Band" options={BandId.options.map((band) => [band, band])} />
          <Choice
            {...props}
            name="system"
            label="System"
            options={[
              ['AB', 'AB'],
              ['Vega', 'Vega'],
            ]}
          />
        </>
      )}
      {draft.light === 'absoluteMagnitude' && (
        <>
          <Field {...props} name="absolute" label="Absolute magnitude" unit="AB" />
          <Field {...props} name="restContinuum" label="At rest wavelength" unit="nm" />
        </>
      )}
      {draft.light === 'lineFlux' && <Field {...props} name="flux" label="Line flux" unit="erg/s/cm²" />}
      {draft.light === 'lineLuminosity' && <Field {...props} name="luminosity" label="Line luminosity" unit="erg/s" />}
      {isLine && (
        <>
          <Field {...props} name="restLine" label="Rest wavelength" unit="nm" />
          <Field {...props} name="width" label="Velocity width" unit="km/s" />
        </>
      )}
      {draft.light !== 'none' && !isLine && (
        <Field {...props} name="slope" label="Slope β" hint="f_λ ∝ λ^β; −2 is flat in AB" />
      )}
      {draft.light !== 'none' && (
        <Field {...props} name="sigma" label="Uncertainty, 1 σ" unit="mag" hint="may be empty" />
      )}
      <Choice
        {...props}
        wide
        name="extent"
        label="How it is spread"
        options={[
          ['point', 'point'],
          ['sersic', 'galaxy with a Sérsic profile'],
          ['uniform', 'surface of even brightness (magnitude per square arcsecond)'],
        ]}
      />
      {draft.extent === 'sersic' && (
        <>
          <Field {...props} name="radius" label="Half-light radius" />
          <Choice
            {...props}
            name="radiusUnit"
            label="Unit"
            options={[
              ['kpc', 'kpc'],
              ['arcsec', 'arcsec'],
            ]}
          />
          <Field {...props} name="sersic" label="Sérsic index" hint="1 disc, 4 spheroid" />
          <Field {...props} name="axisRatio" label="Axis ratio" hint="1 is round" />
        </>
      )}
    </Box>
  );
}

function Field({
  draft,
  errors,
  disabled = false,
  onChange,
  name,
  label,
  unit,
  hint,
}: LightFieldsProps & { name: LightField; label: string; unit?: string; hint?: string }) {
  return (
    <TextField
      label={label}
      value={draft[name]}
      disabled={disabled}
      onChange={(event) => onChange(name, event.target.value)}
      error={errors[name] !== undefined}
      helperText={errors[name] ?? hint}
      slotProps={{
        htmlInput: { inputMode: 'decimal', style: { textAlign: 'right' } },
        input: unit ? { endAdornment: <InputAdornment position="end">{unit}</InputAdornment> } : {},
        // A label inside the field would lie under the unit.
        inputLabel: unit ? { shrink: true } : {},
      }}
    />
  );
}

function Choice({
  draft,
  errors,
  disabled = false,
  onChange,
  name,
  label,
  options,
  wide = false,
}: LightFieldsProps & {
  name: LightField;
  label: string;
  options: readonly (readonly [value: string, label: string])[];
  wide?: boolean;
}) {
  return (
    <TextField
      select
      label={label}
      value={draft[name]}
      disabled={disabled}
      onChange={(event) => onChange(name, event.target.value)}
      error={errors[name] !== undefined}
      helperText={errors[name]}
      sx={wide ? { gridColumn: '1 / -1' } : {}}
    >
      {options.map(([value, words]) => (
        <MenuItem key={value} value={value}>
          {words}
        </MenuItem>
      ))}
    </TextField>
  );
}
