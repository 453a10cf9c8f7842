import { AsyncLocalStorage } from 'node:async_hooks';
import { Inject, Injectable, Logger } from '@nestjs/common';
import type { PgTransactionConfig } from 'drizzle-orm/pg-core';
import type { Database, DatabaseHandle, Engine } from './connection.js';

/** Injection token of the open database. */
export const DATABASE_HANDLE = Symbol('DATABASE_HANDLE');

interface Scope {
  db: Database;
  afterCommit: (() => void | Promise<void>)[];
}

/**
 * The way to the database. Queries call `current()` and nothing else, so that they run inside the transaction that their
 * caller opened without being handed it: with the embedded database, a query that goes around an open transaction would
 * wait for it for ever.
 */
@Injectable()
export class DatabaseService {
  private readonly logger = new Logger(DatabaseService.name);
  private readonly scopes = new AsyncLocalStorage<Scope>();

  constructor(@Inject(DATABASE_HANDLE) private readonly handle: DatabaseHandle) {}

  get engine(): Engine {
    return this.handle.engine;
  }

  /** The transaction this code runs in, or the database itself. Do not keep the result across an `await` of other work. */
  current(): Database {
    return this.scopes.getStore()?.db ?? this.handle.db;
  }

  /**
   * Runs `work` in a transaction; inside another one, in a savepoint of it, so that an expected failure can be caught
   * outside the inner call. Keep it short: the embedded database serves one transaction at a time. No network call,
   * password hash or heavy computing inside.
   */
  async transaction<T>(work: () => Promise<T>, options?: PgTransactionConfig): Promise<T> {
    const outer = this.scopes.getStore();
    const afterCommit: Scope['afterCommit'] = [];
    const result = await this.current().transaction(
      (tx) => this.scopes.run({ db: tx as unknown as Database, afterCommit }, work),
      outer === undefined ? options : undefined,
    );
    if (outer !== undefined) outer.afterCommit.push(...afterCommit);
    else for (const effect of afterCommit) await this.runAfterCommit(effect);
    return result;
  }

  /** Runs `effect` once the outermost transaction is stored; at once outside a transaction; never after a roll-back. */
  async afterCommit(effect: () => void | Promise<void>): Promise<void> {
    const scope = this.scopes.getStore();
    if (scope === undefined) await this.runAfterCommit(effect);
    else scope.afterCommit.push(effect);
  }

  /** What has been stored stays stored: an effect that fails is logged and must not turn the answer into a failure. */
  private async runAfterCommit(effect: () => void | Promise<void>): Promise<void> {
    try {
      await effect();
    } catch (error) {
      this.logger.error(`An effect after a commit failed: ${error instanceof Error ? error.message : String(error)}`);
    }
  }
}
