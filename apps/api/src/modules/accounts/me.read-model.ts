import { Injectable } from '@nestjs/common';
import type { Me } from '@faintward/contracts/accounts';
import { asc, eq } from 'drizzle-orm';
import { panelMembers, panels } from '../../database/schema/panels.js';
import { institutions, people } from '../../database/schema/people.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';
import { sessionEnded } from './accounts.errors.js';

/** The signed-in person as the interface needs them. */
@Injectable()
export class MeReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** @throws {DomainError} `session-expired` when the person is gone */
  async getMe(personId: string): Promise<Me> {
    const db = this.database.current();
    const [person] = await db
      .select({
        personId: people.id,
        email: people.email,
        givenName: people.givenName,
        familyName: people.familyName,
        institutionId: institutions.id,
        institutionName: institutions.name,
        orcid: people.orcid,
        isStaff: people.isStaff,
        isAdministrator: people.isAdministrator,
      })
      .from(people)
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(eq(people.id, personId));
    if (person === undefined) throw sessionEnded();
    const { institutionId, institutionName, ...own } = person;
    return {
      ...own,
      institution: institutionId === null || institutionName === null ? null : { institutionId, name: institutionName },
      panels: await db
        .select({
          panelId: panels.id,
          panelName: panels.name,
          semesterId: semesters.id,
          semesterName: semesters.name,
          role: panelMembers.role,
        })
        .from(panelMembers)
        .innerJoin(panels, eq(panels.id, panelMembers.panelId))
        .innerJoin(semesters, eq(semesters.id, panels.semesterId))
        .where(eq(panelMembers.personId, personId))
        .orderBy(asc(semesters.name), asc(panels.name)),
    };
  }
}
