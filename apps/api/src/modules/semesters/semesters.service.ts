import type { FieldError } from '@faintward/contracts/errors';
import type { OpenCalls, Semester, SemesterInput, SemesterPatch } from '@faintward/contracts/semesters';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { onConstraint } from '../../platform/database-errors.js';
import { DomainError, invalidField, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { validationFailed } from '../../platform/validation.js';
import { FacilitiesReadModel } from '../facilities/facilities.read-model.js';
import { ReviewsReadModel } from '../reviews/reviews.read-model.js';
import { faultsOf, labelPrefixes } from './semester-rules.js';
import { toSemester } from './semesters.mapper.js';
import { SemestersQueries } from './semesters.queries.js';
import { isPastDeadline, type SemesterDetails, SemestersReadModel } from './semesters.read-model.js';

@Injectable()
export class SemestersService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: SemestersQueries,
    private readonly readModel: SemestersReadModel,
    private readonly facilities: FacilitiesReadModel,
    private readonly reviews: ReviewsReadModel,
    private readonly history: HistoryService,
  ) {}

  /** Calls that are open or announced, the soonest deadline first. */
  async listCalls(): Promise<OpenCalls> {
    const now = new Date();
    const calls = await this.readModel.listCalls(now);
    const [site] = await this.facilities.listSites();
    return {
      observatoryName: site?.observatoryName ?? '',
      siteTimeZone: site?.timeZone ?? 'UTC',
      now: now.toISOString(),
      calls: calls.map(toSemester),
    };
  }

  async list(): Promise<{ rows: Semester[] }> {
    return { rows: (await this.readModel.list()).map(toSemester) };
  }

  async get(semesterId: string): Promise<Semester> {
    return toSemester(await this.readModel.get(semesterId));
  }

  async create(actor: Actor, input: SemesterInput): Promise<Semester> {
    return this.database.transaction(async () => {
      const site = await this.siteOf(input);
      rejectFaults(faultsOf(input, site.timeZone));
      const prefixes = labelPrefixes(input.startsOn);
      const taken = await this.queries.listTakenPrefixes(prefixes);
      const prefix = prefixes.find((candidate) => !taken.includes(candidate));
      if (prefix === undefined) {
        throw invalidField('startsOn', 'Too many semesters begin in this half-year to label their proposals apart.');
      }
      const semesterId = await onConstraint({ semesters_name_unique: nameTaken }, () =>
        this.queries.insert(site.siteId, prefix, input),
      );
      await this.history.record({
        personId: actor.personId,
        scope: 'semester',
        scopeId: semesterId,
        subject: 'semester',
        subjectId: semesterId,
        subjectName: input.name,
        action: 'created',
      });
      return this.get(semesterId);
    });
  }

  async update(actor: Actor, semesterId: string, version: number, patch: SemesterPatch): Promise<Semester> {
    return this.database.transaction(async () => {
      const stored = await this.readModel.get(semesterId);
      if (stored.version !== version) throw staleVersion(toSemester(stored));
      const before = toInput(stored);
      const after: SemesterInput = { ...before, ...given(patch) };
      const changes = differences(before, after);
      if (Object.keys(changes).length === 0) return toSemester(stored);
      const site = await this.siteOf(after);
      if (site.siteId !== stored.siteId) {
        throw invalidField('telescopes', 'A semester shares out the telescopes of one site, and stays at its site.');
      }
      rejectFaults(faultsOf(after, site.timeZone));
      await this.rejectLateChanges(stored, changes);
      const isStored = await onConstraint({ semesters_name_unique: nameTaken }, () =>
        this.queries.update(semesterId, version, after),
      );
      if (!isStored) throw staleVersion(await this.get(semesterId));
      await this.history.record({
        personId: actor.personId,
        scope: 'semester',
        scopeId: semesterId,
        subject: 'semester',
        subjectId: semesterId,
        subjectName: after.name,
        action: 'changed',
        details: changes,
      });
      return this.get(semesterId);
    });
  }

  /** Called when the last panel is final: from this moment on awards and scores are told. */
  async markDecided(semesterId: string): Promise<void> {
    await this.queries.setDecided(semesterId, new Date());
  }

  /** Rules that people have relied on cannot be changed behind them. */
  private async rejectLateChanges(stored: SemesterDetails, changes: Record<string, unknown>): Promise<void> {
    const now = new Date();
    if ('criteria' in changes && (await this.reviews.haveBegunInSemester(stored.semesterId))) {
      throw new DomainError(
        'wrong-state',
        'Reviews of this semester have begun: its criteria, their weights and their anchors are fixed.',
        { fieldErrors: [{ path: 'criteria', message: 'Fixed since reviews have begun.' }] },
      );
    }
    if ('isAnonymised' in changes) {
      const isLifted = stored.isAnonymised && now >= stored.callOpensAt;
      if (isLifted || now >= stored.deadlineAt) {
        throw new DomainError(
          'wrong-state',
          isLifted
            ? 'The call promised that names stay hidden from reviewers; that cannot be taken back once it is open.'
            : 'The deadline has passed: whether names are hidden from reviewers is fixed.',
          { fieldErrors: [{ path: 'isAnonymised', message: 'Fixed by now.' }] },
        );
      }
    }
    // A review is of what was submitted last: moved, the deadline would let it become a review of something else.
    if (
      'deadlineAt' in changes &&
      isPastDeadline(stored.deadlineAt, now) &&
      (await this.reviews.haveBegunInSemester(stored.semesterId))
    ) {
      throw new DomainError(
        'wrong-state',
        'Reviews of this semester have begun: its deadline cannot be moved any more.',
        {
          fieldErrors: [{ path: 'deadlineAt', message: 'Fixed since reviews have begun.' }],
        },
      );
    }
    if (stored.decidedAt !== null && ('callOpensAt' in changes || 'deadlineAt' in changes)) {
      throw new DomainError('wrong-state', 'This semester is decided: its call cannot be opened or moved any more.');
    }
  }

  /** The site of the telescopes shared out; every telescope must exist and stand there. */
  private async siteOf(input: SemesterInput): Promise<{ siteId: string; timeZone: string }> {
    const known = new Map(
      (await this.facilities.listTelescopeNames(input.telescopes.map(({ telescopeId }) => telescopeId))).map((row) => [
        row.telescopeId,
        row,
      ]),
    );
    rejectFaults(
      input.telescopes.flatMap(({ telescopeId }, index) =>
        known.has(telescopeId)
          ? []
          : [{ path: `telescopes.${index}.telescopeId`, message: 'There is no such telescope.' }],
      ),
    );
    const siteIds = new Set([...known.values()].map(({ siteId }) => siteId));
    if (siteIds.size > 1) throw invalidField('telescopes', 'A semester shares out the telescopes of one site.');
    const [siteId] = siteIds;
    const site = siteId === undefined ? (await this.facilities.listSites())[0] : await this.facilities.findSite(siteId);
    if (site === undefined) throw invalidField('telescopes', 'Set up the observatory’s site and telescopes first.');
    return site;
  }
}

function nameTaken(): DomainError {
  return new DomainError('already-exists', 'Another semester has this name.', {
    fieldErrors: [{ path: 'name', message: 'Another semester has this name.' }],
  });
}

function rejectFaults(faults: readonly FieldError[]): void {
  if (faults.length > 0) throw validationFailed(faults);
}

function toInput(semester: SemesterDetails): SemesterInput {
  return {
    name: semester.name,
    startsOn: semester.startsOn,
    endsOn: semester.endsOn,
    callOpensAt: semester.callOpensAt.toISOString(),
    deadlineAt: semester.deadlineAt.toISOString(),
    reviewsDueAt: semester.reviewsDueAt?.toISOString() ?? null,
    isAnonymised: semester.isAnonymised,
    callText: semester.callText,
    criteria: semester.criteria,
    telescopes: semester.telescopes.map(({ telescopeId, availableHours }) => ({ telescopeId, availableHours })),
  };
}

/** The fields a patch sets, instants in the one form they are compared in. */
function given(patch: SemesterPatch): Partial<SemesterInput> {
  const { callOpensAt, deadlineAt, reviewsDueAt, ...rest } = patch;
  return {
    ...(Object.fromEntries(Object.entries(rest).filter(([, value]) => value !== undefined)) as Partial<SemesterInput>),
    ...(callOpensAt === undefined ? {} : { callOpensAt: new Date(callOpensAt).toISOString() }),
    ...(deadlineAt === undefined ? {} : { deadlineAt: new Date(deadlineAt).toISOString() }),
    ...(reviewsDueAt === undefined
      ? {}
      : { reviewsDueAt: reviewsDueAt === null ? null : new Date(reviewsDueAt).toISOString() }),
  };
}
