import type { CosmologyChoice } from '@faintward/contracts/cosmology';
import type {
  NewProposal,
  Proposal,
  ProposalChoices,
  ProposalHistoryQuery,
  ProposalListQuery,
  ProposalPatch,
  ProposalState,
  ProposalSummary,
} from '@faintward/contracts/proposals';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import { canonicalJson } from '../../engine/canonical-json.js';
import { chooseProposalCosmology } from '../../engine/cosmologies.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, invalidField, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { toPage } from '../../platform/pagination.js';
import { ConflictsService } from '../panels/conflicts.service.js';
import { PanelsReadModel } from '../panels/panels.read-model.js';
import { isPastDeadline, SemestersReadModel } from '../semesters/semesters.read-model.js';
import { SubmissionsReadModel } from '../submissions/submissions.read-model.js';
import { TargetRecomputation } from '../targets/target-recomputation.service.js';
import { ProposalAccess } from './proposal-access.service.js';
import { ProposalFactsReadModel } from './proposal-facts.read-model.js';
import { abilitiesOf, canEditEverything, requireChangeable, shownState } from './proposal-rules.js';
import { ProposalsQueries } from './proposals.queries.js';
import { ProposalsReadModel } from './proposals.read-model.js';
import { lackingTexts, sectionStatuses } from './section-status.js';

@Injectable()
export class ProposalsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: ProposalsQueries,
    private readonly readModel: ProposalsReadModel,
    private readonly facts: ProposalFactsReadModel,
    private readonly submissions: SubmissionsReadModel,
    private readonly semesters: SemestersReadModel,
    private readonly panels: PanelsReadModel,
    private readonly conflicts: ConflictsService,
    private readonly recomputation: TargetRecomputation,
    private readonly history: HistoryService,
  ) {}

  /** The person's own: proposals that they are on the team of. */
  async list(actor: Actor, query: ProposalListQuery) {
    const now = new Date();
    const { rows, rowCount } = await this.readModel.listOfPerson(actor.personId, query, now);
    const ids = rows.map(({ proposalId }) => proposalId);
    const facts = await this.facts.list(ids);
    const latest = await this.readModel.latestChanges(ids);
    const summaries = rows.map((row): ProposalSummary => {
      const of = facts.get(row.proposalId);
      if (of === undefined) throw new Error('A proposal of the page has no facts.');
      const change = latest.get(row.proposalId);
      return {
        proposalId: row.proposalId,
        label: row.label,
        title: row.title,
        state: shownState(row, now),
        semesterId: row.semesterId,
        semesterName: row.semesterName,
        deadlineAt: row.deadlineAt.toISOString(),
        principalName: of.principalName,
        myAccess: row.access,
        isPrincipal: row.isPrincipal,
        targetCount: of.targetCount,
        requestedHours: of.requestedHours,
        lacking: row.state === 'draft' ? lackingTexts(of) : [],
        latestChange:
          change === undefined
            ? null
            : {
                at: change.at.toISOString(),
                personName: change.personName,
                summary: summaryOf(change),
              },
        updatedAt: row.updatedAt.toISOString(),
      };
    });
    return toPage(summaries, rowCount, query);
  }

  /** @throws {DomainError} `wrong-state` or `deadline-passed` outside of the semester's call */
  async create(actor: Actor, { semesterId, title }: NewProposal): Promise<Proposal> {
    const semester = await this.semesters.find(semesterId);
    if (semester === undefined) throw invalidField('semesterId', 'There is no such semester.');
    if (semester.stage === 'announced') {
      throw new DomainError('wrong-state', `The call of this semester opens at ${semester.callOpensAt.toISOString()}.`);
    }
    if (isPastDeadline(semester.deadlineAt, new Date())) {
      throw new DomainError(
        'deadline-passed',
        `The deadline of this semester was ${semester.deadlineAt.toISOString()}.`,
      );
    }
    return this.database.transaction(async () => {
      const proposalId = await this.queries.insert(semesterId, title, actor.personId);
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: title,
        action: 'created',
      });
      return this.get(actor, proposalId);
    });
  }

  async get(actor: Actor, proposalId: string): Promise<Proposal> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const now = new Date();
    const state = shownState(proposal, now);
    const details = await this.readModel.getDetails(proposalId);
    const facts = await this.facts.get(proposalId);
    const submissions = await this.submissions.listOfProposal(proposalId);
    return {
      proposalId,
      label: proposal.label,
      title: details.title,
      abstract: details.abstract,
      keywords: details.keywords,
      state,
      semesterId: proposal.semesterId,
      semesterName: proposal.semesterName,
      deadlineAt: proposal.deadlineAt.toISOString(),
      siteTimeZone: details.siteTimeZone,
      panelId: proposal.panelId,
      panelName: details.panelName,
      partnerId: details.partnerId,
      partnerName: details.partnerName,
      cosmology: details.cosmology,
      principalName: facts.principalName,
      sections: sectionStatuses(facts, state, submissions.length),
      requestedHours: facts.requestedHours,
      award: details.award,
      abilities: abilitiesOf(proposal, proposal, now),
      version: proposal.version,
      updatedAt: details.updatedAt.toISOString(),
    };
  }

  /**
   * A change of the cosmology computes everything of the proposal again: before the transaction, which takes up what others
   * changed meanwhile and stores all of it.
   */
  async update(actor: Actor, proposalId: string, version: number, patch: ProposalPatch): Promise<Proposal> {
    const prepared = await this.prepareCosmology(actor, proposalId, patch.cosmology);
    return this.database.transaction(async () => {
      const proposal = await this.access.requireEverythingForChange(actor, proposalId);
      if (proposal.version !== version) throw staleVersion(await this.get(actor, proposalId));
      await this.requireChoices(proposal.semesterId, patch);
      const before = await this.queries.findFields(proposalId);
      if (before === undefined) throw new Error('A locked proposal is gone.');
      const details = differences(before, patch);
      if (Object.keys(details).length === 0) return this.get(actor, proposalId);
      await this.queries.update(proposalId, patch);
      if (details['cosmology'] !== undefined && patch.cosmology !== undefined) {
        await this.recomputation.recomputeAll(proposalId, proposal.semesterId, patch.cosmology, prepared);
      }
      // Another panel will read what is submitted already: somebody of it may not.
      if (details['panelId'] !== undefined && proposal.state === 'submitted') {
        await this.conflicts.detectForProposal(proposalId);
      }
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: patch.title ?? before.title,
        action: 'changed',
        details,
      });
      return this.get(actor, proposalId);
    });
  }

  /** Undefined when nothing has to be computed, or the person may not change it: that the transaction says. */
  private async prepareCosmology(actor: Actor, proposalId: string, cosmology: CosmologyChoice | undefined) {
    if (cosmology === undefined) return undefined;
    chooseProposalCosmology(cosmology);
    const proposal = await this.access.requireRead(actor, proposalId);
    if (!canEditEverything(proposal) || canonicalJson(proposal.cosmology) === canonicalJson(cosmology))
      return undefined;
    requireChangeable(proposal, new Date());
    return this.recomputation.prepareAll(proposalId, proposal.semesterId, cosmology);
  }

  /** Takes a draft away. It is kept for some days, so that a mistake can be undone by hand. */
  async delete(actor: Actor, proposalId: string, version: number): Promise<void> {
    await this.database.transaction(async () => {
      const proposal = await this.access.requirePrincipalInAnyState(actor, proposalId);
      if (proposal.state !== 'draft') {
        throw new DomainError('wrong-state', 'Only a draft can be deleted. A submitted proposal can be withdrawn.');
      }
      if (proposal.version !== version) throw staleVersion(await this.get(actor, proposalId));
      await this.queries.markDeleted(proposalId);
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: proposal.title,
        action: 'removed',
      });
    });
  }

  /** For the subject that decides on states, in its transaction. */
  async setState(proposalId: string, state: ProposalState): Promise<void> {
    await this.queries.setState(proposalId, state);
  }

  async choices(actor: Actor, proposalId: string): Promise<ProposalChoices> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const panels = await this.panels.listOfSemester(proposal.semesterId);
    return {
      panels: panels.map(({ panelId, name }) => ({ panelId, name })),
      partners: await this.readModel.listPartners(),
    };
  }

  async listHistory(actor: Actor, proposalId: string, query: ProposalHistoryQuery) {
    await this.access.requireRead(actor, proposalId);
    const { rows, rowCount } = await this.readModel.listChanges(proposalId, query);
    return toPage(rows, rowCount, query);
  }

  private async requireChoices(semesterId: string, { panelId, partnerId }: ProposalPatch): Promise<void> {
    if (panelId != null) {
      const panels = await this.panels.listOfSemester(semesterId);
      if (!panels.some((panel) => panel.panelId === panelId)) {
        throw invalidField('panelId', 'This semester has no such panel.');
      }
    }
    if (partnerId != null) {
      const partners = await this.readModel.listPartners();
      if (!partners.some((partner) => partner.partnerId === partnerId)) {
        throw invalidField('partnerId', 'There is no such partner.');
      }
    }
  }
}

/** "changed the target BR J0355-3811". */
function summaryOf({ action, subject, subjectName }: { action: string; subject: string; subjectName: string }): string {
  if (subject === 'proposal') return `${action} the proposal`;
  const noun = { target: 'target', observation: 'observation', caseSection: 'section', member: 'member' }[subject];
  const named = subjectName === '' ? '' : ` ${subjectName}`;
  return noun === undefined || /^\d/.test(subjectName) ? `${action}${named}` : `${action} the ${noun}${named}`;
}
