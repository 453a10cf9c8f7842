import type { CosmologyPreset } from '@faintward/contracts/cosmology';
import FormControlLabel from '@mui/material/FormControlLabel';
import InputAdornment from '@mui/material/InputAdornment';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import Switch from '@mui/material/Switch';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../../lib/format';
import type { CalculatorState, ParameterName } from '../calculatorState';

const parameters: readonly { name: ParameterName; label: string; unit?: string; hint?: string }[] = [
  { name: 'hubbleConstantKmSMpc', label: 'H₀', unit: 'km/s/Mpc' },
  { name: 'omegaMatter', label: 'Ω matter', hint: 'baryons and cold dark matter' },
  { name: 'omegaDarkEnergy', label: 'Ω dark energy', hint: 'empty: the model is flat' },
  { name: 'w0', label: 'w₀', hint: 'empty: −1' },
  { name: 'wa', label: 'w_a', hint: 'empty: 0' },
  { name: 'cmbTemperatureK', label: 'T CMB', unit: 'K', hint: 'empty: no radiation' },
  { name: 'effectiveNeutrinoCount', label: 'N_eff', hint: 'empty: no neutrinos' },
];

/** What goes in: redshifts and a cosmology. Draws; the page keeps the state. */
export function CalculatorForm({
  state,
  errors,
  presets,
  onChange,
}: {
  state: CalculatorState;
  errors: Record<string, string | undefined>;
  presets: readonly CosmologyPreset[];
  onChange: (state: CalculatorState) => void;
}) {
  const chosen = presets.find((preset) => preset.id === state.cosmology);
  return (
    <Stack sx={{ gap: 2 }}>
      <TextField
        label="Redshifts"
        multiline
        minRows={3}
        maxRows={10}
        value={state.redshiftText}
        onChange={(event) => onChange({ ...state, redshiftText: event.target.value })}
        error={errors['redshiftText'] !== undefined}
        helperText={
          errors['redshiftText'] ?? 'Typed or pasted: a column of a spreadsheet, or with commas or spaces between.'
        }
        slotProps={{ htmlInput: { spellCheck: false } }}
      />
      <TextField
        select
        label="Cosmology"
        value={state.cosmology}
        onChange={(event) => onChange({ ...state, cosmology: event.target.value })}
        helperText={chosen ? chosen.source : undefined}
      >
        {presets.length === 0 && state.cosmology !== 'custom' && (
          <MenuItem value={state.cosmology}>{state.cosmology}</MenuItem>
        )}
        {presets.map((preset) => (
          <MenuItem key={preset.id} value={preset.id}>
            {preset.title} · H₀ {formatNumber(preset.parameters.hubbleConstantKmSMpc, { significant: 4 })}
          </MenuItem>
        ))}
        <MenuItem value="custom">Parameters of my own</MenuItem>
      </TextField>
      {state.cosmology === 'custom' && (
        <Stack sx={{ gap: 2, display: 'grid', gridTemplateColumns: 'repeat(auto-fill, minmax(150px, 1fr))' }}>
          {parameters.map(({ name, label, unit, hint }) => (
            <TextField
              key={name}
              label={label}
              value={state.parameters[name]}
              onChange={(event) =>
                onChange({ ...state, parameters: { ...state.parameters, [name]: event.target.value } })
              }
              error={errors[name] !== undefined}
              helperText={errors[name] ?? hint}
              slotProps={{
                htmlInput: { inputMode: 'decimal', style: { textAlign: 'right' } },
                input: unit ? { endAdornment: <InputAdornment position="end">{unit}</InputAdornment> } : {},
              }}
            />
          ))}
          <TextField
            label="Neutrino masses"
            value={state.neutrinoMassesEv}
            onChange={(event) => onChange({ ...state, neutrinoMassesEv: event.target.value })}
            error={errors['neutrinoMassesEv'] !== undefined}
            helperText={errors['neutrinoMassesEv'] ?? 'one each, such as 0, 0, 0.06'}
            slotProps={{ input: { endAdornment: <InputAdornment position="end">eV</InputAdornment> } }}
          />
        </Stack>
      )}
      {errors['cosmology'] && (
        <Typography color="error" role="alert">
          {errors['cosmology']}
        </Typography>
      )}
      <FormControlLabel
        control={<Switch checked={state.compare} onChange={(_event, compare) => onChange({ ...state, compare })} />}
        label="Beside it, the conventional flat model 70 / 0.3"
      />
    </Stack>
  );
}
