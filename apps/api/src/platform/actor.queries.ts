import { Injectable } from '@nestjs/common';
import { and, eq, isNull } from 'drizzle-orm';
import { sessions } from '../database/schema/accounts.js';
import { people } from '../database/schema/people.js';
import { DatabaseService } from '../database/transaction.js';
import type { Actor } from './actor.js';

@Injectable()
export class ActorQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The person of a session that has not ended. */
  async findActor(personId: string, sessionId: string): Promise<Actor | undefined> {
    const [actor] = await this.database
      .current()
      .select({
        personId: people.id,
        sessionId: sessions.id,
        email: people.email,
        isStaff: people.isStaff,
        isAdministrator: people.isAdministrator,
      })
      .from(sessions)
      .innerJoin(people, eq(people.id, sessions.personId))
      .where(and(eq(sessions.id, sessionId), eq(people.id, personId), isNull(sessions.endedAt)));
    return actor;
  }
}
