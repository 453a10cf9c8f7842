import InputAdornment from '@mui/material/InputAdornment';
import MuiTextField, { type TextFieldProps as MuiTextFieldProps } from '@mui/material/TextField';
import { useState } from 'react';
import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { formatInstant } from '../../lib/time';

export interface InstantFieldProps<Values extends FieldValues> extends Omit<
  MuiTextFieldProps,
  'name' | 'value' | 'onChange' | 'onBlur' | 'error' | 'select' | 'type' | 'defaultValue'
> {
  // eslint-disable-next-line @typescript-eslint/no-explicit-any -- react-hook-form's Control is invariant in its context and output
  control: Control<Values, any, any>;
  name: FieldPath<Values>;
  siteTimeZone: string;
}

/**
 * An instant, typed in UTC as `2027-03-31 18:00`, with the site's clock beneath it. Holds ISO 8601, null when empty, and text
 * that is no instant as it was typed, so that the schema says what is wrong and nothing is lost.
 */
export function InstantField<Values extends FieldValues>({
  control,
  name,
  siteTimeZone,
  helperText,
  slotProps,
  ...rest
}: InstantFieldProps<Values>) {
  const { field, fieldState } = useController({ control, name });
  const value: unknown = field.value;
  const [text, setText] = useState(() => instantText(value));
  const [seen, setSeen] = useState<unknown>(value);
  if (!Object.is(value, seen)) {
    setSeen(value);
    if (!Object.is(parseInstant(text), value)) setText(instantText(value));
  }
  const instant = isInstant(value) ? new Date(value) : undefined;
  const hint = instant ? `${formatInstant(instant, siteTimeZone)} at the site` : (helperText ?? 'as 2027-03-31 18:00');
  return (
    <MuiTextField
      {...rest}
      name={field.name}
      value={text}
      onChange={(event) => {
        const next = parseInstant(event.target.value);
        setText(event.target.value);
        setSeen(next);
        field.onChange(next);
      }}
      onBlur={field.onBlur}
      error={fieldState.invalid}
      helperText={fieldState.error?.message ?? hint}
      slotProps={{
        ...slotProps,
        htmlInput: { autoComplete: 'off', ...slotProps?.htmlInput, ref: field.ref },
        input: { endAdornment: <InputAdornment position="end">UTC</InputAdornment>, ...slotProps?.input },
      }}
    />
  );
}

/** `2027-03-31 18:00` (also with a T, seconds, or a Z behind) as ISO 8601 in UTC; null when empty; else the text itself. */
export function parseInstant(text: string): string | null {
  const trimmed = text.trim();
  if (trimmed === '') return null;
  const match = /^(\d{4})-(\d{2})-(\d{2})[ T](\d{1,2}):(\d{2})(?::(\d{2}))?(?:\.\d+)? ?(?:Z|UTC)?$/i.exec(trimmed);
  if (!match) return text;
  const [year, month, day, hour, minute, second] = match.slice(1).map((part) => Number(part ?? 0)) as [
    number,
    number,
    number,
    number,
    number,
    number,
  ];
  const date = new Date(Date.UTC(year, month - 1, day, hour, minute, second));
  const isReal =
    date.getUTCMonth() === month - 1 && date.getUTCDate() === day && hour < 24 && minute < 60 && second < 60;
  return isReal ? date.toISOString() : text;
}

function instantText(value: unknown): string {
  if (isInstant(value)) return formatInstant(new Date(value), 'UTC');
  return typeof value === 'string' ? value : '';
}

function isInstant(value: unknown): value is string {
  return typeof value === 'string' && /^\d{4}-\d\d-\d\dT.*Z$/.test(value) && !Number.isNaN(Date.parse(value));
}
