import InputAdornment from '@mui/material/InputAdornment';
import type { FieldValues } from 'react-hook-form';
import { formatInstant } from '../../lib/time';
import { ParsedField, type Bound, type Rest } from './ParsedField';

export interface InstantFieldProps<Values extends FieldValues> extends Bound<Values>, Rest {
  siteTimeZone: string;
}

/** An instant as ISO 8601, null when empty; typed in UTC as `2027-03-31 18:00`, with the site's clock beneath it. */
export function InstantField<Values extends FieldValues>({
  siteTimeZone,
  helperText = 'as 2027-03-31 18:00',
  slotProps,
  ...rest
}: InstantFieldProps<Values>) {
  return (
    <ParsedField
      {...rest}
      parse={parseInstant}
      write={instantText}
      hintFor={(value) =>
        isInstant(value) ? `${formatInstant(new Date(value), siteTimeZone)} at the site` : undefined
      }
      helperText={helperText}
      slotProps={{
        ...slotProps,
        htmlInput: { autoComplete: 'off', ...slotProps?.htmlInput },
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
