import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type {
  ProposalChange,
  ProposalHistoryQuery,
  ProposalListQuery,
  ProposalState,
} from '@faintward/contracts/proposals';
import type { TeamAccess } from '@faintward/contracts/permissions';
import { Injectable } from '@nestjs/common';
import { aliasedTable, and, asc, desc, eq, gt, ilike, inArray, isNull, lte, or, type SQL, sql } from 'drizzle-orm';
import { awards } from '../../database/schema/awards.js';
import { sites } from '../../database/schema/facilities.js';
import { changes } from '../../database/schema/history.js';
import { panels } from '../../database/schema/panels.js';
import { partners, people } from '../../database/schema/people.js';
import { caseSections, proposalMembers, proposals } from '../../database/schema/proposals.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';
import { containing, orderOf, pageWindow } from '../../platform/pagination.js';
import { proposalLabel } from '../semesters/semesters.read-model.js';

export interface OwnProposal {
  proposalId: string;
  label: string;
  title: string;
  state: ProposalState;
  semesterId: string;
  semesterName: string;
  deadlineAt: Date;
  access: TeamAccess;
  isPrincipal: boolean;
  updatedAt: Date;
}

export interface ProposalDetails {
  title: string;
  abstract: string;
  keywords: string[];
  siteTimeZone: string;
  panelName: string | null;
  partnerId: string | null;
  partnerName: string | null;
  cosmology: CosmologyChoice;
  /** Told once the semester is decided. */
  award: { hours: number; moonClass: string; standing: string; reason: string } | null;
  updatedAt: Date;
}

/** Proposals shaped for screens. Whoever asks has decided that their reader may see them. */
@Injectable()
export class ProposalsReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** Proposals that a person is on the team of; by default those with the latest deadline first. */
  async listOfPerson(
    personId: string,
    query: ProposalListQuery,
    now: Date,
  ): Promise<{ rows: OwnProposal[]; rowCount: number }> {
    const label = sql<string>`${semesters.labelPrefix} || '-' || lpad(${proposals.number}::text, greatest(3, length(${proposals.number}::text)), '0')`;
    const where = and(
      eq(proposalMembers.personId, personId),
      isNull(proposals.deletedAt),
      query.semesterId === undefined ? undefined : eq(proposals.semesterId, query.semesterId),
      query.state === undefined ? undefined : inState(query.state, now),
      query.search === undefined
        ? undefined
        : or(ilike(proposals.title, containing(query.search)), ilike(label, containing(query.search))),
    );
    const order =
      query.sort === undefined
        ? [desc(semesters.deadlineAt), asc(proposals.number)]
        : orderOf(
            query,
            {
              label,
              title: sql`lower(${proposals.title})`,
              state: proposals.state,
              deadlineAt: semesters.deadlineAt,
              updatedAt: proposals.updatedAt,
            },
            proposals.id,
          );
    const { limit, offset } = pageWindow(query);
    const rows = await this.database
      .current()
      .select({
        proposalId: proposals.id,
        number: proposals.number,
        title: proposals.title,
        state: proposals.state,
        semesterId: proposals.semesterId,
        semesterName: semesters.name,
        labelPrefix: semesters.labelPrefix,
        deadlineAt: semesters.deadlineAt,
        access: proposalMembers.access,
        isPrincipal: proposalMembers.isPrincipal,
        updatedAt: proposals.updatedAt,
      })
      .from(proposals)
      .innerJoin(proposalMembers, eq(proposalMembers.proposalId, proposals.id))
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .where(where)
      .orderBy(...order)
      .limit(limit)
      .offset(offset);
    const [total] = await this.database
      .current()
      .select({ rowCount: sql<number>`count(*)::int` })
      .from(proposals)
      .innerJoin(proposalMembers, eq(proposalMembers.proposalId, proposals.id))
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .where(where);
    return {
      rows: rows.map(({ number, labelPrefix, ...row }) => ({ ...row, label: proposalLabel(labelPrefix, number) })),
      rowCount: total?.rowCount ?? 0,
    };
  }

  async getDetails(proposalId: string): Promise<ProposalDetails> {
    const [row] = await this.database
      .current()
      .select({
        title: proposals.title,
        abstract: proposals.abstract,
        keywords: proposals.keywords,
        siteTimeZone: sites.timeZone,
        panelName: panels.name,
        partnerId: proposals.partnerId,
        partnerName: partners.name,
        cosmology: proposals.cosmology,
        decidedAt: semesters.decidedAt,
        awardHours: awards.hours,
        awardMoonClass: awards.moonClass,
        awardStanding: awards.standing,
        awardReason: awards.reason,
        updatedAt: proposals.updatedAt,
      })
      .from(proposals)
      .innerJoin(semesters, eq(semesters.id, proposals.semesterId))
      .innerJoin(sites, eq(sites.id, semesters.siteId))
      .leftJoin(panels, eq(panels.id, proposals.panelId))
      .leftJoin(partners, eq(partners.id, proposals.partnerId))
      .leftJoin(awards, eq(awards.proposalId, proposals.id))
      .where(eq(proposals.id, proposalId));
    if (row === undefined) throw new Error('A proposal that was just found is gone.');
    const { decidedAt, awardHours, awardMoonClass, awardStanding, awardReason, ...rest } = row;
    const isTold = decidedAt !== null && decidedAt <= new Date();
    const award =
      isTold && awardHours !== null && awardMoonClass !== null && awardStanding !== null
        ? { hours: awardHours, moonClass: awardMoonClass, standing: awardStanding, reason: awardReason ?? '' }
        : null;
    return { ...rest, award };
  }

  async listPartners(): Promise<{ partnerId: string; name: string }[]> {
    return this.database
      .current()
      .select({ partnerId: partners.id, name: partners.name })
      .from(partners)
      .orderBy(asc(partners.name));
  }

  async listSections(proposalId: string) {
    return this.database
      .current()
      .select({
        sectionId: caseSections.sectionId,
        body: caseSections.body,
        version: caseSections.version,
        updatedAt: caseSections.updatedAt,
        updatedByName: nameOf(people),
      })
      .from(caseSections)
      .leftJoin(people, eq(people.id, caseSections.updatedBy))
      .where(eq(caseSections.proposalId, proposalId));
  }

  /** Changes of a proposal, the newest first unless the query says otherwise. */
  async listChanges(
    proposalId: string,
    query: ProposalHistoryQuery,
  ): Promise<{ rows: ProposalChange[]; rowCount: number }> {
    const where = and(
      eq(changes.scope, 'proposal'),
      eq(changes.scopeId, proposalId),
      query.subjectId === undefined ? undefined : eq(changes.subjectId, query.subjectId),
      query.search === undefined
        ? undefined
        : or(ilike(changes.subjectName, containing(query.search)), ilike(nameOf(people), containing(query.search))),
    );
    const order =
      query.sort === undefined
        ? [desc(changes.at), desc(changes.id)]
        : orderOf(query, { at: changes.at, subject: changes.subject, subjectName: changes.subjectName }, changes.id);
    const { limit, offset } = pageWindow(query);
    const rows = await this.database
      .current()
      .select({
        changeId: changes.id,
        at: changes.at,
        personName: nameOf(people),
        subject: changes.subject,
        subjectName: changes.subjectName,
        action: changes.action,
        details: changes.details,
      })
      .from(changes)
      .leftJoin(people, eq(people.id, changes.personId))
      .where(where)
      .orderBy(...order)
      .limit(limit)
      .offset(offset);
    const [total] = await this.database
      .current()
      .select({ rowCount: sql<number>`count(*)::int` })
      .from(changes)
      .leftJoin(people, eq(people.id, changes.personId))
      .where(where);
    return {
      rows: rows.map(({ at, action, details, ...row }) => ({
        ...row,
        at: at.toISOString(),
        action: action as ProposalChange['action'],
        changes: Object.entries(details).map(([field, { before, after }]) => ({ field, before, after })),
      })),
      rowCount: total?.rowCount ?? 0,
    };
  }

  /** The newest change of each of several proposals. */
  async latestChanges(proposalIds: readonly string[]) {
    if (proposalIds.length === 0) return new Map<string, never>();
    const author = aliasedTable(people, 'author');
    const rows = await this.database
      .current()
      .selectDistinctOn([changes.scopeId], {
        proposalId: changes.scopeId,
        at: changes.at,
        personName: nameOf(author),
        subject: changes.subject,
        subjectName: changes.subjectName,
        action: changes.action,
      })
      .from(changes)
      .leftJoin(author, eq(author.id, changes.personId))
      .where(and(eq(changes.scope, 'proposal'), inArray(changes.scopeId, [...proposalIds])))
      .orderBy(changes.scopeId, desc(changes.at));
    return new Map(rows.map((row) => [row.proposalId, row]));
  }
}

/** Null where a left join found nobody. */
function nameOf(table: typeof people) {
  return sql<string | null>`${table.givenName} || ' ' || ${table.familyName}`;
}

/** Submitted becomes in review at the deadline, without anybody storing it. */
function inState(state: ProposalState, now: Date): SQL | undefined {
  switch (state) {
    case 'submitted':
      return and(eq(proposals.state, 'submitted'), gt(semesters.deadlineAt, now));
    case 'inReview':
      return or(eq(proposals.state, 'inReview'), and(eq(proposals.state, 'submitted'), lte(semesters.deadlineAt, now)));
    case 'draft':
    case 'awarded':
    case 'declined':
    case 'withdrawn':
      return eq(proposals.state, state);
  }
}
