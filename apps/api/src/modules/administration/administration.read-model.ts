import { Injectable } from '@nestjs/common';
import type { ListQuery } from '@faintward/contracts/common';
import { asc, count, desc, eq, sql } from 'drizzle-orm';
import { changes } from '../../database/schema/history.js';
import { people } from '../../database/schema/people.js';
import { DatabaseService } from '../../database/transaction.js';
import { pageWindow } from '../../platform/pagination.js';

@Injectable()
export class AdministrationReadModel {
  constructor(private readonly database: DatabaseService) {}

  /**
   * That something changed, and which fields: neither their values nor the subject's name are read, because both may be
   * the science of a draft or an unreleased score. Only changes of roles are told in full; they are the administrators' own.
   */
  async listChanges(query: ListQuery) {
    const db = this.database.current();
    const rows = await db
      .select({
        id: changes.id,
        at: changes.at,
        personName: sql<string | null>`${people.givenName} || ' ' || ${people.familyName}`,
        scope: changes.scope,
        subject: changes.subject,
        subjectId: changes.subjectId,
        action: changes.action,
        fieldNames: sql<string[]>`array(select jsonb_object_keys(${changes.details}))`,
        roles: sql<Record<
          string,
          { after: unknown }
        > | null>`case when ${changes.subject} = 'roles' then ${changes.details} end`,
        roleHolder: sql<string | null>`case when ${changes.subject} = 'roles' then ${changes.subjectName} end`,
      })
      .from(changes)
      .leftJoin(people, eq(people.id, changes.personId))
      .orderBy(query.order === 'asc' ? asc(changes.at) : desc(changes.at), asc(changes.id))
      .limit(pageWindow(query).limit)
      .offset(pageWindow(query).offset);
    const [total] = await db.select({ rowCount: count() }).from(changes);
    return { rows, rowCount: total?.rowCount ?? 0 };
  }
}
