import type { TargetComputed, TargetInput } from '@faintward/contracts/targets';
import { Injectable } from '@nestjs/common';
import { and, eq, sql } from 'drizzle-orm';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';

export interface NewTargetRow extends TargetInput {
  position: number;
  computed: TargetComputed;
}

@Injectable()
export class TargetsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The target, kept from other writers until the transaction ends. */
  async findLocked(proposalId: string, targetId: string) {
    const [row] = await this.database
      .current()
      .select()
      .from(targets)
      .where(and(eq(targets.id, targetId), eq(targets.proposalId, proposalId)))
      .for('update');
    return row;
  }

  async lastPosition(proposalId: string): Promise<number> {
    const [row] = await this.database
      .current()
      .select({ last: sql<number>`coalesce(max(${targets.position}), 0)::int` })
      .from(targets)
      .where(eq(targets.proposalId, proposalId));
    return row?.last ?? 0;
  }

  async insert(proposalId: string, row: NewTargetRow): Promise<string> {
    const [inserted] = await this.database
      .current()
      .insert(targets)
      .values({ proposalId, ...row })
      .returning({ id: targets.id });
    if (inserted === undefined) throw new Error('A target was not stored.');
    return inserted.id;
  }

  /** Many targets in one statement: all values travel as one JSON parameter. */
  async insertMany(proposalId: string, rows: readonly NewTargetRow[]): Promise<void> {
    await this.database.current().execute(sql`
      insert into ${targets} (proposal_id, position, name, right_ascension_deg, declination_deg, redshift,
        redshift_uncertainty, redshift_kind, light, extent, notes, computed)
      select ${proposalId}::uuid, position, name, "rightAscensionDeg", "declinationDeg", redshift,
        "redshiftUncertainty", "redshiftKind", light, extent, notes, computed
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as given(position int, name text, "rightAscensionDeg" float8,
        "declinationDeg" float8, redshift float8, "redshiftUncertainty" jsonb, "redshiftKind" text, light jsonb, extent jsonb,
        notes text, computed jsonb)`);
  }

  async update(targetId: string, values: TargetInput & { computed: TargetComputed }): Promise<void> {
    await this.database
      .current()
      .update(targets)
      .set({ ...values, updatedAt: new Date(), version: sql`${targets.version} + 1` })
      .where(eq(targets.id, targetId));
  }

  async updateComputed(rows: readonly { targetId: string; computed: TargetComputed }[]): Promise<void> {
    await this.database.current().execute(sql`
      update ${targets} set computed = given.computed, updated_at = now(), version = ${targets}.version + 1
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as given("targetId" uuid, computed jsonb)
      where ${targets}.id = given."targetId"`);
  }

  /** Leaves versions as they are: nothing of what a person typed has changed. */
  async updateDuplicates(rows: readonly { targetId: string; nearestName: string | null }[]): Promise<void> {
    await this.database.current().execute(sql`
      update ${targets} set nearest_duplicate_name = given."nearestName"
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as given("targetId" uuid, "nearestName" text)
      where ${targets}.id = given."targetId"`);
  }

  async delete(proposalId: string, targetIds: readonly string[]): Promise<{ targetId: string; name: string }[]> {
    return this.database
      .current()
      .delete(targets)
      .where(
        and(
          eq(targets.proposalId, proposalId),
          sql`${targets.id} = any(array(select jsonb_array_elements_text(${JSON.stringify(targetIds)}::jsonb)::uuid))`,
        ),
      )
      .returning({ targetId: targets.id, name: targets.name });
  }
}
