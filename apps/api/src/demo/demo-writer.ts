import type { HoursByMoonClass, MoonClass } from '@faintward/contracts';
import type { INestApplicationContext } from '@nestjs/common';
import { sql } from 'drizzle-orm';
import type { PgInsertValue, PgTable } from 'drizzle-orm/pg-core';
import { assignments, conflicts } from '../database/schema/assignments.js';
import { awards } from '../database/schema/awards.js';
import { instruments, modeConfigurations, modes, sites, telescopes } from '../database/schema/facilities.js';
import { changes } from '../database/schema/history.js';
import { observations } from '../database/schema/observations.js';
import { panelMembers, panels } from '../database/schema/panels.js';
import { institutions, partners, people } from '../database/schema/people.js';
import { caseSections, proposalMembers, proposals } from '../database/schema/proposals.js';
import { reviews } from '../database/schema/reviews.js';
import { semesterHours, semesters } from '../database/schema/semesters.js';
import { spectra } from '../database/schema/spectra.js';
import { submissions } from '../database/schema/submissions.js';
import { targets } from '../database/schema/targets.js';
import { DatabaseService } from '../database/transaction.js';
import { chooseProposalCosmology } from '../engine/cosmologies.js';
import type { UploadedSpectra } from '../engine/light.js';
import { ProposalSpectra } from '../engine/proposal-spectra.service.js';
import { ProposalSkies } from '../engine/proposal-sky.service.js';
import { computeTargetColumns, type SkyOfSemester } from '../engine/target-columns.js';
import { FacilitiesReadModel } from '../modules/facilities/facilities.read-model.js';
import { ObservationEstimates } from '../modules/observations/observation-estimates.service.js';
import { ConflictsQueries } from '../modules/panels/conflicts.queries.js';
import { readSpectrumText } from '../modules/spectra/spectrum-text.js';
import { fingerprintOfParts, SubmissionRows } from '../modules/submissions/submission-rows.service.js';
import { SubmissionsService } from '../modules/submissions/submissions.service.js';
import { TargetRecomputation } from '../modules/targets/target-recomputation.service.js';
import { daysFrom } from './calendar.js';
import { assignReviewers, type Progress, writeReviews } from './committee.js';
import type { DemoData } from './demo-data.js';
import { demoId } from './identifiers.js';
import { type Contender, decide, type Decision } from './opinions.js';
import { changesOf } from './past-changes.js';
import { randomStream } from './random.js';
import type { PanelRow, ProposalRow, Scenario, SemesterRow } from './scenario.js';
import { demoSpectrumId } from './target-light.js';

/** Rows in one statement: large enough to be quick, small enough for one message to the embedded database. */
const ROWS_PER_STATEMENT = 200;

/** How far named reviewers have come in the semester under review; others are somewhere past half-way. */
const NAMED_PROGRESS: Readonly<Record<string, number>> = { farida: 1, benoit: 0.5, haruka: 0.7 };

/** Writes a scenario into an empty database; call the steps in their order, inside one transaction. */
export class DemoWriter {
  private readonly requestedHours = new Map<string, HoursByMoonClass>();

  constructor(
    private readonly app: INestApplicationContext,
    private readonly data: DemoData,
    private readonly scenario: Scenario,
    private readonly now: Date,
  ) {}

  private get db() {
    return this.app.get(DatabaseService, { strict: false }).current();
  }

  async writeObservatory(passwordHash: string): Promise<void> {
    const { scenario } = this;
    await this.insert(sites, [scenario.site]);
    await this.insert(partners, scenario.partners);
    await this.insert(institutions, scenario.institutions);
    await this.insert(
      people,
      scenario.people.map((person) => ({ ...person, passwordHash, updatedAt: person.createdAt })),
    );
    await this.insert(telescopes, scenario.telescopes);
    await this.insert(instruments, scenario.instruments);
    await this.insert(modes, scenario.modes);
    await this.insert(modeConfigurations, scenario.modeConfigurations);
    await this.insert(
      semesters,
      scenario.semesters.map((semester) => ({ ...semester, updatedAt: semester.createdAt })),
    );
    await this.insert(
      semesterHours,
      scenario.semesterHours.map(({ semesterId, telescopeId, dark, grey, bright }) => ({
        semesterId,
        telescopeId,
        darkHours: dark,
        greyHours: grey,
        brightHours: bright,
      })),
    );
    await this.insert(panels, scenario.panels);
    await this.insert(panelMembers, scenario.panelMembers);
  }

  async writeProposals(): Promise<void> {
    const { scenario } = this;
    await this.insert(proposals, scenario.proposals);
    await this.insert(
      proposalMembers,
      scenario.proposals.flatMap(({ id, members }) => members.map((member) => ({ ...member, proposalId: id }))),
    );
    await this.insert(
      caseSections,
      scenario.proposals.flatMap((proposal) =>
        proposal.case.map((section) => ({
          ...section,
          proposalId: proposal.id,
          updatedAt: proposal.updatedAt,
          updatedBy: principalOf(proposal),
        })),
      ),
    );
    for (const semester of scenario.semesters) {
      const sky = await this.app.get(ProposalSkies, { strict: false }).ofSemester(semester.id);
      for (const proposal of scenario.proposals.filter(({ semesterId }) => semesterId === semester.id)) {
        await this.writeSpectra(proposal);
        await this.writeTargets(proposal, sky);
        await this.writeObservations(proposal);
        if (proposal.submittedAt !== null) await this.writeSubmission(proposal, proposal.submittedAt);
      }
    }
    await this.insert(changes, changesOf(scenario, this.now));
  }

  /** Read as they would be if the team uploaded them. */
  private async writeSpectra(proposal: ProposalRow): Promise<void> {
    const createdBy = principalOf(proposal);
    if (createdBy === null) throw new RangeError(`Proposal ${proposal.key} has no principal investigator.`);
    const reading = proposal.spectra.map(async ({ key, name, source, text, observedAtRedshift }) => {
      const { wavelengthsNm, fluxPerNm, contentHash, notices } = await readSpectrumText({
        text,
        wavelengthUnit: null,
        fluxKind: 'perWavelength',
        isAirWavelength: false,
        observedAtRedshift,
      });
      return {
        id: demoSpectrumId(proposal.key, key),
        proposalId: proposal.id,
        name,
        source,
        wavelengthsNm,
        fluxPerNm,
        pointCount: wavelengthsNm.length,
        restLowNm: wavelengthsNm[0] ?? 0,
        restHighNm: wavelengthsNm.at(-1) ?? 0,
        observedAtRedshift,
        contentHash,
        notices,
        createdBy,
        createdAt: daysFrom(proposal.createdAt, 0.05),
      };
    });
    await this.insert(spectra, await Promise.all(reading));
  }

  private uploadedOf(proposal: ProposalRow): Promise<UploadedSpectra> {
    return this.app.get(ProposalSpectra, { strict: false }).ofLights(
      proposal.id,
      proposal.targets.map(({ light }) => light),
    );
  }

  private async writeTargets(proposal: ProposalRow, sky: SkyOfSemester): Promise<void> {
    const columns = await computeTargetColumns(
      proposal.targets,
      chooseProposalCosmology(proposal.cosmology),
      sky,
      await this.uploadedOf(proposal),
    );
    await this.insert(
      targets,
      proposal.targets.flatMap(({ targetId, proposalKey: _key, groupIndex: _group, position, ...input }, index) => {
        const computed = columns[index];
        if (computed === undefined) return [];
        const createdAt = daysFrom(proposal.createdAt, 0.1);
        const { updatedAt } = proposal;
        return [
          { ...input, id: targetId, proposalId: proposal.id, position: position + 1, computed, createdAt, updatedAt },
        ];
      }),
    );
    await this.app.get(TargetRecomputation, { strict: false }).refreshDuplicates(proposal.id);
  }

  /** Estimated with the configurations that were in force when the proposal was submitted, or are now. */
  private async writeObservations(proposal: ProposalRow): Promise<void> {
    const facilities = this.app.get(FacilitiesReadModel, { strict: false });
    const estimates = this.app.get(ObservationEstimates, { strict: false });
    const byId = new Map(proposal.targets.map((target) => [target.targetId, target]));
    const uploaded = await this.uploadedOf(proposal);
    const columnsByPlan = new Map<string, ReturnType<ObservationEstimates['columnsFor']>>();
    const rows: PgInsertValue<typeof observations>[] = [];
    for (const observation of proposal.observations) {
      const { modeId, goal, conditions, repeatCount, targetId } = observation;
      const target = byId.get(targetId);
      if (target === undefined) throw new RangeError(`Observation ${observation.id} has no target.`);
      const key = JSON.stringify([modeId, goal, conditions, repeatCount]);
      let columnsOf = columnsByPlan.get(key);
      if (columnsOf === undefined) {
        const mode = await facilities.findMode(modeId, this.versionInForce(modeId, proposal.submittedAt ?? this.now));
        if (mode === undefined) throw new RangeError(`There is no mode ${modeId}.`);
        columnsOf = estimates.columnsFor(mode, proposal.cosmology, { goal, conditions, repeatCount }, uploaded);
        columnsByPlan.set(key, columnsOf);
      }
      rows.push({
        ...observation,
        ...columnsOf(target),
        proposalId: proposal.id,
        createdAt: daysFrom(proposal.createdAt, 0.2),
        updatedAt: proposal.updatedAt,
      });
    }
    await this.insert(observations, rows);
  }

  private versionInForce(modeId: string, at: Date): number {
    const versions = this.scenario.modeConfigurations.filter((configuration) => configuration.modeId === modeId);
    const past = versions.filter(({ createdAt }) => createdAt <= at);
    return Math.max(1, ...past.map(({ version }) => version));
  }

  /** Conflicts, assignments and reviews of the semesters that have a deadline behind them, and the awards of the decided one. */
  async writeCommittees(): Promise<void> {
    await this.writeConflicts();
    const pairs = await this.conflictPairs();
    for (const semester of this.scenario.semesters.filter(({ deadlineAt }) => deadlineAt < this.now)) {
      const scores = new Map<string, number[]>();
      for (const panel of this.scenario.panels.filter(({ semesterId }) => semesterId === semester.id)) {
        const before = this.scenario.proposals.filter(
          ({ panelId, fate }) => panelId === panel.id && fate === 'submitted',
        );
        const assigned = assignReviewers(
          panel,
          semester,
          before,
          this.scenario.panelMembers.filter(({ panelId }) => panelId === panel.id).map(({ personId }) => personId),
          (proposalId, personId) => pairs.has(`${proposalId} ${personId}`),
        );
        await this.insert(assignments, assigned);
        const written = writeReviews(
          assigned,
          before,
          semester.criteria,
          this.data.comments,
          this.progressIn(semester),
          semester.decidedAt ?? this.now,
        );
        await this.insert(reviews, written);
        for (const { proposalId, overallScore, isComplete } of written) {
          if (isComplete && overallScore !== null) {
            scores.set(proposalId, [...(scores.get(proposalId) ?? []), overallScore]);
          }
        }
      }
      if (semester.decidedAt !== null) await this.writeAwards(semester, semester.decidedAt, scores);
    }
    await this.declareConflict();
  }

  private async writeConflicts(): Promise<void> {
    await this.app.get(ConflictsQueries, { strict: false }).insertFound(sql`${proposals.state} <> 'draft'`);
    // Found when they were submitted, long before this database was made.
    await this.db.execute(sql`
      update ${conflicts} set created_at = submitted.at
      from (select proposal_id, max(submitted_at) as at from submissions group by proposal_id) as submitted
      where submitted.proposal_id = ${conflicts.proposalId}`);
  }

  private async conflictPairs(): Promise<Set<string>> {
    const rows = await this.db
      .select({ proposalId: conflicts.proposalId, personId: conflicts.personId })
      .from(conflicts);
    return new Set(rows.map(({ proposalId, personId }) => `${proposalId} ${personId}`));
  }

  private progressIn(semester: SemesterRow): Progress {
    if (semester.decidedAt !== null) return () => 1;
    const keys = new Map(this.scenario.people.map(({ id, key }) => [id, key]));
    return (personId) =>
      NAMED_PROGRESS[keys.get(personId) ?? ''] ?? randomStream(`progress of ${personId}`).between(0.6, 1.15);
  }

  /** One reviewer says on reading that the proposal competes with own work: the assignment stays, and shows as a conflict. */
  private async declareConflict(): Promise<void> {
    const person = this.scenario.people.find(({ key }) => key === 'benoit');
    const [assignment] = await this.db
      .select({ proposalId: assignments.proposalId })
      .from(assignments)
      .where(
        sql`${assignments.personId} = ${person?.id} and not ${assignments.isLead}
          and ${assignments.panelId} = ${demoId('panel', 'reviewing', 'galaxies')}
          and not exists (select 1 from ${reviews} where ${reviews.proposalId} = ${assignments.proposalId}
            and ${reviews.personId} = ${assignments.personId})`,
      )
      .orderBy(assignments.proposalId)
      .limit(1);
    if (person === undefined || assignment === undefined) return;
    await this.insert(conflicts, [
      {
        ...assignment,
        id: demoId('conflict', assignment.proposalId, person.id),
        personId: person.id,
        kind: 'declared',
        reason: 'I am preparing a request for the same kind of object on another telescope.',
        createdAt: daysFrom(this.now, -6),
      },
    ]);
  }

  private async writeAwards(
    semester: SemesterRow,
    decidedAt: Date,
    scores: ReadonlyMap<string, readonly number[]>,
  ): Promise<void> {
    const before = this.scenario.proposals.filter(
      ({ semesterId, fate }) => semesterId === semester.id && fate === 'submitted',
    );
    const decisions = decide(
      before.map((proposal): Contender => {
        const own = scores.get(proposal.id) ?? [];
        return {
          proposalId: proposal.id,
          meanScore: own.reduce((sum, score) => sum + score, 0) / Math.max(1, own.length),
          requestedHours: this.requestedHours.get(proposal.id) ?? { dark: 0, grey: 0, bright: 0 },
          acceptsThinCloud: proposal.observations.some(({ conditions }) => conditions.transparency === 'thinCloud'),
        };
      }),
      availableIn(this.scenario, semester),
    );
    await this.insert(
      awards,
      decisions.map((decision) => ({
        id: demoId('award', decision.proposalId),
        proposalId: decision.proposalId,
        hours: decision.hours,
        moonClass: decision.moonClass,
        standing: decision.standing ?? ('flexible' as const),
        reason: this.reasonFor(decision),
        decidedBy: this.panelOf(decision.proposalId).chairId,
        createdAt: daysFrom(decidedAt, -3),
        updatedAt: daysFrom(decidedAt, -3),
      })),
    );
    for (const state of ['awarded', 'declined'] as const) {
      const ids = decisions
        .filter(({ hours }) => hours > 0 === (state === 'awarded'))
        .map(({ proposalId }) => proposalId);
      if (ids.length === 0) continue;
      await this.db
        .update(proposals)
        .set({ state, updatedAt: decidedAt, version: sql`${proposals.version} + 1` })
        .where(sql`${proposals.id} in ${ids}`);
    }
    await this.insert(
      changes,
      decisions.map(({ proposalId, hours }) => ({
        id: demoId('change', proposalId, 'outcome'),
        at: decidedAt,
        personId: null,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: before.find(({ id }) => id === proposalId)?.title ?? '',
        action: 'changed',
        details: { state: { before: 'inReview', after: hours > 0 ? 'awarded' : 'declined' } },
      })),
    );
  }

  /** The content as the principal investigator would have submitted it, by the code that freezes every submission. */
  private async writeSubmission(proposal: ProposalRow, submittedAt: Date): Promise<void> {
    const principal = this.scenario.people.find(({ id }) => id === principalOf(proposal));
    if (principal === undefined) throw new RangeError(`Proposal ${proposal.key} has no principal investigator.`);
    const { id: personId, email, isStaff, isAdministrator } = principal;
    const actor = { personId, email, isStaff, isAdministrator, sessionId: demoId('no session') };
    const content = await this.app
      .get(SubmissionsService, { strict: false })
      .freezeHead(actor, { proposalId: proposal.id, cosmology: proposal.cosmology });
    const requestedHours = content.timeRequest.totals;
    this.requestedHours.set(proposal.id, requestedHours);
    const submissionId = demoId('submission', proposal.id);
    const { texts, targetCount } = await this.app
      .get(SubmissionRows, { strict: false })
      .store(proposal.id, submissionId);
    const fingerprint = await fingerprintOfParts(content, texts);
    await this.insert(submissions, [
      {
        id: submissionId,
        proposalId: proposal.id,
        number: 1,
        submittedAt,
        submittedBy: personId,
        content,
        fingerprint,
        requestedHours,
        targetCount,
        isCurrent: proposal.fate !== 'withdrawn',
      },
    ]);
    await this.insert(changes, [
      {
        id: demoId('change', proposal.id, 'submitted'),
        at: submittedAt,
        personId,
        scope: 'proposal',
        scopeId: proposal.id,
        subject: 'submission',
        subjectId: submissionId,
        subjectName: 'submission 1',
        action: 'submitted',
        details: { fingerprint: { before: null, after: fingerprint } },
      },
    ]);
  }

  private reasonFor({ proposalId, standing }: Decision): string {
    const { awardFirm, awardFlexible, awardFiller, declined } = this.data.comments;
    const reasons = { firm: awardFirm, flexible: awardFlexible, filler: awardFiller, none: declined };
    return randomStream(`reason for ${proposalId}`).pick(reasons[standing ?? 'none']);
  }

  private panelOf(proposalId: string): PanelRow {
    const proposal = this.scenario.proposals.find(({ id }) => id === proposalId);
    const panel = this.scenario.panels.find(({ id }) => id === proposal?.panelId);
    if (panel === undefined) throw new RangeError(`Proposal ${proposalId} has no panel.`);
    return panel;
  }

  private async insert<Table extends PgTable>(table: Table, rows: readonly PgInsertValue<Table>[]): Promise<void> {
    for (let start = 0; start < rows.length; start += ROWS_PER_STATEMENT) {
      await this.db.insert(table).values(rows.slice(start, start + ROWS_PER_STATEMENT));
    }
  }
}

function principalOf(proposal: ProposalRow): string | null {
  return proposal.members.find(({ isPrincipal }) => isPrincipal)?.personId ?? null;
}

function availableIn(scenario: Scenario, semester: SemesterRow): HoursByMoonClass {
  const own = scenario.semesterHours.filter(({ semesterId }) => semesterId === semester.id);
  const sumOf = (moonClass: MoonClass) => own.reduce((sum, hours) => sum + hours[moonClass], 0);
  return { dark: sumOf('dark'), grey: sumOf('grey'), bright: sumOf('bright') };
}
