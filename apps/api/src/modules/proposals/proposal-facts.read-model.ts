import type { CaseSectionId } from '@faintward/contracts/proposals';
import type { HoursByMoonClass, MoonClass } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { and, eq, inArray, sql } from 'drizzle-orm';
import { observations } from '../../database/schema/observations.js';
import { people } from '../../database/schema/people.js';
import { caseSections, proposalMembers } from '../../database/schema/proposals.js';
import { targets } from '../../database/schema/targets.js';
import { DatabaseService } from '../../database/transaction.js';
import { CASE_SECTIONS, countWords } from './case-sections.js';

export { CASE_SECTIONS };

/** Counts from which the state of a proposal's sections is told. */
export interface ProposalFacts {
  targetCount: number;
  withoutBrightnessCount: number;
  withoutObservationCount: number;
  duplicateCount: number;
  observationCount: number;
  /** Observations with an estimate that says it cannot be done. */
  infeasibleCount: number;
  /** Observations without an estimate. */
  lackingCount: number;
  requestedHours: HoursByMoonClass;
  memberCount: number;
  unsignedCount: number;
  principalName: string;
  wordCounts: Record<CaseSectionId, number>;
}

/** Reads the facts of many proposals with a handful of queries. */
@Injectable()
export class ProposalFactsReadModel {
  constructor(private readonly database: DatabaseService) {}

  async get(proposalId: string): Promise<ProposalFacts> {
    const facts = (await this.list([proposalId])).get(proposalId);
    if (facts === undefined) throw new Error('A proposal that was asked for has no facts.');
    return facts;
  }

  async list(proposalIds: readonly string[]): Promise<Map<string, ProposalFacts>> {
    const ids = [...proposalIds];
    const facts = new Map(ids.map((proposalId) => [proposalId, noFacts()]));
    if (ids.length === 0) return facts;
    const db = this.database.current();
    const targetRows = await db
      .select({
        proposalId: targets.proposalId,
        targetCount: sql<number>`count(*)::int`,
        withoutBrightnessCount: sql<number>`(count(*) filter (where ${targets.light} is null))::int`,
        duplicateCount: sql<number>`count(${targets.nearestDuplicateName})::int`,
        // Tables are named by hand: of a single table's fields drizzle leaves the table away, and `id` would be the inner one.
        withoutObservationCount: sql<number>`(count(*) filter (where not exists (
          select 1 from ${observations} where ${observations}.target_id = ${targets}.id)))::int`,
      })
      .from(targets)
      .where(inArray(targets.proposalId, ids))
      .groupBy(targets.proposalId);
    for (const { proposalId, ...counts } of targetRows) Object.assign(facts.get(proposalId) ?? {}, counts);
    const observationRows = await db
      .select({
        proposalId: observations.proposalId,
        moonClass: sql<MoonClass>`${observations.conditions} ->> 'moonClass'`,
        observationCount: sql<number>`count(*)::int`,
        infeasibleCount: sql<number>`(count(*) filter (where ${observations.estimate} is not null and ${observations.totalSeconds} is null))::int`,
        lackingCount: sql<number>`(count(*) filter (where ${observations.estimate} is null))::int`,
        totalSeconds: sql<number>`coalesce(sum(${observations.totalSeconds}), 0)::float8`,
      })
      .from(observations)
      .where(inArray(observations.proposalId, ids))
      .groupBy(observations.proposalId, sql`2`);
    for (const row of observationRows) {
      const of = facts.get(row.proposalId);
      if (of === undefined) continue;
      of.observationCount += row.observationCount;
      of.infeasibleCount += row.infeasibleCount;
      of.lackingCount += row.lackingCount;
      of.requestedHours[row.moonClass] += row.totalSeconds / 3600;
    }
    const memberRows = await db
      .select({
        proposalId: proposalMembers.proposalId,
        isPrincipal: proposalMembers.isPrincipal,
        signedAt: proposalMembers.signedAt,
        name: sql<string>`${people.givenName} || ' ' || ${people.familyName}`,
      })
      .from(proposalMembers)
      .innerJoin(people, eq(people.id, proposalMembers.personId))
      .where(inArray(proposalMembers.proposalId, ids));
    for (const row of memberRows) {
      const of = facts.get(row.proposalId);
      if (of === undefined) continue;
      of.memberCount += 1;
      // The principal investigator's signature is the submission itself.
      if (row.isPrincipal) of.principalName = row.name;
      else if (row.signedAt === null) of.unsignedCount += 1;
    }
    const sectionRows = await db
      .select({ proposalId: caseSections.proposalId, sectionId: caseSections.sectionId, body: caseSections.body })
      .from(caseSections)
      .where(and(inArray(caseSections.proposalId, ids)));
    for (const row of sectionRows) {
      const of = facts.get(row.proposalId);
      if (of !== undefined) of.wordCounts[row.sectionId] = countWords(row.body);
    }
    return facts;
  }
}

function noFacts(): ProposalFacts {
  return {
    targetCount: 0,
    withoutBrightnessCount: 0,
    withoutObservationCount: 0,
    duplicateCount: 0,
    observationCount: 0,
    infeasibleCount: 0,
    lackingCount: 0,
    requestedHours: { dark: 0, grey: 0, bright: 0 },
    memberCount: 0,
    unsignedCount: 0,
    principalName: '',
    wordCounts: Object.fromEntries(CASE_SECTIONS.map(({ sectionId }) => [sectionId, 0])) as Record<
      CaseSectionId,
      number
    >,
  };
}
