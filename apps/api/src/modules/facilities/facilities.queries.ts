import type { ModeConfiguration, ModeConfigurationVersion } from '@faintward/contracts/facilities';
import { Injectable } from '@nestjs/common';
import { desc, eq, max, sql } from 'drizzle-orm';
import { modeConfigurations, modes } from '../../database/schema/facilities.js';
import { people } from '../../database/schema/people.js';
import { DatabaseService } from '../../database/transaction.js';

@Injectable()
export class FacilitiesQueries {
  constructor(private readonly database: DatabaseService) {}

  async findMode(modeId: string) {
    const [mode] = await this.database.current().select().from(modes).where(eq(modes.id, modeId));
    return mode;
  }

  /** The mode, kept from other writers until the transaction ends: two new versions cannot get one number. */
  async findModeLocked(modeId: string) {
    const [mode] = await this.database.current().select().from(modes).where(eq(modes.id, modeId)).for('update');
    return mode;
  }

  async newestVersion(modeId: string): Promise<number> {
    const [row] = await this.database
      .current()
      .select({ version: max(modeConfigurations.version) })
      .from(modeConfigurations)
      .where(eq(modeConfigurations.modeId, modeId));
    return row?.version ?? 0;
  }

  async insertConfiguration(row: {
    modeId: string;
    version: number;
    configuration: ModeConfiguration;
    note: string;
    createdBy: string;
  }): Promise<void> {
    await this.database.current().insert(modeConfigurations).values(row);
  }

  async putInForce(modeId: string, configurationVersion: number): Promise<void> {
    await this.database.current().update(modes).set({ configurationVersion }).where(eq(modes.id, modeId));
  }

  /** Every configuration a mode has had, newest first. */
  async listConfigurations(modeId: string): Promise<ModeConfigurationVersion[]> {
    const rows = await this.database
      .current()
      .select({
        version: modeConfigurations.version,
        createdAt: modeConfigurations.createdAt,
        createdByName: sql<string | null>`${people.givenName} || ' ' || ${people.familyName}`,
        note: modeConfigurations.note,
        configuration: modeConfigurations.configuration,
      })
      .from(modeConfigurations)
      .leftJoin(people, eq(people.id, modeConfigurations.createdBy))
      .where(eq(modeConfigurations.modeId, modeId))
      .orderBy(desc(modeConfigurations.version));
    return rows.map((row) => ({ ...row, createdAt: row.createdAt.toISOString() }));
  }
}
