import type { Conditions, Goal } from '@faintward/contracts/estimates';
import { Injectable } from '@nestjs/common';
import { and, eq, inArray, sql, type SQL } from 'drizzle-orm';
import { observations } from '../../database/schema/observations.js';
import { DatabaseService } from '../../database/transaction.js';
import type { EstimateColumns } from './observation-estimates.service.js';

export interface NewObservationRow extends EstimateColumns {
  targetId: string;
}

export interface PlanRow {
  modeId: string;
  goal: Goal;
  conditions: Conditions;
  repeatCount: number;
}

@Injectable()
export class ObservationsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** Plans of observations, without their estimates, which are large. */
  async listPlans(proposalId: string, targetIds: readonly string[] | 'all') {
    return this.database
      .current()
      .select({
        observationId: observations.id,
        targetId: observations.targetId,
        modeId: observations.modeId,
        goal: observations.goal,
        conditions: observations.conditions,
        repeatCount: observations.repeatCount,
        version: observations.version,
      })
      .from(observations)
      .where(and(eq(observations.proposalId, proposalId), ofTargets(targetIds)));
  }

  /** The observation, kept from other writers until the transaction ends. */
  async findLocked(proposalId: string, observationId: string) {
    const [row] = await this.database
      .current()
      .select({
        observationId: observations.id,
        targetId: observations.targetId,
        modeId: observations.modeId,
        goal: observations.goal,
        conditions: observations.conditions,
        repeatCount: observations.repeatCount,
        version: observations.version,
      })
      .from(observations)
      .where(and(eq(observations.id, observationId), eq(observations.proposalId, proposalId)))
      .for('update');
    return row;
  }

  async update(observationId: string, values: PlanRow & EstimateColumns): Promise<void> {
    await this.database
      .current()
      .update(observations)
      .set({ ...values, updatedAt: new Date(), version: sql`${observations.version} + 1` })
      .where(eq(observations.id, observationId));
  }

  /** @returns how many there were */
  async deleteOfTargets(proposalId: string, modeId: string, targetIds: readonly string[]): Promise<number> {
    const deleted = await this.database
      .current()
      .delete(observations)
      .where(and(eq(observations.proposalId, proposalId), eq(observations.modeId, modeId), ofTargets(targetIds)))
      .returning({ id: observations.id });
    return deleted.length;
  }

  async deleteByIds(proposalId: string, observationIds: readonly string[]): Promise<string[]> {
    const deleted = await this.database
      .current()
      .delete(observations)
      .where(and(eq(observations.proposalId, proposalId), anyOf(sql`${observations.id}`, observationIds)))
      .returning({ targetId: observations.targetId });
    return deleted.map(({ targetId }) => targetId);
  }

  /** Many observations under one plan, in one statement: all values travel as one JSON parameter. */
  async insertMany(proposalId: string, plan: PlanRow, rows: readonly NewObservationRow[]): Promise<void> {
    await this.database.current().execute(sql`
      insert into ${observations} (proposal_id, target_id, mode_id, goal, conditions, repeat_count, configuration_version,
        estimate, lacking, total_seconds, open_shutter_seconds)
      select ${proposalId}::uuid, "targetId", ${plan.modeId}::uuid, ${JSON.stringify(plan.goal)}::jsonb,
        ${JSON.stringify(plan.conditions)}::jsonb, ${plan.repeatCount}::int, "configurationVersion",
        nullif(estimate, 'null'::jsonb), lacking, "totalSeconds", "openShutterSeconds"
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as given("targetId" uuid, "configurationVersion" int,
        estimate jsonb, lacking text, "totalSeconds" float8, "openShutterSeconds" float8)`);
  }

  async updateEstimates(rows: readonly (EstimateColumns & { observationId: string })[]): Promise<void> {
    await this.database.current().execute(sql`
      update ${observations} set
        configuration_version = given."configurationVersion",
        estimate = nullif(given.estimate, 'null'::jsonb),
        lacking = given.lacking,
        total_seconds = given."totalSeconds",
        open_shutter_seconds = given."openShutterSeconds",
        updated_at = now(),
        version = ${observations}.version + 1
      from jsonb_to_recordset(${JSON.stringify(rows)}::jsonb) as given("observationId" uuid, "configurationVersion" int,
        estimate jsonb, lacking text, "totalSeconds" float8, "openShutterSeconds" float8)
      where ${observations}.id = given."observationId"`);
  }
}

function ofTargets(targetIds: readonly string[] | 'all'): SQL | undefined {
  if (targetIds === 'all') return undefined;
  return targetIds.length <= 1
    ? inArray(observations.targetId, [...targetIds])
    : anyOf(sql`${observations.targetId}`, targetIds);
}

/** One parameter for any number of ids; a list of placeholders ends at 65 535. */
function anyOf(column: SQL, ids: readonly string[]): SQL {
  return sql`${column} = any(array(select jsonb_array_elements_text(${JSON.stringify(ids)}::jsonb)::uuid))`;
}
