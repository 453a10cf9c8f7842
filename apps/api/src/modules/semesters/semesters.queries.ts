import type { SemesterInput } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { and, eq, inArray, isNull, sql } from 'drizzle-orm';
import { semesterHours, semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class SemestersQueries {
  constructor(private readonly database: DatabaseService) {}

  async insert(siteId: string, labelPrefix: string, input: SemesterInput): Promise<string> {
    const [row] = await this.database
      .current()
      .insert(semesters)
      .values({ siteId, labelPrefix, ...columnsOf(input) })
      .returning({ semesterId: semesters.id });
    if (row === undefined) throw new Error('A semester was not stored.');
    await this.replaceHours(row.semesterId, input.telescopes);
    return row.semesterId;
  }

  /** @returns false when `version` is no longer the stored one */
  async update(semesterId: string, version: number, input: SemesterInput): Promise<boolean> {
    const changed = await this.database
      .current()
      .update(semesters)
      .set({ ...columnsOf(input), updatedAt: new Date(), version: sql`${semesters.version} + 1` })
      .where(and(eq(semesters.id, semesterId), eq(semesters.version, version)))
      .returning({ semesterId: semesters.id });
    if (changed.length === 0) return false;
    await this.replaceHours(semesterId, input.telescopes);
    return true;
  }

  async listTakenPrefixes(prefixes: readonly string[]): Promise<string[]> {
    const rows = await this.database
      .current()
      .select({ labelPrefix: semesters.labelPrefix })
      .from(semesters)
      .where(inArray(semesters.labelPrefix, [...prefixes]));
    return rows.map((row) => row.labelPrefix);
  }

  async setDecided(semesterId: string, decidedAt: Date): Promise<void> {
    await this.database
      .current()
      .update(semesters)
      .set({ decidedAt, updatedAt: decidedAt, version: sql`${semesters.version} + 1` })
      .where(and(eq(semesters.id, semesterId), isNull(semesters.decidedAt)));
  }

  private async replaceHours(semesterId: string, telescopes: SemesterInput['telescopes']): Promise<void> {
    const db = this.database.current();
    await db.delete(semesterHours).where(eq(semesterHours.semesterId, semesterId));
    if (telescopes.length === 0) return;
    await db.insert(semesterHours).values(
      telescopes.map(({ telescopeId, availableHours }) => ({
        semesterId,
        telescopeId,
        darkHours: availableHours.dark,
        greyHours: availableHours.grey,
        brightHours: availableHours.bright,
      })),
    );
  }
}

function columnsOf(input: SemesterInput) {
  return {
    name: input.name,
    startsOn: input.startsOn,
    endsOn: input.endsOn,
    callOpensAt: new Date(input.callOpensAt),
    deadlineAt: new Date(input.deadlineAt),
    reviewsDueAt: input.reviewsDueAt == null ? null : new Date(input.reviewsDueAt),
    isAnonymised: input.isAnonymised,
    callText: input.callText,
    criteria: input.criteria,
  };
}
