import { zodResolver } from '@hookform/resolvers/zod';
import { useForm, type FieldPath, type FieldValues, type UseFormProps, type UseFormReturn } from 'react-hook-form';
import type { z } from 'zod';
import { ApiError } from '../../lib/api';
import './messages';

/** react-hook-form with the contract's schema. Fields are checked when left, and again while being mended. */
export function useZodForm<Input extends FieldValues, Output>(
  schema: z.ZodType<Output, Input>,
  options: Omit<UseFormProps<Input, unknown, Output>, 'resolver'> = {},
): UseFormReturn<Input, unknown, Output> {
  return useForm<Input, unknown, Output>({ mode: 'onTouched', ...options, resolver: zodResolver(schema) });
}

/**
 * Puts the server's field errors under their fields and the focus on the first. True when every one of them has found
 * its field, so that the form need not show the problem as a whole too.
 */
export function showServerErrors<Input extends FieldValues, Output>(
  form: UseFormReturn<Input, unknown, Output>,
  error: unknown,
  fields: readonly FieldPath<Input>[],
): boolean {
  if (!(error instanceof ApiError) || error.fieldErrors.length === 0) return false;
  let placed = 0;
  for (const { path, message } of error.fieldErrors) {
    const field = fields.find((name) => name === path) ?? fields.find((name) => path.startsWith(`${name}.`));
    if (!field) continue;
    form.setError(field, { type: 'server', message }, { shouldFocus: placed === 0 });
    placed += 1;
  }
  return placed === error.fieldErrors.length;
}
