import { Injectable } from '@nestjs/common';
import type { ListQuery } from '@faintward/contracts/common';
import type { PersonRecord, PersonSummary } from '@faintward/contracts/people';
import { asc, count, eq, getTableColumns, ilike, inArray, or, type SQL, sql } from 'drizzle-orm';
import { panelMembers, panels } from '../../database/schema/panels.js';
import { institutions, partners, people } from '../../database/schema/people.js';
import { DatabaseService } from '../../database/transaction.js';
import { containing, orderOf, pageWindow } from '../../platform/pagination.js';

const SEARCH_LIMIT = 20;
const fullName = sql<string>`${people.givenName} || ' ' || ${people.familyName}`;

/** People as screens and other subjects see them. */
@Injectable()
export class PeopleReadModel {
  constructor(private readonly database: DatabaseService) {}

  async listInstitutions() {
    return this.database
      .current()
      .select({
        institutionId: institutions.id,
        name: institutions.name,
        country: institutions.country,
        partnerId: institutions.partnerId,
        partnerName: partners.name,
      })
      .from(institutions)
      .leftJoin(partners, eq(partners.id, institutions.partnerId))
      .orderBy(asc(institutions.name));
  }

  /** By a part of the name, or by the whole e-mail address, which is never shown. */
  async search(text: string): Promise<PersonSummary[]> {
    return this.database
      .current()
      .select({ personId: people.id, name: fullName, institutionName: institutions.name })
      .from(people)
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(or(ilike(fullName, containing(text)), eq(sql`lower(${people.email})`, text.toLowerCase())))
      .orderBy(asc(people.familyName), asc(people.givenName), asc(people.id))
      .limit(SEARCH_LIMIT);
  }

  async listRecords(query: ListQuery): Promise<{ rows: PersonRecord[]; rowCount: number }> {
    const where =
      query.search === undefined
        ? undefined
        : or(ilike(fullName, containing(query.search)), ilike(people.email, containing(query.search)));
    const order = orderOf(
      query,
      {
        name: sql`lower(${people.familyName} || ' ' || ${people.givenName})`,
        email: people.email,
        createdAt: people.createdAt,
        lastSignInAt: people.lastSignInAt,
      },
      people.id,
    );
    const rows = await this.selectRecords(where, order, pageWindow(query));
    const [total] = await this.database.current().select({ rowCount: count() }).from(people).where(where);
    return { rows, rowCount: total?.rowCount ?? 0 };
  }

  async findRecord(personId: string): Promise<PersonRecord | undefined> {
    const [record] = await this.selectRecords(eq(people.id, personId), [asc(people.id)], { limit: 1, offset: 0 });
    return record;
  }

  private async selectRecords(
    where: SQL | undefined,
    order: SQL[],
    window: { limit: number; offset: number },
  ): Promise<PersonRecord[]> {
    const { id, email, isStaff, isAdministrator, createdAt, lastSignInAt, version } = getTableColumns(people);
    const db = this.database.current();
    const rows = await db
      .select({
        id,
        email,
        isStaff,
        isAdministrator,
        createdAt,
        lastSignInAt,
        version,
        name: fullName,
        institutionName: institutions.name,
      })
      .from(people)
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(where)
      .orderBy(...order)
      .limit(window.limit)
      .offset(window.offset);
    if (rows.length === 0) return [];
    const memberships = await db
      .select({ personId: panelMembers.personId, panelName: panels.name })
      .from(panelMembers)
      .innerJoin(panels, eq(panels.id, panelMembers.panelId))
      .where(
        inArray(
          panelMembers.personId,
          rows.map((row) => row.id),
        ),
      )
      .orderBy(asc(panels.name));
    return rows.map((row) => ({
      personId: row.id,
      email: row.email,
      name: row.name,
      institutionName: row.institutionName,
      isStaff: row.isStaff,
      isAdministrator: row.isAdministrator,
      panelNames: memberships.filter(({ personId }) => personId === row.id).map(({ panelName }) => panelName),
      createdAt: row.createdAt.toISOString(),
      lastSignInAt: row.lastSignInAt?.toISOString() ?? null,
      version: row.version,
    }));
  }
}
