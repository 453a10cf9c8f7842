import type { Criterion, HoursByMoonClass, SemesterStage } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { asc, desc, eq, gt, inArray, type SQL } from 'drizzle-orm';
import { sites, telescopes } from '../../database/schema/facilities.js';
import { semesterHours, semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';
import { notFound } from '../../platform/domain-error.js';
import { stageOf } from './semester-stage.js';

/** Label of a proposal, of its semester's prefix and its running number there: "2710-014". */
export function proposalLabel(semesterPrefix: string, number: number): string {
  return `${semesterPrefix}-${String(number).padStart(3, '0')}`;
}

/**
 * How long after the deadline a change is still taken, by the server's clock: a request that was sent in time may arrive
 * late.
 */
export const DEADLINE_GRACE_SECONDS = 30;

/** Whether nothing can be changed or submitted any more. */
export function isPastDeadline(deadlineAt: Date, now: Date): boolean {
  return now.getTime() > deadlineAt.getTime() + DEADLINE_GRACE_SECONDS * 1000;
}

export interface SemesterDetails {
  semesterId: string;
  name: string;
  /** First part of the labels of its proposals. */
  labelPrefix: string;
  startsOn: string;
  endsOn: string;
  callOpensAt: Date;
  deadlineAt: Date;
  reviewsDueAt: Date | null;
  decidedAt: Date | null;
  /** As of the moment it was read. */
  stage: SemesterStage;
  isAnonymised: boolean;
  callText: string;
  criteria: Criterion[];
  siteId: string;
  siteTimeZone: string;
  observatoryName: string;
  latitudeDeg: number;
  longitudeDegEast: number;
  elevationM: number;
  telescopes: { telescopeId: string; telescopeName: string; availableHours: HoursByMoonClass }[];
  version: number;
}

/** What other subjects and the screens read of semesters. Nothing in it is secret. */
@Injectable()
export class SemestersReadModel {
  constructor(private readonly database: DatabaseService) {}

  async find(semesterId: string): Promise<SemesterDetails | undefined> {
    const [semester] = await this.select(eq(semesters.id, semesterId));
    return semester;
  }

  /** @throws {DomainError} `not-found` */
  async get(semesterId: string): Promise<SemesterDetails> {
    const semester = await this.find(semesterId);
    if (semester === undefined) throw notFound('semester');
    return semester;
  }

  /** Many at once; those that do not exist are left out. */
  async listByIds(semesterIds: readonly string[]): Promise<SemesterDetails[]> {
    return semesterIds.length === 0 ? [] : this.select(inArray(semesters.id, [...semesterIds]));
  }

  /** All semesters, the newest first. */
  async list(): Promise<SemesterDetails[]> {
    return this.select(undefined);
  }

  /** Those whose deadline is still to come, the soonest first. */
  async listCalls(now: Date): Promise<SemesterDetails[]> {
    const calls = await this.select(gt(semesters.deadlineAt, now));
    return calls.sort(
      (a, b) => a.deadlineAt.getTime() - b.deadlineAt.getTime() || a.startsOn.localeCompare(b.startsOn),
    );
  }

  private async select(condition: SQL | undefined): Promise<SemesterDetails[]> {
    const now = new Date();
    const rows = await this.database
      .current()
      .select({ semester: semesters, site: sites })
      .from(semesters)
      .innerJoin(sites, eq(sites.id, semesters.siteId))
      .where(condition)
      .orderBy(desc(semesters.startsOn), asc(semesters.name));
    if (rows.length === 0) return [];
    const hours = await this.database
      .current()
      .select({ hours: semesterHours, telescopeName: telescopes.name })
      .from(semesterHours)
      .innerJoin(telescopes, eq(telescopes.id, semesterHours.telescopeId))
      .where(
        inArray(
          semesterHours.semesterId,
          rows.map(({ semester }) => semester.id),
        ),
      )
      .orderBy(asc(telescopes.position), asc(telescopes.name));
    return rows.map(({ semester, site }) => ({
      semesterId: semester.id,
      name: semester.name,
      labelPrefix: semester.labelPrefix,
      startsOn: semester.startsOn,
      endsOn: semester.endsOn,
      callOpensAt: semester.callOpensAt,
      deadlineAt: semester.deadlineAt,
      reviewsDueAt: semester.reviewsDueAt,
      decidedAt: semester.decidedAt,
      stage: stageOf(semester, site.timeZone, now),
      isAnonymised: semester.isAnonymised,
      callText: semester.callText,
      criteria: semester.criteria,
      siteId: site.id,
      siteTimeZone: site.timeZone,
      observatoryName: site.observatoryName,
      latitudeDeg: site.latitudeDeg,
      longitudeDegEast: site.longitudeDegEast,
      elevationM: site.elevationM,
      telescopes: hours
        .filter((row) => row.hours.semesterId === semester.id)
        .map((row) => ({
          telescopeId: row.hours.telescopeId,
          telescopeName: row.telescopeName,
          availableHours: { dark: row.hours.darkHours, grey: row.hours.greyHours, bright: row.hours.brightHours },
        })),
      version: semester.version,
    }));
  }
}
