import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import { DomainError } from './domain-error.js';
import { documentsHeader } from './header-parameter.js';

/**
 * The version in an `If-Match` header such as `"7"`.
 *
 * @throws {DomainError} `precondition-required` without the header, `malformed-request` when it is not a version of ours
 */
export function parseIfMatch(header: string | undefined): number {
  if (header === undefined || header.trim() === '') {
    throw new DomainError(
      'precondition-required',
      'Send the version you are changing as If-Match, as the ETag of its last answer gave it.',
    );
  }
  const match = /^\s*"?(\d{1,9})"?\s*$/.exec(header);
  if (match === null)
    throw new DomainError('malformed-request', 'If-Match must be one version in quotes, such as "7".');
  return Number(match[1]);
}

export function etagOf(version: number): string {
  return `"${version}"`;
}

/** Parameter decorator: the version that the client says it is changing. */
export const IfMatch = createParamDecorator(
  (_: unknown, context: ExecutionContext): number =>
    parseIfMatch(context.switchToHttp().getRequest<Request>().header('if-match')),
  [documentsHeader('If-Match', 'The version being changed, as the ETag of its last answer gave it: `"7"`.', true)],
);
