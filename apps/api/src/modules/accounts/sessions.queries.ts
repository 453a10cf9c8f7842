import { Injectable } from '@nestjs/common';
import { and, eq, inArray, isNull, lt, ne, sql } from 'drizzle-orm';
import { refreshTokens, sessions } from '../../database/schema/accounts.js';
import { DatabaseService } from '../../database/transaction.js';

export type SessionEnd = NonNullable<(typeof sessions.$inferSelect)['endedBecause']>;

@Injectable()
export class SessionsQueries {
  constructor(private readonly database: DatabaseService) {}

  async insertSession(personId: string): Promise<string> {
    const [row] = await this.database.current().insert(sessions).values({ personId }).returning({ id: sessions.id });
    if (row === undefined) throw new Error('An insert returned no row.');
    return row.id;
  }

  async insertRefreshToken(token: typeof refreshTokens.$inferInsert): Promise<void> {
    await this.database.current().insert(refreshTokens).values(token);
  }

  /** Uses the token up, atomically: of two that try at once, one gets true. */
  async useRefreshToken(tokenHash: string): Promise<boolean> {
    const used = await this.database
      .current()
      .update(refreshTokens)
      .set({ usedAt: sql`now()` })
      .where(and(eq(refreshTokens.tokenHash, tokenHash), isNull(refreshTokens.usedAt)))
      .returning({ tokenHash: refreshTokens.tokenHash });
    return used.length > 0;
  }

  /** The token with its session; ages are told by the database's clock, which all processes share. */
  async findRefreshToken(tokenHash: string) {
    const [row] = await this.database
      .current()
      .select({
        sessionId: sessions.id,
        personId: sessions.personId,
        hasEnded: sql<boolean>`${sessions.endedAt} is not null`,
        hasExpired: sql<boolean>`${refreshTokens.expiresAt} <= now()`,
        usedSecondsAgo: sql<number | null>`extract(epoch from clock_timestamp() - ${refreshTokens.usedAt})::float8`,
      })
      .from(refreshTokens)
      .innerJoin(sessions, eq(sessions.id, refreshTokens.sessionId))
      .where(eq(refreshTokens.tokenHash, tokenHash));
    return row;
  }

  async end(sessionId: string, because: SessionEnd): Promise<void> {
    await this.database
      .current()
      .update(sessions)
      .set({ endedAt: sql`now()`, endedBecause: because })
      .where(and(eq(sessions.id, sessionId), isNull(sessions.endedAt)));
  }

  async endOthers(personId: string, keptSessionId: string | undefined, because: SessionEnd): Promise<void> {
    await this.database
      .current()
      .update(sessions)
      .set({ endedAt: sql`now()`, endedBecause: because })
      .where(
        and(
          eq(sessions.personId, personId),
          isNull(sessions.endedAt),
          keptSessionId === undefined ? undefined : ne(sessions.id, keptSessionId),
        ),
      );
  }

  /** Expired tokens go, and then the sessions that none is left of. */
  async deleteExpired(): Promise<void> {
    const db = this.database.current();
    await db.delete(refreshTokens).where(lt(refreshTokens.expiresAt, sql`now()`));
    await db.delete(sessions).where(
      inArray(
        sessions.id,
        db
          .select({ id: sessions.id })
          .from(sessions)
          .leftJoin(refreshTokens, eq(refreshTokens.sessionId, sessions.id))
          .where(and(isNull(refreshTokens.tokenHash), lt(sessions.createdAt, sql`now() - interval '1 day'`))),
      ),
    );
  }
}
