import { z } from 'zod';

/** Every way the server can say no. The api maps each to a status; the web decides by code, never by text. */
export const ErrorCode = z.enum([
  'malformed-request',
  'validation-failed',
  'not-signed-in',
  'session-expired',
  'wrong-credentials',
  'cross-site-request',
  'forbidden',
  'not-found',
  'method-not-allowed',
  'conflict',
  'already-exists',
  'stale-version',
  'precondition-required',
  'idempotency-mismatch',
  'too-large',
  'unsupported-media-type',
  'rate-limited',
  'wrong-state',
  'deadline-passed',
  'checks-failed',
  'unreadable-table',
  'link-expired',
  'unavailable',
  'internal',
]);
export type ErrorCode = z.infer<typeof ErrorCode>;

export const FieldError = z.object({
  /** Path in the request body, dots between parts: `light.magnitude`, `redshifts.3`. */
  path: z.string(),
  message: z.string(),
});
export type FieldError = z.infer<typeof FieldError>;

/** RFC 9457 problem details, with our members. */
export const Problem = z
  .object({
    type: z.string(),
    title: z.string(),
    status: z.int(),
    detail: z.string().optional(),
    instance: z.string().optional(),
    code: ErrorCode,
    fieldErrors: z.array(FieldError).optional(),
    /** On a 500: also in the server's log. */
    errorId: z.string().optional(),
    /** On `stale-version`: what is stored now. */
    current: z.unknown().optional(),
    retryAfterSeconds: z.number().optional(),
  })
  .meta({ id: 'Problem' });
export type Problem = z.infer<typeof Problem>;
