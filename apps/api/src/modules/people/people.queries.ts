import { Injectable } from '@nestjs/common';
import type { PersonRolesPatch } from '@faintward/contracts/people';
import { and, asc, eq, sql } from 'drizzle-orm';
import { people } from '../../database/schema/people.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class PeopleQueries {
  constructor(private readonly database: DatabaseService) {}

  /**
   * Ids of all administrators, their rows locked until the transaction ends: of two administrators who take the role from
   * each other at once, the second waits and then sees what the first did.
   */
  async lockAdministrators(): Promise<string[]> {
    const rows = await this.database
      .current()
      .select({ id: people.id })
      .from(people)
      .where(eq(people.isAdministrator, true))
      .orderBy(asc(people.id))
      .for('update');
    return rows.map(({ id }) => id);
  }

  async findRoles(personId: string) {
    const [row] = await this.database
      .current()
      .select({
        isStaff: people.isStaff,
        isAdministrator: people.isAdministrator,
        givenName: people.givenName,
        familyName: people.familyName,
        version: people.version,
      })
      .from(people)
      .where(eq(people.id, personId));
    return row;
  }

  /** False when the stored version is another one. */
  async updateRoles(personId: string, version: number, patch: PersonRolesPatch): Promise<boolean> {
    const updated = await this.database
      .current()
      .update(people)
      .set({ ...patch, updatedAt: new Date(), version: sql`${people.version} + 1` })
      .where(and(eq(people.id, personId), eq(people.version, version)))
      .returning({ id: people.id });
    return updated.length > 0;
  }
}
