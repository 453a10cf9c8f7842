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
  return error.issues.flatMap((issue) => fieldErrorsOfIssue(issue, []));
}

/**
 * A value that fits none of several shapes is told about in the shape it comes closest to: of those that got past the value
 * itself, the one with the fewest faults among its own fields, where a missing or foreign field shows; then the one with the
 * fewest in all. Where there is none, the whole value is wrong.
 */
function fieldErrorsOfIssue(issue: z.core.$ZodIssue, above: readonly PropertyKey[]): FieldError[] {
  const path = [...above, ...issue.path];
  if (issue.code === 'invalid_union') {
    const [closest] = issue.errors
      .filter((issues) => issues.length > 0 && issues.every((inner) => inner.path.length > 0))
      .sort((one, other) => ownFaults(one) - ownFaults(other) || one.length - other.length);
    if (closest) return closest.flatMap((inner) => fieldErrorsOfIssue(inner, path));
  }
  return [{ path: path.map(String).join('.'), message: issue.message }];
}

function ownFaults(issues: readonly z.core.$ZodIssue[]): number {
  return issues.filter((issue) => issue.path.length === 1).length;
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
