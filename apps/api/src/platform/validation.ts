import { type ArgumentMetadata, Injectable, type PipeTransform } from '@nestjs/common';
import type { FieldError } from '@faintward/contracts/errors';
import { z } from 'zod';
import { DomainError } from './domain-error.js';

/** More errors than anybody reads at once; the rest is counted in the problem's detail. */
const MAX_FIELD_ERRORS = 200;

/**
 * Checks every body, query and parameter that was declared with `{ schema }` and hands the parsed value on. A bad path
 * parameter is a thing that does not exist; everything else is told field by field.
 */
@Injectable()
export class ValidationPipe implements PipeTransform {
  transform(value: unknown, metadata: ArgumentMetadata): unknown {
    const schema: unknown = metadata.schema;
    if (!(schema instanceof z.ZodType)) return value;
    // A missing body is an empty one: then the answer names the missing fields.
    const parsed = schema.safeParse(metadata.type === 'body' && value === undefined ? {} : value);
    if (parsed.success) return parsed.data;
    if (metadata.type === 'param') throw new DomainError('not-found', 'There is nothing at this address.');
    throw validationFailed(fieldErrorsOf(parsed.error));
  }
}

export function fieldErrorsOf(error: z.ZodError): FieldError[] {
  return error.issues.map((issue) => ({ path: issue.path.map(String).join('.'), message: issue.message }));
}

export function validationFailed(fieldErrors: readonly FieldError[]): DomainError {
  const count = fieldErrors.length;
  const detail =
    count === 1
      ? `One value cannot be used: ${fieldErrors[0]?.message ?? ''}`
      : count > MAX_FIELD_ERRORS
        ? `${count} values cannot be used; the first ${MAX_FIELD_ERRORS} are listed.`
        : `${count} values cannot be used.`;
  return new DomainError('validation-failed', detail, { fieldErrors: fieldErrors.slice(0, MAX_FIELD_ERRORS) });
}
