import { randomUUID } from 'node:crypto';
import {
  type ArgumentsHost,
  Catch,
  type ExceptionFilter,
  ForbiddenException,
  HttpException,
  Logger,
  NotFoundException,
} from '@nestjs/common';
import type { ErrorCode, Problem } from '@faintward/contracts/errors';
import type { Request, Response } from 'express';
import { databaseFailure, generalAnswer } from './database-errors.js';
import { DomainError } from './domain-error.js';
import { STATUS_OF, TITLE_OF } from './problem-statuses.js';

/** Codes for the framework's own exceptions: no route, multipart limits and the like. */
const CODE_OF_STATUS: Readonly<Record<number, ErrorCode>> = {
  400: 'malformed-request',
  401: 'not-signed-in',
  403: 'forbidden',
  404: 'not-found',
  405: 'method-not-allowed',
  409: 'conflict',
  413: 'too-large',
  415: 'unsupported-media-type',
  422: 'validation-failed',
  429: 'rate-limited',
  503: 'unavailable',
};

/** The only place that turns an error into an answer: RFC 9457 problem details. */
@Catch()
export class ProblemFilter implements ExceptionFilter {
  private readonly logger = new Logger('Problem');

  catch(thrown: unknown, host: ArgumentsHost): void {
    const http = host.switchToHttp();
    const request = http.getRequest<Request & { id?: string }>();
    const response = http.getResponse<Response>();
    const error = toDomainError(thrown);
    const status = STATUS_OF[error.code];
    let errorId: string | undefined;
    if (status >= 500 && error.code === 'internal') {
      errorId = randomUUID();
      this.logger.error(`${errorId} ${request.method} ${request.path}: ${describe(thrown)}`);
    }
    if (response.headersSent) {
      response.destroy();
      return;
    }
    const { fieldErrors, current, retryAfterSeconds, allowedMethods } = error.details;
    const problem: Problem = {
      type: `urn:faintward:problem:${error.code}`,
      title: TITLE_OF[error.code],
      status,
      detail: error.detail,
      instance: request.id === undefined ? undefined : `urn:faintward:request:${request.id}`,
      code: error.code,
      ...(fieldErrors === undefined ? {} : { fieldErrors: [...fieldErrors] }),
      ...(current === undefined ? {} : { current }),
      ...(retryAfterSeconds === undefined ? {} : { retryAfterSeconds }),
      ...(errorId === undefined ? {} : { errorId }),
    };
    if (retryAfterSeconds !== undefined)
      response.setHeader('Retry-After', String(Math.max(1, Math.ceil(retryAfterSeconds))));
    if (allowedMethods !== undefined) response.setHeader('Allow', allowedMethods.join(', '));
    response
      .status(status)
      .setHeader('Cache-Control', 'no-store')
      .setHeader('Content-Type', 'application/problem+json; charset=utf-8')
      .send(JSON.stringify(problem));
  }
}

export function toDomainError(thrown: unknown): DomainError {
  if (thrown instanceof DomainError) return thrown;
  const failure = databaseFailure(thrown);
  const answer = failure && generalAnswer(failure);
  if (answer !== undefined) return answer;
  if (thrown instanceof ForbiddenException && /cross-origin/i.test(thrown.message)) {
    return new DomainError('cross-site-request', 'Changes are only accepted from pages of this installation.');
  }
  if (thrown instanceof NotFoundException && /^Cannot [A-Z]+ /.test(thrown.message)) {
    return new DomainError('not-found', 'There is nothing at this address.');
  }
  if (thrown instanceof HttpException) {
    const code = CODE_OF_STATUS[thrown.getStatus()] ?? (thrown.getStatus() < 500 ? 'malformed-request' : 'internal');
    return code === 'internal' ? internal() : new DomainError(code, thrown.message);
  }
  // Errors of Express and its parsers carry a status and are marked when their message may be shown.
  const { status, expose } = thrown as { status?: unknown; expose?: unknown };
  if (typeof status === 'number' && status >= 400 && status < 500) {
    const detail = expose === true && thrown instanceof Error ? thrown.message : 'The request could not be read.';
    return new DomainError(CODE_OF_STATUS[status] ?? 'malformed-request', detail);
  }
  return internal();
}

function internal(): DomainError {
  return new DomainError(
    'internal',
    'The failure has been noted. Trying again may help; if not, give the error number to the observatory.',
  );
}

/** For the log: everything useful, but of a failed query only its state and constraint, because its text holds the values. */
function describe(thrown: unknown): string {
  const failure = databaseFailure(thrown);
  if (failure !== undefined) {
    const where = thrown instanceof Error ? callersOf(thrown) : '';
    return `database error ${failure.code}${failure.constraint === undefined ? '' : ` on ${failure.constraint}`}${where}`;
  }
  if (thrown instanceof Error) {
    if (/^Failed query/.test(thrown.message)) return `database error without a state${callersOf(thrown)}`;
    return thrown.stack ?? thrown.message;
  }
  return `thrown value of type ${typeof thrown}`;
}

function callersOf(error: Error): string {
  const frames = (error.stack ?? '').split('\n').filter((line) => /^\s+at /.test(line));
  return frames.length === 0 ? '' : `\n${frames.join('\n')}`;
}
