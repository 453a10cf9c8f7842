import type { Telescope } from '@faintward/contracts/facilities';
import MenuItem from '@mui/material/MenuItem';
import Stack from '@mui/material/Stack';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { formatNumber } from '../../../lib/format';
import { offeredModes, type OfferedMode } from '../../../lib/offeredModes';
import { ConditionsFields, GoalFields } from '../../../ui/estimate/GoalFields';
import { DraftField, FieldGrid, FieldGroup } from '../../../ui/light/DraftFields';
import type { Options } from '../../../ui/light/lightWords';
import type { PlanDraft, PlanErrors } from '../plan';

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
export function PlanForm({ draft, errors, telescopes, disabled = false, keptModeId, onChange }: PlanFormProps) {
  const fields = { draft, errors, disabled, onChange };
  const modes = offeredModes(telescopes, keptModeId);
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
  return (
    <Stack sx={{ gap: 2.5 }}>
      <FieldGroup title="Setup">
        <FieldGrid columns={180}>
          <Select
            label="Telescope"
            value={chosen?.telescope.telescopeId ?? ''}
            options={telescopesOffered.map((telescope) => [telescope.telescopeId, telescope.name])}
            disabled={disabled}
            onSelect={(id) => choose(modes.find((one) => one.telescope.telescopeId === id))}
          />
          <Select
            label="Instrument"
            value={chosen?.instrument.instrumentId ?? ''}
            options={instruments.map((instrument) => [instrument.instrumentId, instrument.name])}
            disabled={disabled}
            onSelect={(id) => choose(modes.find((one) => one.instrument.instrumentId === id))}
          />
          <Select
            label="Mode"
            value={chosen ? draft.mode : ''}
            error={errors.mode}
            options={modes
              .filter((one) => one.instrument === chosen?.instrument)
              .map(({ mode }) => [mode.modeId, mode.name])}
            disabled={disabled}
            onSelect={(id) => choose(modes.find((one) => one.mode.modeId === id))}
          />
          {chosen && (
            <Typography variant="body2" color="textSecondary" sx={{ gridColumn: '1 / -1', mt: -0.75 }}>
              {describeMode(chosen)}
            </Typography>
          )}
        </FieldGrid>
      </FieldGroup>
      <GoalFields
        {...fields}
        isImaging={chosen?.mode.configuration.kind === 'imaging'}
        more={<DraftField {...fields} name="repeat" label="Repeats" hint="the whole, so often" />}
      />
      <ConditionsFields {...fields} />
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

/** A choice that decides what the next one offers. */
function Select({
  label,
  value,
  options,
  error,
  disabled,
  onSelect,
}: {
  label: string;
  value: string;
  options: Options;
  error?: string | undefined;
  disabled: boolean;
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
    >
      {options.map(([option, words]) => (
        <MenuItem key={option} value={option}>
          {words}
        </MenuItem>
      ))}
    </TextField>
  );
}
