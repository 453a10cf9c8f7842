import { DomainError } from './domain-error.js';

/** What may be said of a failed query: drizzle's own message holds the query's parameters, and so perhaps a password hash. */
export interface DatabaseFailure {
  /** SQLSTATE. */
  code: string;
  constraint: string | undefined;
}

/** SQLSTATE `connection_failure`; also stands for what the driver finds before there is a server to name a state. */
const CONNECTION_FAILURE = '08006';

/** The requests of people open no other connections than those to the database. */
function isLostConnection(code: unknown, message: string): boolean {
  return (
    (typeof code === 'string' &&
      /^(ECONNREFUSED|ECONNRESET|ENOTFOUND|EAI_AGAIN|ETIMEDOUT|EHOSTUNREACH|EPIPE)$/.test(code)) ||
    // Errors of `pg` that carry no code.
    /^(Connection terminated|timeout exceeded when trying to connect|Client has encountered a connection error)/.test(
      message,
    )
  );
}

/** Reads SQLSTATE and constraint from an error of either driver, wrapped by drizzle or not; undefined for other errors. */
export function databaseFailure(error: unknown): DatabaseFailure | undefined {
  for (let candidate: unknown = error, depth = 0; candidate instanceof Error && depth < 5; depth += 1) {
    const { code, constraint } = candidate as { code?: unknown; constraint?: unknown };
    if (typeof code === 'string' && /^[0-9A-Z]{5}$/.test(code) && code !== 'EPIPE') {
      return { code, constraint: typeof constraint === 'string' ? constraint : undefined };
    }
    if (isLostConnection(code, candidate.message)) return { code: CONNECTION_FAILURE, constraint: undefined };
    candidate = candidate.cause;
  }
  return undefined;
}

/**
 * Runs `work` and turns the violation of a named constraint into the domain's own words:
 * `onConstraint({ people_email_unique: () => emailTaken() }, () => this.queries.insert(row))`.
 * Looking first and inserting afterwards would lose the race that the constraint settles.
 */
export async function onConstraint<T>(
  answers: Readonly<Record<string, () => DomainError>>,
  work: () => Promise<T>,
): Promise<T> {
  try {
    return await work();
  } catch (error) {
    const constraint = databaseFailure(error)?.constraint;
    const answer = constraint === undefined ? undefined : answers[constraint];
    throw answer === undefined ? error : answer();
  }
}

/** What a database error that no service foresaw means to the person; undefined when it is a fault of ours. */
export function generalAnswer(failure: DatabaseFailure): DomainError | undefined {
  switch (failure.code) {
    case '23505':
      return new DomainError('already-exists', 'Something with the same name or key is stored already.');
    case '23503':
      return new DomainError(
        'conflict',
        'This refers to something that no longer exists, or something else depends on it.',
      );
    case '23P01':
      return new DomainError('conflict', 'This overlaps something that is stored already.');
    case '23514':
    case '22001':
    case '22003':
      return new DomainError('validation-failed', 'A value is outside of what can be stored.');
    case '22P02':
    case '22021':
      return new DomainError('malformed-request', 'A value in the request has the wrong form.');
    case '40001':
    case '40P01':
      return new DomainError(
        'conflict',
        'Two changes met at the same moment. Nothing of this one was stored; please try again.',
      );
    case '53300':
    case '57P01':
    case '57P02':
    case '57P03':
    case '08000':
    case '08003':
    case CONNECTION_FAILURE:
      return new DomainError('unavailable', 'The database is not available right now.', { retryAfterSeconds: 5 });
    default:
      return undefined;
  }
}
