import type { AwardInput, Ranking } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, invalidField, notFound, staleVersion } from '../../platform/domain-error.js';
import { differences, HistoryService } from '../../platform/history.js';
import { IdempotencyService } from '../../platform/idempotency.js';
import { ConflictsService } from '../panels/conflicts.service.js';
import { PanelAccess } from '../panels/panel-access.service.js';
import { PanelProposalsReadModel } from '../panels/panel-proposals.read-model.js';
import { PanelsReadModel } from '../panels/panels.read-model.js';
import { ProposalOutcomesService } from '../proposals/proposal-outcomes.service.js';
import { RankingService } from '../ranking/ranking.service.js';
import { isPastDeadline, SemestersReadModel } from '../semesters/semesters.read-model.js';
import { SemestersService } from '../semesters/semesters.service.js';
import { AwardsQueries } from './awards.queries.js';

/**
 * The chair's decisions. Every write answers the ranking as it is afterwards. Under an idempotency key only that the work was
 * done is remembered, and the ranking is read anew: a stored copy would go on showing what a conflict hides by then.
 */
@Injectable()
export class AwardsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: AwardsQueries,
    private readonly access: PanelAccess,
    private readonly conflicts: ConflictsService,
    private readonly proposals: PanelProposalsReadModel,
    private readonly panels: PanelsReadModel,
    private readonly semesters: SemestersReadModel,
    private readonly semesterDecisions: SemestersService,
    private readonly outcomes: ProposalOutcomesService,
    private readonly ranking: RankingService,
    private readonly history: HistoryService,
    private readonly idempotency: IdempotencyService,
  ) {}

  /** @param version of the award that is being changed; undefined when the chair saw none */
  async set(
    actor: Actor,
    panelId: string,
    proposalId: string,
    version: number | undefined,
    key: string | undefined,
    input: AwardInput,
  ): Promise<Ranking> {
    const panel = await this.access.getAsChair(actor, panelId);
    const proposal = await this.getVisible(actor, panelId, proposalId);
    const route = `panels/${panelId}/awards/${proposalId}`;
    await this.idempotency.idempotent({ personId: actor.personId, key, route, body: input }, async () => {
      await this.access.holdOpen(panelId);
      await this.rejectMoreThanThereIs(panel.semesterId, input);
      const before = await this.queries.find(proposalId);
      if (before === undefined && version !== undefined) throw staleVersion(null);
      if (before !== undefined && version === undefined) {
        throw new DomainError(
          'precondition-required',
          `${proposal.label} has an award already. Send the version you are changing as If-Match.`,
        );
      }
      const awardId =
        version === undefined
          ? await this.queries.insert(proposalId, actor.personId, input)
          : await this.queries.update(proposalId, version, actor.personId, input);
      if (awardId === undefined) throw staleVersion(await this.currentOf(actor, panelId, proposalId));
      await this.history.record({
        personId: actor.personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'award',
        // Not the proposal's: that somebody has decided on it is not told before the ranking is final.
        subjectId: awardId,
        subjectName: proposal.label,
        action: before === undefined ? 'created' : 'changed',
        details: differences<object>(before ?? {}, input),
      });
      return { isDone: true };
    });
    return this.ranking.get(actor, panelId);
  }

  async delete(actor: Actor, panelId: string, proposalId: string, version: number): Promise<Ranking> {
    await this.access.getAsChair(actor, panelId);
    const proposal = await this.getVisible(actor, panelId, proposalId);
    await this.database.transaction(async () => {
      await this.access.holdOpen(panelId);
      const before = await this.queries.find(proposalId);
      if (before === undefined) throw notFound('award');
      if (!(await this.queries.delete(proposalId, version))) {
        throw staleVersion(await this.currentOf(actor, panelId, proposalId));
      }
      await this.history.record({
        personId: actor.personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'award',
        subjectId: before.id,
        subjectName: proposal.label,
        action: 'removed',
        details: {
          hours: { before: before.hours, after: null },
          moonClass: { before: before.moonClass, after: null },
          standing: { before: before.standing, after: null },
          reason: { before: before.reason, after: null },
        },
      });
    });
    return this.ranking.get(actor, panelId);
  }

  /**
   * Closes the panel: scores and awards stand from now on, and each proposal is awarded or declined. A proposal without an
   * award is declined, but never one that this chair may not see: on those another chair must have decided, because nobody
   * decides, even by leaving it, where a conflict forbids it.
   */
  async finalise(actor: Actor, panelId: string, key: string | undefined): Promise<Ranking> {
    const panel = await this.access.getAsChair(actor, panelId);
    await this.conflicts.detectForPanel(panelId);
    const route = `panels/${panelId}/finalisation`;
    await this.idempotency.idempotent({ personId: actor.personId, key, route, body: null }, async () => {
      const now = new Date();
      await this.access.finalise(actor, panelId, now);
      const semester = await this.semesters.get(panel.semesterId);
      if (!isPastDeadline(semester.deadlineAt, now)) {
        throw new DomainError(
          'wrong-state',
          `The deadline of ${semester.name} has not passed: proposals can still be submitted.`,
        );
      }
      const proposals = await this.proposals.listAll(panelId);
      const visible = new Set(
        (await this.proposals.listVisible(panelId, actor.personId)).map(({ proposalId }) => proposalId),
      );
      const decided = new Map(
        (await this.queries.listByProposals(proposals.map(({ proposalId }) => proposalId))).map((award) => [
          award.proposalId,
          award.hours,
        ]),
      );
      const undecidedCount = proposals.filter(
        ({ proposalId }) => !visible.has(proposalId) && !decided.has(proposalId),
      ).length;
      if (undecidedCount > 0) {
        throw new DomainError(
          'wrong-state',
          `${undecidedCount === 1 ? 'A proposal' : `${undecidedCount} proposals`} hidden from you for a conflict of interest ` +
            'still wait for a decision by another chair of this panel.',
        );
      }
      for (const { proposalId } of proposals) {
        await this.outcomes.setOutcome(proposalId, (decided.get(proposalId) ?? 0) > 0 ? 'awarded' : 'declined');
      }
      await this.history.record({
        personId: actor.personId,
        scope: 'panel',
        scopeId: panelId,
        subject: 'panel',
        subjectId: panelId,
        subjectName: panel.name,
        action: 'finalised',
        details: { finalisedAt: { before: null, after: now.toISOString() } },
      });
      const all = await this.panels.listOfSemester(panel.semesterId);
      if (all.every(({ isFinal }) => isFinal)) await this.semesterDecisions.markDecided(panel.semesterId);
      return { isDone: true };
    });
    return this.ranking.get(actor, panelId);
  }

  private async getVisible(actor: Actor, panelId: string, proposalId: string) {
    const proposal = await this.proposals.findVisible(proposalId, actor.personId);
    if (proposal?.panelId !== panelId) throw notFound('proposal');
    return proposal;
  }

  /** The award as it stands, for a writer who worked on an older one. */
  private async currentOf(actor: Actor, panelId: string, proposalId: string) {
    const { rows } = await this.ranking.get(actor, panelId);
    return rows.find((row) => row.proposalId === proposalId)?.award ?? null;
  }

  private async rejectMoreThanThereIs(semesterId: string, input: AwardInput): Promise<void> {
    const { telescopes, name } = await this.semesters.get(semesterId);
    const availableHours = telescopes.reduce((sum, telescope) => sum + telescope.availableHours[input.moonClass], 0);
    if (input.hours > availableHours) {
      throw invalidField('hours', `${name} has ${availableHours} h of ${input.moonClass} time in all.`);
    }
  }
}
