import type {
  ModeConfigurationHistory,
  ModeConfigurationVersion,
  NewModeConfiguration,
  TelescopeList,
} from '@faintward/contracts/facilities';
import { Injectable } from '@nestjs/common';
import type { z } from 'zod';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { invalidField, notFound } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { FacilitiesQueries } from './facilities.queries.js';
import { FacilitiesReadModel } from './facilities.read-model.js';

@Injectable()
export class FacilitiesService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: FacilitiesQueries,
    private readonly readModel: FacilitiesReadModel,
    private readonly history: HistoryService,
  ) {}

  async listTelescopes(): Promise<z.infer<typeof TelescopeList>> {
    const rows = await this.readModel.listTelescopes();
    const [site] = await this.readModel.listSites();
    return { observatoryName: site?.observatoryName ?? '', rows };
  }

  async listConfigurations(modeId: string): Promise<z.infer<typeof ModeConfigurationHistory>> {
    if ((await this.queries.findMode(modeId)) === undefined) throw notFound('mode');
    return { rows: await this.queries.listConfigurations(modeId) };
  }

  /**
   * Adds a configuration and puts it in force. Older ones stay as they were, because stored results name the version they
   * used.
   */
  async addConfiguration(actor: Actor, modeId: string, input: NewModeConfiguration): Promise<ModeConfigurationVersion> {
    return this.database.transaction(async () => {
      const mode = await this.queries.findModeLocked(modeId);
      if (mode === undefined) throw notFound('mode');
      const before = await this.readModel.findMode(modeId);
      if (before !== undefined && before.configuration.kind !== input.configuration.kind) {
        throw invalidField(
          'configuration.kind',
          `“${mode.name}” is a mode for ${before.configuration.kind === 'imaging' ? 'imaging' : 'spectroscopy'} and stays one: ` +
            'the observations planned with it could not be repeated otherwise. Set up a new mode instead.',
        );
      }
      const version = (await this.queries.newestVersion(modeId)) + 1;
      await this.queries.insertConfiguration({
        modeId,
        version,
        configuration: input.configuration,
        note: input.note,
        createdBy: actor.personId,
      });
      await this.queries.putInForce(modeId, version);
      await this.history.record({
        personId: actor.personId,
        scope: 'mode',
        scopeId: modeId,
        subject: 'modeConfiguration',
        subjectId: String(version),
        subjectName: mode.name,
        action: 'created',
        details: differences<object>(before?.configuration ?? {}, input.configuration),
      });
      const [added] = await this.queries.listConfigurations(modeId);
      if (added === undefined) throw new Error('A configuration that was just stored is not there.');
      return added;
    });
  }
}
