import type { Telescope } from '@faintward/contracts/facilities';
import Box from '@mui/material/Box';
import InputAdornment from '@mui/material/InputAdornment';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import type { ReactNode } from 'react';
import { formatNumber } from '../../../lib/format';
import { offeredModes, perWords, type OfferedMode, type PlanDraft, type PlanErrors, type PlanField } from '../plan';

export interface PlanFormProps {
  draft: PlanDraft;
  errors: PlanErrors;
  telescopes: readonly Telescope[];
  disabled?: boolean;
  /** A mode that is kept although it is not offered any more. */
  keptModeId?: string;
  onChange: (change: Partial<PlanDraft>) => void;
}

/** Setup, goal and conditions. Draws; its owner keeps the draft. */
export function PlanForm(props: PlanFormProps) {
  const { draft, telescopes, onChange } = props;
  const modes = offeredModes(telescopes, props.keptModeId);
  const chosen = modes.find(({ mode }) => mode.modeId === draft.mode);
  const choose = (next: OfferedMode | undefined) => {
    if (!next) return;
    onChange({
      mode: next.mode.modeId,
      ...(next.mode.configuration.kind === 'imaging' && draft.per === 'resolutionElement' ? { per: 'aperture' } : {}),
      // The site's median, unless somebody typed another.
      ...(draft.seeing === '' || draft.seeing === String(chosen?.telescope.site.zenithSeeingArcsec)
        ? { seeing: String(next.telescope.site.zenithSeeingArcsec) }
        : {}),
    });
  };
  const telescopesOffered = [...new Set(modes.map((one) => one.telescope))];
  const instruments = [
    ...new Set(modes.filter((one) => one.telescope === chosen?.telescope).map((one) => one.instrument)),
  ];
  const isImaging = chosen?.mode.configuration.kind === 'imaging';
  return (
    <Stack sx={{ gap: 2.5 }}>
      <Group title="Setup" columns={180}>
        <Select
          {...props}
          label="Telescope"
          value={chosen?.telescope.telescopeId ?? ''}
          options={telescopesOffered.map((telescope) => [telescope.telescopeId, telescope.name])}
          onSelect={(id) => choose(modes.find((one) => one.telescope.telescopeId === id))}
        />
        <Select
          {...props}
          label="Instrument"
          value={chosen?.instrument.instrumentId ?? ''}
          options={instruments.map((instrument) => [instrument.instrumentId, instrument.name])}
          onSelect={(id) => choose(modes.find((one) => one.instrument.instrumentId === id))}
        />
        <Select
          {...props}
          label="Mode"
          value={chosen ? draft.mode : ''}
          error={props.errors.mode}
          options={modes
            .filter((one) => one.instrument === chosen?.instrument)
            .map(({ mode }) => [mode.modeId, mode.name])}
          onSelect={(id) => choose(modes.find((one) => one.mode.modeId === id))}
        />
        {chosen && (
          <Typography variant="body2" color="textSecondary" sx={{ gridColumn: '1 / -1', mt: -0.75 }}>
            {describeMode(chosen)}
          </Typography>
        )}
      </Group>
      <Group title="Goal" columns={140}>
        <Choice
          {...props}
          wide
          name="goal"
          label="What is asked"
          options={[
            ['signalToNoise', 'time for a signal-to-noise ratio'],
            ['lineSignificance', 'time for a line at n sigma'],
            ['exposureTime', 'signal-to-noise ratio in given exposures'],
          ]}
        />
        {draft.goal !== 'exposureTime' && (
          <Field
            {...props}
            name="signalToNoise"
            label={draft.goal === 'lineSignificance' ? 'Significance' : 'S/N'}
            unit={draft.goal === 'lineSignificance' ? 'σ' : undefined}
          />
        )}
        {draft.goal !== 'lineSignificance' && (
          <Choice
            {...props}
            name="per"
            label="per"
            options={Object.entries(perWords).filter(([per]) => !(isImaging && per === 'resolutionElement'))}
          />
        )}
        <Field
          {...props}
          name="exposure"
          label="One exposure"
          unit="s"
          hint={draft.goal === 'exposureTime' ? undefined : 'empty: within its bounds'}
        />
        {draft.goal === 'exposureTime' && <Field {...props} name="count" label="Exposures" />}
        <Field {...props} name="repeat" label="Repeats" hint="the whole, so often" />
      </Group>
      <Group title="Conditions" columns={120}>
        <Field {...props} name="seeing" label="Seeing" unit="″" hint="zenith, 500 nm" />
        <Field {...props} name="airmass" label="Airmass" />
        <Choice
          {...props}
          name="moon"
          label="Moon class"
          options={[
            ['dark', 'dark'],
            ['grey', 'grey'],
            ['bright', 'bright'],
          ]}
        />
        <Choice
          {...props}
          name="transparency"
          label="Transparency"
          options={[
            ['clear', 'clear'],
            ['thinCloud', 'thin cloud'],
          ]}
        />
      </Group>
    </Stack>
  );
}

function describeMode({ telescope, mode }: OfferedMode): string {
  const { configuration } = mode;
  return [
    `${telescope.diameterM} m`,
    `${formatNumber(configuration.wavelengthLowNm, { decimals: 0 })} to ${formatNumber(configuration.wavelengthHighNm, { decimals: 0 })} nm`,
    ...(configuration.kind === 'slitSpectroscopy'
      ? [`slit ${configuration.slitWidthArcsec}″`, `R ${formatNumber(configuration.resolvingPower, { decimals: 0 })}`]
      : ['imaging']),
    `configuration ${mode.configurationVersion}`,
  ].join(' · ');
}

function Group({ title, columns, children }: { title: string; columns: number; children: ReactNode }) {
  return (
    <Box component="fieldset" sx={{ border: 0, p: 0, m: 0, minWidth: 0 }}>
      <Typography component="legend" variant="h4" sx={{ p: 0, mb: 1.25 }}>
        {title}
      </Typography>
      <Box sx={{ display: 'grid', gap: 1.75, gridTemplateColumns: `repeat(auto-fill, minmax(${columns}px, 1fr))` }}>
        {children}
      </Box>
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
}: PlanFormProps & { name: PlanField; label: string; unit?: string | undefined; hint?: string | undefined }) {
  return (
    <TextField
      label={label}
      value={draft[name]}
      disabled={disabled}
      onChange={(event) => onChange({ [name]: event.target.value })}
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
  onChange,
  name,
  wide = false,
  ...rest
}: PlanFormProps & {
  name: PlanField;
  label: string;
  options: readonly (readonly [value: string, label: string])[];
  wide?: boolean;
}) {
  return (
    <Select
      {...rest}
      value={draft[name]}
      error={errors[name]}
      wide={wide}
      onSelect={(value) => onChange({ [name]: value })}
    />
  );
}

function Select({
  label,
  value,
  options,
  error,
  disabled = false,
  wide = false,
  onSelect,
}: {
  label: string;
  value: string;
  options: readonly (readonly [value: string, label: string])[];
  error?: string | undefined;
  disabled?: boolean;
  wide?: boolean;
  onSelect: (value: string) => void;
}) {
  return (
    <TextField
      select
      label={label}
      value={value}
      disabled={disabled || options.length === 0}
      onChange={(event) => onSelect(event.target.value)}
      error={error !== undefined}
      helperText={error}
      sx={wide ? { gridColumn: '1 / -1' } : {}}
    >
      {options.map(([option, words]) => (
        <MenuItem key={option} value={option}>
          {words}
        </MenuItem>
      ))}
    </TextField>
  );
}
