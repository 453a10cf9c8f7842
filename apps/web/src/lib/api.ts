import { Problem, type ErrorCode, type FieldError } from '@faintward/contracts/errors';
import type { z } from 'zod';
import { refreshSession, waitForSignIn } from './session';

/** What the server, or the way to it, said no with. Decide by `code`; show through `ProblemDisplay`. */
export class ApiError extends Error {
  override readonly name = 'ApiError';
  readonly code: ErrorCode | 'unreachable' | 'unexpected-answer';
  /** HTTP status; 0 when no answer came. */
  readonly status: number;
  readonly fieldErrors: readonly FieldError[];
  readonly errorId: string | undefined;
  /** On `stale-version`: what is stored now. */
  readonly current: unknown;
  readonly retryAfterSeconds: number | undefined;

  constructor(problem: {
    code: ApiError['code'];
    status: number;
    message: string;
    fieldErrors?: readonly FieldError[] | undefined;
    errorId?: string | undefined;
    current?: unknown;
    retryAfterSeconds?: number | undefined;
    cause?: unknown;
  }) {
    super(problem.message, { cause: problem.cause });
    this.code = problem.code;
    this.status = problem.status;
    this.fieldErrors = problem.fieldErrors ?? [];
    this.errorId = problem.errorId;
    this.current = problem.current;
    this.retryAfterSeconds = problem.retryAfterSeconds;
  }
}

export interface ApiRequest<Schema extends z.ZodType> {
  method?: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE';
  /** Below `/api/v1`, with its leading slash. */
  path: string;
  /** Undefined, null and empty values are left out. */
  query?: Record<string, string | number | boolean | null | undefined>;
  /** Sent as JSON; `FormData`, `Blob` and strings with `contentType` as they are. */
  body?: unknown;
  contentType?: string;
  /** Parses the answer; an answer that does not fit is an `unexpected-answer`. */
  schema: Schema;
  signal?: AbortSignal | undefined;
  /** Version of the row that is being changed. */
  ifMatch?: number | undefined;
  /** The same key for every try of one intention: make it once, with {@link newIdempotencyKey}. */
  idempotencyKey?: string | undefined;
  /**
   * What a 401 leads to. `wait` (default): refresh the session, else ask to sign in on top of the page and try again.
   * `refresh`: refresh only. `throw`: neither (signing in itself).
   */
  onSignedOut?: 'wait' | 'refresh' | 'throw';
}

export interface ApiAnswer<T> {
  data: T;
  /** From `ETag`; send it back as `ifMatch`. */
  version: number | undefined;
}

export function newIdempotencyKey(): string {
  return crypto.randomUUID();
}

export function apiUrl(path: string, query: ApiRequest<z.ZodType>['query'] = {}): string {
  const parameters = new URLSearchParams();
  for (const [name, value] of Object.entries(query)) {
    if (value !== undefined && value !== null && value !== '') parameters.set(name, String(value));
  }
  const text = parameters.toString();
  return `/api/v1${path}${text ? `?${text}` : ''}`;
}

/** One request to the api: answers with the parsed body, or throws {@link ApiError} (or the signal's abort reason). */
export async function api<Schema extends z.ZodType>(request: ApiRequest<Schema>): Promise<z.output<Schema>> {
  return (await apiWithVersion(request)).data;
}

/** As {@link api}, with the version of the row that came back. */
export async function apiWithVersion<Schema extends z.ZodType>(
  request: ApiRequest<Schema>,
): Promise<ApiAnswer<z.output<Schema>>> {
  const policy = request.onSignedOut ?? 'wait';
  const sentAt = Date.now();
  let response = await send(request);
  if (response.status === 401 && policy !== 'throw') {
    if (await refreshSession(sentAt)) response = await send(request);
    if (response.status === 401 && policy === 'wait' && (await waitForSignIn(request.signal))) {
      response = await send(request);
    }
  }
  if (!response.ok) throw await readProblem(response);
  return { data: await readBody(response, request.schema), version: readVersion(response) };
}

async function send(request: ApiRequest<z.ZodType>): Promise<Response> {
  const headers = new Headers({ Accept: 'application/json, application/problem+json' });
  let body: BodyInit | undefined;
  if (request.body !== undefined) {
    if (request.body instanceof FormData) body = request.body;
    else if (request.body instanceof Blob || request.contentType) {
      body = request.body as BodyInit;
      if (request.contentType) headers.set('Content-Type', request.contentType);
    } else {
      body = JSON.stringify(request.body);
      headers.set('Content-Type', 'application/json');
    }
  }
  if (request.ifMatch !== undefined) headers.set('If-Match', `"${request.ifMatch}"`);
  if (request.idempotencyKey !== undefined) headers.set('Idempotency-Key', request.idempotencyKey);
  try {
    return await fetch(apiUrl(request.path, request.query), {
      method: request.method ?? 'GET',
      headers,
      credentials: 'same-origin',
      ...(body === undefined ? {} : { body }),
      ...(request.signal ? { signal: request.signal } : {}),
    });
  } catch (error) {
    if (request.signal?.aborted) throw error;
    throw new ApiError({
      code: 'unreachable',
      status: 0,
      message: 'The server cannot be reached. Check the connection; nothing that you typed is lost.',
      cause: error,
    });
  }
}

async function readProblem(response: Response): Promise<ApiError> {
  const text = await response.text().catch(() => '');
  const parsed = Problem.safeParse(parseJson(text));
  if (parsed.success) {
    const problem = parsed.data;
    const retryAfter = Number(response.headers.get('Retry-After'));
    return new ApiError({
      code: problem.code,
      status: problem.status,
      message: problem.detail ?? problem.title,
      fieldErrors: problem.fieldErrors,
      errorId: problem.errorId,
      current: problem.current,
      retryAfterSeconds: problem.retryAfterSeconds ?? (retryAfter > 0 ? retryAfter : undefined),
    });
  }
  // A balancer or proxy answers in its own words: nothing in them is for the person.
  return new ApiError({
    code: 'unexpected-answer',
    status: response.status,
    message: `The server gave an answer that this page does not understand (HTTP ${response.status}).`,
  });
}

async function readBody<Schema extends z.ZodType>(response: Response, schema: Schema): Promise<z.output<Schema>> {
  const text = await response.text();
  const parsed = schema.safeParse(text === '' ? undefined : parseJson(text));
  if (parsed.success) return parsed.data;
  throw new ApiError({
    code: 'unexpected-answer',
    status: response.status,
    message: 'The server gave an answer that this page does not understand. Reloading the page may help.',
    cause: parsed.error,
  });
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    // Not JSON is an answer that no schema accepts; the caller says so.
    return undefined;
  }
}

function readVersion(response: Response): number | undefined {
  const match = /^(?:W\/)?"(\d+)"$/.exec(response.headers.get('ETag') ?? '');
  return match ? Number(match[1]) : undefined;
}
