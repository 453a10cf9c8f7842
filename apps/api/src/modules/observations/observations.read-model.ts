import type { Observation, ObservationListQuery, TimeRequest } from '@faintward/contracts/observations';
import type { MoonClass } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, ilike, inArray, or, type SQL, sql } from 'drizzle-orm';
import { instruments, modes, telescopes } from '../../database/schema/facilities.js';
import { observations } from '../../database/schema/observations.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';
import { inBatches } from '../../engine/slices.js';
import { containing, orderOf, pageWindow } from '../../platform/pagination.js';

/** Whole observations that are read at once: with the steps of its estimate each takes some kilobytes. */
const READ_BATCH_SIZE = 200;

/** Observations with what they are of, for screens, checks and submissions. */
@Injectable()
export class ObservationsReadModel {
  constructor(private readonly database: DatabaseService) {}

  async listPage(proposalId: string, query: ObservationListQuery): Promise<{ rows: Observation[]; rowCount: number }> {
    const where = and(
      eq(observations.proposalId, proposalId),
      query.targetId === undefined ? undefined : eq(observations.targetId, query.targetId),
      query.search === undefined
        ? undefined
        : or(
            ilike(targets.name, containing(query.search)),
            ilike(modes.name, containing(query.search)),
            ilike(instruments.name, containing(query.search)),
          ),
    );
    const order = orderOf(
      query,
      {
        position: targets.position,
        targetName: sql`lower(${targets.name})`,
        redshift: targets.redshift,
        modeName: modes.name,
        totalSeconds: observations.totalSeconds,
      },
      observations.id,
    );
    const rows = await this.select(where)
      .orderBy(...order)
      .limit(pageWindow(query).limit)
      .offset(pageWindow(query).offset);
    const [total] = await this.database
      .current()
      .select({ rowCount: sql<number>`count(*)::int` })
      .from(observations)
      .innerJoin(targets, eq(targets.id, observations.targetId))
      .innerJoin(modes, eq(modes.id, observations.modeId))
      .innerJoin(instruments, eq(instruments.id, modes.instrumentId))
      .where(where);
    return { rows: rows.map(toObservation), rowCount: total?.rowCount ?? 0 };
  }

  async find(proposalId: string, observationId: string): Promise<Observation | undefined> {
    const [row] = await this.select(and(eq(observations.proposalId, proposalId), eq(observations.id, observationId)));
    return row === undefined ? undefined : toObservation(row);
  }

  /** All of a proposal, in the order of its targets. */
  async listAll(proposalId: string): Promise<Observation[]> {
    const all: Observation[] = [];
    await this.eachBatch(proposalId, READ_BATCH_SIZE, (batch) => {
      all.push(...batch);
    });
    return all;
  }

  /** The same, so many at a time, with a turn for other requests in between. */
  async eachBatch(
    proposalId: string,
    size: number,
    work: (batch: Observation[]) => void | Promise<void>,
  ): Promise<void> {
    const order = [asc(targets.position), asc(telescopes.position), asc(modes.name), asc(observations.id)];
    const ids = await this.database
      .current()
      .select({ observationId: observations.id })
      .from(observations)
      .innerJoin(targets, eq(targets.id, observations.targetId))
      .innerJoin(modes, eq(modes.id, observations.modeId))
      .innerJoin(instruments, eq(instruments.id, modes.instrumentId))
      .innerJoin(telescopes, eq(telescopes.id, instruments.telescopeId))
      .where(eq(observations.proposalId, proposalId))
      .orderBy(...order);
    await inBatches(ids, size, async (batch) => {
      const wanted = batch.map(({ observationId }) => observationId);
      const rows = await this.select(
        and(eq(observations.proposalId, proposalId), inArray(observations.id, wanted)),
      ).orderBy(...order);
      await work(rows.map(toObservation));
    });
  }

  /** Observations that give no time, with the reason, for the checks; at most `limit` of each kind. */
  async listWithoutTime(proposalId: string, limit: number) {
    const select = (condition: SQL) =>
      this.database
        .current()
        .select({
          targetId: targets.id,
          targetName: targets.name,
          modeName: modes.name,
          lacking: observations.lacking,
          reason: sql<string | null>`${observations.estimate} -> 'reason' ->> 'message'`,
        })
        .from(observations)
        .innerJoin(targets, eq(targets.id, observations.targetId))
        .innerJoin(modes, eq(modes.id, observations.modeId))
        .where(and(eq(observations.proposalId, proposalId), condition))
        .orderBy(asc(targets.position), asc(observations.id))
        .limit(limit);
    return {
      infeasible: await select(sql`${observations.estimate} is not null and ${observations.totalSeconds} is null`),
      lacking: await select(sql`${observations.estimate} is null`),
    };
  }

  /** Modes that observations were estimated with an older configuration of than is in force. */
  async countOlderConfigurations(proposalId: string): Promise<number> {
    const [row] = await this.database
      .current()
      .select({ olderCount: sql<number>`count(*)::int` })
      .from(observations)
      .innerJoin(modes, eq(modes.id, observations.modeId))
      .where(
        and(
          eq(observations.proposalId, proposalId),
          sql`${observations.configurationVersion} <> ${modes.configurationVersion}`,
        ),
      );
    return row?.olderCount ?? 0;
  }

  /** The request in hours, summed by the database. */
  async timeRequest(proposalId: string): Promise<TimeRequest> {
    const rows = await this.database
      .current()
      .select({
        telescopeName: telescopes.name,
        instrumentName: instruments.name,
        moonClass: sql<MoonClass>`${observations.conditions} ->> 'moonClass'`,
        observationCount: sql<number>`count(*)::int`,
        openShutterSeconds: sql<number>`coalesce(sum(${observations.openShutterSeconds}), 0)::float8`,
        totalSeconds: sql<number>`coalesce(sum(${observations.totalSeconds}), 0)::float8`,
        infeasibleCount: sql<number>`(count(*) filter (where ${observations.estimate} is not null and ${observations.totalSeconds} is null))::int`,
        lackingCount: sql<number>`(count(*) filter (where ${observations.estimate} is null))::int`,
      })
      .from(observations)
      .innerJoin(modes, eq(modes.id, observations.modeId))
      .innerJoin(instruments, eq(instruments.id, modes.instrumentId))
      .innerJoin(telescopes, eq(telescopes.id, instruments.telescopeId))
      .where(eq(observations.proposalId, proposalId))
      .groupBy(telescopes.position, telescopes.name, instruments.position, instruments.name, sql`3`)
      .orderBy(asc(telescopes.position), asc(telescopes.name), asc(instruments.position), asc(instruments.name));
    const totals = { dark: 0, grey: 0, bright: 0 };
    for (const row of rows) totals[row.moonClass] += row.totalSeconds / 3600;
    const moonOrder: MoonClass[] = ['dark', 'grey', 'bright'];
    return {
      rows: rows
        .map(({ openShutterSeconds, totalSeconds, infeasibleCount: _i, lackingCount: _l, ...row }) => ({
          ...row,
          openShutterHours: openShutterSeconds / 3600,
          overheadHours: (totalSeconds - openShutterSeconds) / 3600,
          totalHours: totalSeconds / 3600,
        }))
        // Stable: telescopes and instruments keep the order the database gave them.
        .map((row, index) => ({ row, index }))
        .sort((a, b) =>
          a.row.telescopeName === b.row.telescopeName && a.row.instrumentName === b.row.instrumentName
            ? moonOrder.indexOf(a.row.moonClass) - moonOrder.indexOf(b.row.moonClass)
            : a.index - b.index,
        )
        .map(({ row }) => row),
      totals,
      totalHours: totals.dark + totals.grey + totals.bright,
      infeasibleCount: rows.reduce((sum, row) => sum + row.infeasibleCount, 0),
      lackingCount: rows.reduce((sum, row) => sum + row.lackingCount, 0),
    };
  }

  private select(where: SQL | undefined) {
    return this.database
      .current()
      .select({
        observation: observations,
        targetName: targets.name,
        redshift: targets.redshift,
        modeName: modes.name,
        instrumentName: instruments.name,
        telescopeName: telescopes.name,
      })
      .from(observations)
      .innerJoin(targets, eq(targets.id, observations.targetId))
      .innerJoin(modes, eq(modes.id, observations.modeId))
      .innerJoin(instruments, eq(instruments.id, modes.instrumentId))
      .innerJoin(telescopes, eq(telescopes.id, instruments.telescopeId))
      .where(where)
      .$dynamic();
  }
}

interface Row {
  observation: typeof observations.$inferSelect;
  targetName: string;
  redshift: number;
  modeName: string;
  instrumentName: string;
  telescopeName: string;
}

function toObservation({ observation, ...names }: Row): Observation {
  return {
    observationId: observation.id,
    targetId: observation.targetId,
    targetName: names.targetName,
    redshift: names.redshift,
    modeId: observation.modeId,
    modeName: names.modeName,
    instrumentName: names.instrumentName,
    telescopeName: names.telescopeName,
    configurationVersion: observation.configurationVersion,
    goal: observation.goal,
    conditions: observation.conditions,
    repeatCount: observation.repeatCount,
    estimate: observation.estimate,
    totalSeconds: observation.totalSeconds,
    lacking: observation.lacking,
    version: observation.version,
    updatedAt: observation.updatedAt.toISOString(),
  };
}
