import { Injectable } from '@nestjs/common';
import type { ListQuery } from '@faintward/contracts/common';
import type { PersonRecord, PersonRolesPatch } from '@faintward/contracts/people';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, notFound, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { toPage } from '../../platform/pagination.js';
import { PeopleQueries } from './people.queries.js';
import { PeopleReadModel } from './people.read-model.js';

@Injectable()
export class PeopleService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: PeopleQueries,
    private readonly readModel: PeopleReadModel,
    private readonly history: HistoryService,
  ) {}

  async search(text: string) {
    return { rows: await this.readModel.search(text) };
  }

  async listInstitutions() {
    return { rows: await this.readModel.listInstitutions() };
  }

  async list(query: ListQuery) {
    const { rows, rowCount } = await this.readModel.listRecords(query);
    return toPage(rows, rowCount, query);
  }

  /** @throws {DomainError} `wrong-state` when it would leave the installation without an administrator */
  async updateRoles(actor: Actor, personId: string, version: number, patch: PersonRolesPatch): Promise<PersonRecord> {
    await this.database.transaction(async () => {
      const administrators = await this.queries.lockAdministrators();
      const before = await this.queries.findRoles(personId);
      if (before === undefined) throw notFound('person');
      if (patch.isAdministrator === false && administrators.length === 1 && administrators[0] === personId) {
        throw new DomainError('wrong-state', 'This is the last administrator. Name another one first.');
      }
      if (!(await this.queries.updateRoles(personId, version, patch)))
        throw staleVersion(await this.getRecord(personId));
      const details = differences({ isStaff: before.isStaff, isAdministrator: before.isAdministrator }, patch);
      if (Object.keys(details).length === 0) return;
      await this.history.record({
        personId: actor.personId,
        scope: 'person',
        scopeId: personId,
        subject: 'roles',
        subjectId: personId,
        subjectName: `${before.givenName} ${before.familyName}`,
        action: 'changed',
        details,
      });
    });
    return this.getRecord(personId);
  }

  private async getRecord(personId: string): Promise<PersonRecord> {
    const record = await this.readModel.findRecord(personId);
    if (record === undefined) throw notFound('person');
    return record;
  }
}
