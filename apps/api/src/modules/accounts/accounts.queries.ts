import { Injectable } from '@nestjs/common';
import { and, asc, eq, isNotNull, isNull, lt, sql } from 'drizzle-orm';
import { passwordResetTokens } from '../../database/schema/accounts.js';
import { institutions, people } from '../../database/schema/people.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class AccountsQueries {
  constructor(private readonly database: DatabaseService) {}

  async insertPerson(person: typeof people.$inferInsert): Promise<string> {
    const [row] = await this.database.current().insert(people).values(person).returning({ id: people.id });
    if (row === undefined) throw new Error('An insert returned no row.');
    return row.id;
  }

  async findByEmail(email: string) {
    const [row] = await this.database
      .current()
      .select({ id: people.id, givenName: people.givenName, email: people.email, passwordHash: people.passwordHash })
      .from(people)
      .where(eq(sql`lower(${people.email})`, email.toLowerCase()));
    return row;
  }

  async findProfile(personId: string) {
    const [row] = await this.database
      .current()
      .select({
        givenName: people.givenName,
        familyName: people.familyName,
        institutionId: people.institutionId,
        orcid: people.orcid,
        passwordHash: people.passwordHash,
      })
      .from(people)
      .where(eq(people.id, personId));
    return row;
  }

  async updatePerson(personId: string, values: Partial<typeof people.$inferInsert>): Promise<void> {
    await this.database
      .current()
      .update(people)
      .set({ ...values, updatedAt: new Date(), version: sql`${people.version} + 1` })
      .where(eq(people.id, personId));
  }

  /** Not a change of the person that another writer would have to see, so the version stays. */
  async recordSignIn(personId: string): Promise<void> {
    await this.database.current().update(people).set({ lastSignInAt: new Date() }).where(eq(people.id, personId));
  }

  async listDemoPeople() {
    return this.database
      .current()
      .select({
        email: people.email,
        givenName: people.givenName,
        familyName: people.familyName,
        institutionName: institutions.name,
        part: people.demoPart,
      })
      .from(people)
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(isNotNull(people.demoPart))
      .orderBy(asc(people.createdAt), asc(people.email));
  }

  async insertResetToken(token: typeof passwordResetTokens.$inferInsert): Promise<void> {
    await this.database.current().insert(passwordResetTokens).values(token);
  }

  /** Marks the token used and returns its person; undefined when it is unknown, used or too old. */
  async takeResetToken(tokenHash: string): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .update(passwordResetTokens)
      .set({ usedAt: sql`now()` })
      .where(
        and(
          eq(passwordResetTokens.tokenHash, tokenHash),
          isNull(passwordResetTokens.usedAt),
          sql`${passwordResetTokens.expiresAt} > now()`,
        ),
      )
      .returning({ personId: passwordResetTokens.personId });
    return row?.personId;
  }

  /** A new password makes every other open link worthless. */
  async deleteResetTokens(personId: string): Promise<void> {
    await this.database.current().delete(passwordResetTokens).where(eq(passwordResetTokens.personId, personId));
  }

  async deleteExpiredResetTokens(): Promise<void> {
    await this.database
      .current()
      .delete(passwordResetTokens)
      .where(lt(passwordResetTokens.expiresAt, sql`now()`));
  }
}
