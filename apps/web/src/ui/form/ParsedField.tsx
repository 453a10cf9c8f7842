import MuiTextField, { type TextFieldProps as MuiTextFieldProps } from '@mui/material/TextField';
import { useState } from 'react';
import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';

/** Where a field's value lives in a form. */
export interface Bound<Values extends FieldValues> {
  /** From `useZodForm`; the second and third type parameters do not matter to a field. */
  // eslint-disable-next-line @typescript-eslint/no-explicit-any -- react-hook-form's Control is invariant in its context and output
  control: Control<Values, any, any>;
  name: FieldPath<Values>;
}

/** What else may be said of a text field. */
export type Rest = Omit<
  MuiTextFieldProps,
  'name' | 'value' | 'onChange' | 'onBlur' | 'error' | 'select' | 'type' | 'defaultValue'
>;

/**
 * A value that is typed as text. Holds what the text means; text without a meaning stays in the form as it was typed, so
 * that the schema says what is wrong and nothing is lost.
 */
export function ParsedField<Values extends FieldValues>({
  control,
  name,
  parse,
  write,
  hintFor,
  helperText,
  slotProps,
  ...rest
}: Bound<Values> &
  Rest & {
    /** What a text means; null when empty, the text itself when it means nothing. */
    parse: (text: string) => unknown;
    write: (value: unknown) => string;
    /** A hint that depends on the value, before the one that does not. */
    hintFor?: (value: unknown) => string | undefined;
  }) {
  const { field, fieldState } = useController({ control, name });
  const value: unknown = field.value;
  const [text, setText] = useState(() => write(value));
  const [seen, setSeen] = useState<unknown>(value);
  if (!Object.is(value, seen)) {
    // Set from outside (reset, another's change): show it; but leave "1.50" alone while 1.5 is what it means.
    setSeen(value);
    if (!Object.is(parse(text), value)) setText(write(value));
  }
  return (
    <MuiTextField
      {...rest}
      name={field.name}
      value={text}
      onChange={(event) => {
        const next = parse(event.target.value);
        setText(event.target.value);
        setSeen(next);
        field.onChange(next);
      }}
      onBlur={field.onBlur}
      error={fieldState.invalid}
      helperText={fieldState.error?.message ?? hintFor?.(value) ?? helperText}
      slotProps={{ ...slotProps, htmlInput: { ...slotProps?.htmlInput, ref: field.ref } }}
    />
  );
}
