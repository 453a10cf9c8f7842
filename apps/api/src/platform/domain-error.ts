import type { ErrorCode, FieldError } from '@faintward/contracts/errors';

export interface DomainErrorDetails {
  fieldErrors?: readonly FieldError[];
  /** On `stale-version`: the stored representation, as the person may see it. */
  current?: unknown;
  retryAfterSeconds?: number;
  /** On `method-not-allowed`. */
  allowedMethods?: readonly string[];
}

/**
 * The way every subject says no. `code` decides the status, `detail` is a sentence for the person, and nothing else is
 * told. Services throw these; HTTP exceptions belong to controllers of nobody.
 */
export class DomainError extends Error {
  override readonly name = 'DomainError';
  constructor(
    readonly code: ErrorCode,
    readonly detail: string,
    readonly details: DomainErrorDetails = {},
  ) {
    super(`${code}: ${detail}`);
  }
}

/** For what is absent and for what the person may not see, in the same words. */
export function notFound(what: string): DomainError {
  return new DomainError('not-found', `There is no such ${what}, or you may not see it.`);
}

export function forbidden(detail: string): DomainError {
  return new DomainError('forbidden', detail);
}

/** One field that cannot be used, found by a rule rather than by the schema. */
export function invalidField(path: string, message: string): DomainError {
  return new DomainError('validation-failed', message, { fieldErrors: [{ path, message }] });
}

/** A writer worked on an older version; `current` is what is stored now, so that both can be shown. */
export function staleVersion(current: unknown): DomainError {
  return new DomainError(
    'stale-version',
    'Somebody saved another version after you opened this one. Nothing of yours was stored; compare and save again.',
    { current },
  );
}
