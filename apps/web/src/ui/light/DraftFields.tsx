import Box from '@mui/material/Box';
import Checkbox from '@mui/material/Checkbox';
import FormControlLabel from '@mui/material/FormControlLabel';
import InputAdornment from '@mui/material/InputAdornment';
import MenuItem from '@mui/material/MenuItem';
import TextField from '@mui/material/TextField';
import Typography from '@mui/material/Typography';
import { useState, type ReactNode } from 'react';
import type { Options } from './lightWords';

/** What every part of a form over a draft gets: it draws, its owner keeps the draft. */
export interface DraftProps<Draft> {
  draft: Draft;
  errors: Partial<Record<keyof Draft, string>>;
  disabled?: boolean | undefined;
  /** Marks empty fields that are needed, also before they were visited. */
  showLacking?: boolean | undefined;
  onChange: (change: Partial<Draft>) => void;
}

interface Named<Draft> extends DraftProps<Draft> {
  name: keyof Draft & string;
  label: string;
  hint?: string | undefined;
  wide?: boolean;
}

/** Fields beside each other, as many as fit. */
export function FieldGrid({ children, columns = 150 }: { children: ReactNode; columns?: number }) {
  return (
    <Box
      sx={{
        display: 'grid',
        columnGap: 1.5,
        // A label stands in the border, half above its field.
        rowGap: 2.25,
        gridTemplateColumns: `repeat(auto-fill, minmax(min(${columns}px, 100%), 1fr))`,
        alignItems: 'start',
      }}
    >
      {children}
    </Box>
  );
}

/** A named group of fields. */
export function FieldGroup({ title, note, children }: { title: string; note?: ReactNode; children: ReactNode }) {
  return (
    <Box component="fieldset" sx={{ border: 0, p: 0, m: 0, minWidth: 0 }}>
      <Typography component="legend" variant="h4" sx={{ p: 0, mb: 1.5 }}>
        {title}
      </Typography>
      {note && (
        <Typography variant="body2" color="textSecondary" component="div" sx={{ mt: -1, mb: 1.5 }}>
          {note}
        </Typography>
      )}
      {children}
    </Box>
  );
}

/** A number as typed, with its unit. An empty one that is needed says so quietly until it has been visited. */
export function DraftField<Draft>({
  draft,
  errors,
  disabled = false,
  showLacking = false,
  onChange,
  name,
  label,
  unit,
  hint,
  wide = false,
}: Named<Draft> & { unit?: string | undefined }) {
  const [wasLeft, setWasLeft] = useState(false);
  const text = String(draft[name]);
  const error = errors[name];
  return (
    <TextField
      label={label}
      value={text}
      disabled={disabled}
      onChange={(event) => onChange({ [name]: event.target.value } as Partial<Draft>)}
      onBlur={() => setWasLeft(true)}
      error={error !== undefined && (text.trim() !== '' || wasLeft || showLacking)}
      helperText={error ?? hint}
      sx={wide ? { gridColumn: '1 / -1' } : {}}
      slotProps={{
        htmlInput: { inputMode: 'decimal', autoComplete: 'off', style: { textAlign: 'right' } },
        input: unit ? { endAdornment: <InputAdornment position="end">{unit}</InputAdornment> } : {},
        // A label inside the field would lie under the unit.
        inputLabel: unit ? { shrink: true } : {},
      }}
    />
  );
}

/** A choice among a few. */
export function DraftChoice<Draft>({
  draft,
  errors,
  disabled = false,
  showLacking = false,
  onChange,
  name,
  label,
  options,
  hint,
  wide = false,
}: Named<Draft> & { options: Options }) {
  return (
    <TextField
      select
      label={label}
      value={draft[name]}
      disabled={disabled}
      onChange={(event) => onChange({ [name]: event.target.value } as Partial<Draft>)}
      error={errors[name] !== undefined && (draft[name] !== '' || showLacking)}
      helperText={errors[name] ?? hint}
      sx={wide ? { gridColumn: '1 / -1' } : {}}
      slotProps={{ inputLabel: { shrink: true }, select: { displayEmpty: true } }}
    >
      {options.map(([value, words]) => (
        <MenuItem key={value} value={value}>
          {words}
        </MenuItem>
      ))}
    </TextField>
  );
}

/** A statement that holds or not, with what follows from it. */
export function DraftTick({
  label,
  checked,
  consequence,
  disabled = false,
  onChange,
}: {
  label: string;
  checked: boolean;
  consequence: string;
  disabled?: boolean | undefined;
  onChange: (checked: boolean) => void;
}) {
  return (
    <FormControlLabel
      disabled={disabled}
      sx={{ alignItems: 'flex-start', m: 0, gap: 1 }}
      control={
        <Checkbox size="small" checked={checked} onChange={(_event, next) => onChange(next)} sx={{ p: 0, mt: 0.25 }} />
      }
      label={
        <>
          {label}
          <Typography variant="body2" color="textSecondary" component="span" sx={{ display: 'block' }}>
            {consequence}
          </Typography>
        </>
      }
    />
  );
}
