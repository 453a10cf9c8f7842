import type { Extent, Light } from '@faintward/contracts/light';
import type { CosmicTime, Target, TargetListQuery } from '@faintward/contracts/targets';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, ilike, inArray, or, type SQL, sql } from 'drizzle-orm';
import { observations } from '../../database/schema/observations.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';
import { inBatches } from '../../engine/slices.js';
import { containing, orderOf, pageWindow } from '../../platform/pagination.js';
import { toTarget } from './targets.mapper.js';

/** What computing needs to know of a target. */
export interface StoredTargetInputs {
  targetId: string;
  name: string;
  rightAscensionDeg: number;
  declinationDeg: number;
  redshift: number;
  light: Light | null;
  extent: Extent;
  version: number;
}

/** Whole targets that are read at once: together with what is computed of them some kilobytes each. */
const READ_BATCH_SIZE = 250;

export interface TargetPlace {
  targetId: string;
  name: string;
  rightAscensionDeg: number;
  declinationDeg: number;
  nearestDuplicateName: string | null;
}

/** Targets as screens, other subjects and submissions read them. */
@Injectable()
export class TargetsReadModel {
  constructor(private readonly database: DatabaseService) {}

  async listPage(proposalId: string, query: TargetListQuery): Promise<{ rows: Target[]; rowCount: number }> {
    const where = and(
      eq(targets.proposalId, proposalId),
      query.search === undefined
        ? undefined
        : or(ilike(targets.name, containing(query.search)), ilike(targets.notes, containing(query.search))),
      query.withNotices === undefined ? undefined : query.withNotices ? hasNotices : sql`not ${hasNotices}`,
    );
    const sums = this.sums(proposalId);
    const computedNumber = (name: string) => sql`(${targets.computed} ->> ${sql.raw(`'${name}'`)})::float8`;
    const order = orderOf(
      query,
      {
        position: targets.position,
        name: sql`lower(${targets.name})`,
        rightAscensionDeg: targets.rightAscensionDeg,
        declinationDeg: targets.declinationDeg,
        redshift: targets.redshift,
        apparentMagnitudeAb: computedNumber('apparentMagnitudeAb'),
        luminosityDistanceMpc: computedNumber('luminosityDistanceMpc'),
        ageGyr: computedNumber('ageGyr'),
        requestedSeconds: sums.requestedSeconds,
      },
      targets.id,
    );
    const { limit, offset } = pageWindow(query);
    const rows = await this.select(proposalId, where)
      .orderBy(...order)
      .limit(limit)
      .offset(offset);
    const [total] = await this.database
      .current()
      .select({ rowCount: sql<number>`count(*)::int` })
      .from(targets)
      .where(where);
    return { rows: rows.map(toTarget), rowCount: total?.rowCount ?? 0 };
  }

  async find(proposalId: string, targetId: string): Promise<Target | undefined> {
    const [row] = await this.select(proposalId, and(eq(targets.proposalId, proposalId), eq(targets.id, targetId)), [
      targetId,
    ]);
    return row === undefined ? undefined : toTarget(row);
  }

  async listAll(proposalId: string): Promise<Target[]> {
    const all: Target[] = [];
    await this.eachBatch(proposalId, READ_BATCH_SIZE, (batch) => {
      all.push(...batch);
    });
    return all;
  }

  /** All targets in the order of the list, so many at a time, with a turn for other requests in between. */
  async eachBatch(proposalId: string, size: number, work: (batch: Target[]) => void | Promise<void>): Promise<void> {
    const ids = await this.database
      .current()
      .select({ targetId: targets.id })
      .from(targets)
      .where(eq(targets.proposalId, proposalId))
      .orderBy(asc(targets.position), asc(targets.id));
    await inBatches(ids, size, async (batch) => {
      const wanted = batch.map(({ targetId }) => targetId);
      const isWanted = and(eq(targets.proposalId, proposalId), isOneOf(targets.id, wanted));
      const rows = await this.select(proposalId, isWanted, wanted).orderBy(asc(targets.position), asc(targets.id));
      await work(rows.map(toTarget));
    });
  }

  /** Inputs of some targets, or of all, in the order of the list; those that are not there are left out. */
  async listInputs(proposalId: string, targetIds: readonly string[] | 'all'): Promise<StoredTargetInputs[]> {
    return this.database
      .current()
      .select({
        targetId: targets.id,
        name: targets.name,
        rightAscensionDeg: targets.rightAscensionDeg,
        declinationDeg: targets.declinationDeg,
        redshift: targets.redshift,
        light: targets.light,
        extent: targets.extent,
        version: targets.version,
      })
      .from(targets)
      .where(and(eq(targets.proposalId, proposalId), targetIds === 'all' ? undefined : isOneOf(targets.id, targetIds)))
      .orderBy(asc(targets.position), asc(targets.id));
  }

  async listPlaces(proposalId: string): Promise<TargetPlace[]> {
    return this.database
      .current()
      .select({
        targetId: targets.id,
        name: targets.name,
        rightAscensionDeg: targets.rightAscensionDeg,
        declinationDeg: targets.declinationDeg,
        nearestDuplicateName: targets.nearestDuplicateName,
      })
      .from(targets)
      .where(eq(targets.proposalId, proposalId))
      .orderBy(asc(targets.position), asc(targets.id));
  }

  async count(proposalId: string): Promise<number> {
    const [row] = await this.database
      .current()
      .select({ targetCount: sql<number>`count(*)::int` })
      .from(targets)
      .where(eq(targets.proposalId, proposalId));
    return row?.targetCount ?? 0;
  }

  async cosmicTimePoints(proposalId: string): Promise<CosmicTime['points']> {
    const { sums, requestedSeconds } = this.sums(proposalId);
    const rows = await this.database
      .current()
      .select({
        targetId: targets.id,
        name: targets.name,
        redshift: targets.redshift,
        ageGyr: sql<number | null>`(${targets.computed} ->> 'ageGyr')::float8`,
        requestedSeconds,
      })
      .from(targets)
      .leftJoin(sums, eq(sums.targetId, targets.id))
      .where(eq(targets.proposalId, proposalId))
      .orderBy(asc(targets.position), asc(targets.id));
    return rows.flatMap(({ ageGyr, requestedSeconds: seconds, ...row }) =>
      ageGyr === null ? [] : [{ ...row, ageGyr, hours: seconds === null ? null : seconds / 3600 }],
    );
  }

  /** Targets that the checks before submission have something to say about: those with notices or without observation. */
  async listForChecks(proposalId: string) {
    return this.database
      .current()
      .select({
        targetId: targets.id,
        name: targets.name,
        notices: sql<
          { code: string; message: string; severity: string; field?: string }[]
        >`${targets.computed} -> 'notices'`,
        nearestDuplicateName: targets.nearestDuplicateName,
        // Tables are named by hand: of a single table's fields drizzle leaves the table away, and `id` would be the inner one.
        hasObservation: sql<boolean>`exists (select 1 from ${observations} where ${observations}.target_id = ${targets}.id)`,
      })
      .from(targets)
      .where(
        and(
          eq(targets.proposalId, proposalId),
          or(
            hasNotices,
            sql`not exists (select 1 from ${observations} where ${observations.targetId} = ${targets.id})`,
          ),
        ),
      )
      .orderBy(asc(targets.position), asc(targets.id));
  }

  /** Counts and sums of observations by target, as one grouped join instead of a query for each row. */
  private sums(proposalId: string, targetIds?: readonly string[]) {
    const sums = this.database
      .current()
      .select({
        targetId: observations.targetId,
        observationCount: sql<number>`count(*)::int`.as('observation_count'),
        requestedSeconds: sql<number | null>`sum(${observations.totalSeconds})::float8`.as('requested_seconds'),
      })
      .from(observations)
      .where(
        and(
          eq(observations.proposalId, proposalId),
          targetIds === undefined ? undefined : isOneOf(observations.targetId, targetIds),
        ),
      )
      .groupBy(observations.targetId)
      .as('sums');
    return { sums, requestedSeconds: sql<number | null>`${sums.requestedSeconds}` };
  }

  /** @param targetIds  those that `where` selects, if they are known: their observations alone are then summed */
  private select(proposalId: string, where: SQL | undefined, targetIds?: readonly string[]) {
    const { sums } = this.sums(proposalId, targetIds);
    return this.database
      .current()
      .select({
        target: targets,
        observationCount: sql<number>`coalesce(${sums.observationCount}, 0)`,
        requestedSeconds: sql<number | null>`${sums.requestedSeconds}`,
      })
      .from(targets)
      .leftJoin(sums, eq(sums.targetId, targets.id))
      .where(where)
      .$dynamic();
  }
}

const hasNotices = sql`(jsonb_array_length(${targets.computed} -> 'notices') > 0 or ${targets.nearestDuplicateName} is not null)`;

function isOneOf(column: typeof targets.id | typeof observations.targetId, targetIds: readonly string[]): SQL {
  // One parameter for any number of ids; a list of placeholders ends at 65 535.
  return targetIds.length <= 1
    ? inArray(column, [...targetIds])
    : sql`${column} = any(array(select jsonb_array_elements_text(${JSON.stringify(targetIds)}::jsonb)::uuid))`;
}
