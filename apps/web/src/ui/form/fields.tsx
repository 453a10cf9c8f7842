import Checkbox from '@mui/material/Checkbox';
import FormControlLabel from '@mui/material/FormControlLabel';
import InputAdornment from '@mui/material/InputAdornment';
import MenuItem from '@mui/material/MenuItem';
import MuiTextField from '@mui/material/TextField';
import type { ReactNode } from 'react';
import { useController, type FieldValues } from 'react-hook-form';
import { ParsedField, type Bound, type Rest } from './ParsedField';
import { parseNumber } from './parseNumber';

export interface TextFieldProps<Values extends FieldValues> extends Bound<Values>, Rest {
  type?: 'text' | 'email' | 'password' | 'url';
  autoComplete?: string;
}

/** A text field of a form: its error, else its hint, beneath it. */
export function TextField<Values extends FieldValues>({
  control,
  name,
  helperText,
  slotProps,
  type = 'text',
  ...rest
}: TextFieldProps<Values>) {
  const { field, fieldState } = useController({ control, name });
  return (
    <MuiTextField
      {...rest}
      type={type}
      name={field.name}
      value={field.value ?? ''}
      onChange={field.onChange}
      onBlur={field.onBlur}
      error={fieldState.invalid}
      helperText={fieldState.error?.message ?? helperText}
      slotProps={{ ...slotProps, htmlInput: { ...slotProps?.htmlInput, ref: field.ref } }}
    />
  );
}

export interface NumberFieldProps<Values extends FieldValues> extends Bound<Values>, Rest {
  unit?: ReactNode;
}

/** A number with its unit, or null when empty. Takes a true minus and powers of ten such as 2e-17. */
export function NumberField<Values extends FieldValues>({ unit, slotProps, ...rest }: NumberFieldProps<Values>) {
  return (
    <ParsedField
      {...rest}
      parse={parseNumber}
      write={toText}
      slotProps={{
        ...slotProps,
        htmlInput: { inputMode: 'decimal', style: { textAlign: 'right' }, ...slotProps?.htmlInput },
        input: {
          ...(unit ? { endAdornment: <InputAdornment position="end">{unit}</InputAdornment> } : {}),
          ...slotProps?.input,
        },
      }}
    />
  );
}

function toText(value: unknown): string {
  return value == null ? '' : String(value).replace(/^-/, '−');
}

export interface SelectFieldProps<Values extends FieldValues> extends Bound<Values>, Rest {
  options: readonly { value: string; label: string; disabled?: boolean }[];
}

/** A choice among a few. */
export function SelectField<Values extends FieldValues>({
  control,
  name,
  options,
  helperText,
  slotProps,
  ...rest
}: SelectFieldProps<Values>) {
  const { field, fieldState } = useController({ control, name });
  return (
    <MuiTextField
      {...rest}
      select
      name={field.name}
      value={field.value ?? ''}
      onChange={field.onChange}
      onBlur={field.onBlur}
      inputRef={field.ref}
      error={fieldState.invalid}
      helperText={fieldState.error?.message ?? helperText}
      slotProps={slotProps}
    >
      {options.map((option) => (
        <MenuItem key={option.value} value={option.value} disabled={option.disabled ?? false}>
          {option.label}
        </MenuItem>
      ))}
    </MuiTextField>
  );
}

/** A yes or no. */
export function CheckboxField<Values extends FieldValues>({
  control,
  name,
  label,
  disabled = false,
}: Bound<Values> & { label: ReactNode; disabled?: boolean }) {
  const { field } = useController({ control, name });
  return (
    <FormControlLabel
      label={label}
      disabled={disabled}
      control={
        <Checkbox
          name={field.name}
          checked={Boolean(field.value)}
          onChange={(_event, checked) => field.onChange(checked)}
          onBlur={field.onBlur}
          slotProps={{ input: { ref: field.ref } }}
        />
      }
    />
  );
}
