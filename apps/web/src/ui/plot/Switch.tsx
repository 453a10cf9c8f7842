import ToggleButton from '@mui/material/ToggleButton';
import ToggleButtonGroup from '@mui/material/ToggleButtonGroup';

export type SwitchOptions<Value extends string> = readonly (readonly [Value, string])[];

/** A choice of one among few, beside a picture. */
export function Switch<Value extends string>({
  label,
  value,
  options,
  onChange,
}: {
  label: string;
  value: Value;
  options: SwitchOptions<Value>;
  onChange: (value: Value) => void;
}) {
  return (
    <ToggleButtonGroup
      exclusive
      size="small"
      aria-label={label}
      value={value}
      onChange={(_event, next: Value | null) => next !== null && onChange(next)}
      sx={{
        flexWrap: 'wrap',
        '& .MuiToggleButton-root': { textTransform: 'none', py: 0.25, px: 1.25, fontSize: '0.8125rem' },
      }}
    >
      {options.map(([option, text]) => (
        <ToggleButton key={option} value={option}>
          {text}
        </ToggleButton>
      ))}
    </ToggleButtonGroup>
  );
}
