import { createHash } from 'node:crypto';
import { createParamDecorator, type ExecutionContext, Injectable } from '@nestjs/common';
import { and, eq, lt, sql } from 'drizzle-orm';
import type { Request } from 'express';
import { idempotencyKeys } from '../database/schema/accounts.js';
import { DatabaseService } from '../database/transaction.js';
import { DomainError } from './domain-error.js';
import { documentsHeader } from './header-parameter.js';

/** How long a key is remembered. */
const KEPT_HOURS = 48;

/** Parameter decorator: the `Idempotency-Key` header, or undefined when there is none. */
export const IdempotencyKey = createParamDecorator(
  (_: unknown, context: ExecutionContext): string | undefined => {
    const key = context.switchToHttp().getRequest<Request>().header('idempotency-key')?.trim();
    if (key === undefined || key === '') return undefined;
    if (!/^[\x21-\x7e]{8,200}$/.test(key)) {
      throw new DomainError(
        'malformed-request',
        'Idempotency-Key must be 8 to 200 visible ASCII characters without spaces.',
      );
    }
    return key;
  },
  [documentsHeader('Idempotency-Key', 'A repeated request with the same key gets the first answer again.', false)],
);

export interface IdempotentRequest {
  personId: string;
  /** Undefined: the client did not ask for protection, and the work is simply done. */
  key: string | undefined;
  /** Names the operation and its object, such as `proposals/5f…/submit`. */
  route: string;
  /** What was asked for; a second request under the same key must ask for the same. */
  body: unknown;
}

/** Makes a repeated request (a lost answer, a double click) get the first answer instead of doing its work again. */
@Injectable()
export class IdempotencyService {
  constructor(private readonly database: DatabaseService) {}

  /**
   * Runs `work` in a transaction that also stores its answer under the key, or returns the answer that is stored. A failed
   * `work` stores nothing, so that it can be tried again. The answer must be JSON.
   *
   * @throws {DomainError} `idempotency-mismatch` when the key was used for a different request
   */
  async idempotent<T>(request: IdempotentRequest, work: () => Promise<T>): Promise<T> {
    const { key } = request;
    if (key === undefined) return this.database.transaction(work);
    const requestHash = createHash('sha256').update(canonicalJson(request.body)).digest('base64url');
    const identity = and(
      eq(idempotencyKeys.personId, request.personId),
      eq(idempotencyKeys.route, request.route),
      eq(idempotencyKeys.key, key),
    );
    return this.database.transaction(async () => {
      // On a server the insert waits here for a first request that is still at work, and then finds its answer.
      const taken = await this.database
        .current()
        .insert(idempotencyKeys)
        .values({ personId: request.personId, route: request.route, key, requestHash })
        .onConflictDoNothing()
        .returning({ key: idempotencyKeys.key });
      if (taken.length === 0) {
        const [stored] = await this.database.current().select().from(idempotencyKeys).where(identity);
        if (stored === undefined || stored.requestHash !== requestHash) {
          throw new DomainError(
            'idempotency-mismatch',
            'This Idempotency-Key was used for a different request. Use a new key.',
          );
        }
        return stored.response as T;
      }
      const response = await work();
      await this.database
        .current()
        .update(idempotencyKeys)
        .set({ response: response ?? null })
        .where(identity);
      return response;
    });
  }

  /** Forgets keys that no client repeats any more. */
  async deleteExpired(): Promise<void> {
    await this.database
      .current()
      .delete(idempotencyKeys)
      .where(lt(idempotencyKeys.createdAt, sql`now() - make_interval(hours => ${KEPT_HOURS})`));
  }
}

/** JSON with sorted keys, so that the same request written in another order is the same request. */
export function canonicalJson(value: unknown): string {
  return (
    JSON.stringify(value, (_key, part: unknown) =>
      part !== null && typeof part === 'object' && !Array.isArray(part)
        ? Object.fromEntries(Object.entries(part).sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0)))
        : part,
    ) ?? ''
  );
}
