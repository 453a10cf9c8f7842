import { randomUUID } from 'node:crypto';
import type { Proposal } from '@faintward/contracts/proposals';
import type { CheckFinding, CheckReport, Submission, SubmissionSummary } from '@faintward/contracts/submissions';
import { Injectable } from '@nestjs/common';
import { Config } from '../../config/config.js';
import type { PartKind, StoredContent } from '../../database/schema/submissions.js';
import { DatabaseService } from '../../database/transaction.js';
import { canonicalJson } from '../../engine/canonical-json.js';
import { chooseCosmology } from '../../engine/cosmologies.js';
import { ENGINE_VERSION } from '../../engine/estimates.js';
import type { Actor } from '../../platform/actor.js';
import { DomainError, notFound } from '../../platform/domain-error.js';
import { HistoryService } from '../../platform/history.js';
import { IdempotencyService } from '../../platform/idempotency.js';
import { MailService } from '../../platform/mail/mail.service.js';
import { ObservationsReadModel } from '../observations/observations.read-model.js';
import { ConflictsService } from '../panels/conflicts.service.js';
import { PanelsReadModel } from '../panels/panels.read-model.js';
import { CaseService } from '../proposals/case.service.js';
import { ProposalAccess, type ProposalForMember } from '../proposals/proposal-access.service.js';
import { ProposalFactsReadModel } from '../proposals/proposal-facts.read-model.js';
import { ProposalsService } from '../proposals/proposals.service.js';
import { TargetsReadModel } from '../targets/targets.read-model.js';
import { TeamReadModel } from '../team/team.read-model.js';
import { findingsOf, LISTED_COUNT } from './checks.js';
import { receiptMail } from './receipt-mail.js';
import { fingerprintOfParts, type StoredRows, SubmissionRows } from './submission-rows.service.js';
import { SubmissionsQueries } from './submissions.queries.js';
import { SubmissionsReadModel } from './submissions.read-model.js';

/** What was submitted without its long lists. */
export type SubmittedHead = Omit<StoredContent, PartKind>;

/** What was frozen before the transaction that makes it count. */
interface Prepared {
  rows: StoredRows;
  /** Canonical JSON of all beside the rows. */
  headJson: string;
  fingerprint: string;
}

/** From a working copy to what the committee reads: checked, frozen, and never changed afterwards. */
@Injectable()
export class SubmissionsService {
  constructor(
    private readonly config: Config,
    private readonly database: DatabaseService,
    private readonly access: ProposalAccess,
    private readonly queries: SubmissionsQueries,
    private readonly rows: SubmissionRows,
    private readonly readModel: SubmissionsReadModel,
    private readonly facts: ProposalFactsReadModel,
    private readonly proposals: ProposalsService,
    private readonly cases: CaseService,
    private readonly team: TeamReadModel,
    private readonly targets: TargetsReadModel,
    private readonly observations: ObservationsReadModel,
    private readonly panels: PanelsReadModel,
    private readonly conflicts: ConflictsService,
    private readonly history: HistoryService,
    private readonly idempotency: IdempotencyService,
    private readonly mail: MailService,
  ) {}

  async check(actor: Actor, proposalId: string): Promise<CheckReport> {
    return this.report(await this.access.requireRead(actor, proposalId));
  }

  async list(actor: Actor, proposalId: string): Promise<{ rows: SubmissionSummary[] }> {
    await this.access.requireRead(actor, proposalId);
    return { rows: await this.readModel.listOfProposal(proposalId) };
  }

  async get(actor: Actor, proposalId: string, submissionId: string): Promise<Submission> {
    await this.access.requireRead(actor, proposalId);
    const submission = await this.readModel.find(proposalId, submissionId);
    if (submission === undefined) throw notFound('submission');
    return submission;
  }

  /** @throws {DomainError} `checks-failed` with the blocking findings as field errors */
  async submit(actor: Actor, proposalId: string, key: string | undefined): Promise<SubmissionSummary> {
    const proposal = await this.access.requireRead(actor, proposalId);
    const ownId = randomUUID();
    let submissionId: string | undefined;
    try {
      const prepared = await this.prepare(actor, proposal, ownId);
      ({ submissionId } = await this.idempotency.idempotent(
        { personId: actor.personId, key, route: `proposals/${proposalId}/submissions`, body: null },
        () => this.store(actor, proposalId, ownId, prepared),
      ));
    } finally {
      // Refused, or made already by an earlier request under the same key.
      if (submissionId !== ownId) await this.queries.deleteParts(ownId);
    }
    const summary = await this.readModel.findSummary(proposalId, submissionId);
    if (summary === undefined) throw notFound('submission');
    return summary;
  }

  /** Takes a submitted proposal back, also from the committee; for good. */
  async withdraw(actor: Actor, proposalId: string): Promise<Proposal> {
    return this.database.transaction(async () => {
      const proposal = await this.access.requirePrincipalInAnyState(actor, proposalId);
      if (proposal.state !== 'submitted' && proposal.state !== 'inReview') throw notWithdrawable(proposal);
      await this.proposals.setState(proposalId, 'withdrawn');
      await this.queries.retireCurrent(proposalId);
      await this.history.record({
        personId: actor.personId,
        scope: 'proposal',
        scopeId: proposalId,
        subject: 'proposal',
        subjectId: proposalId,
        subjectName: proposal.title,
        action: 'withdrawn',
        details: { state: { before: proposal.state, after: 'withdrawn' } },
      });
      return this.proposals.get(actor, proposalId);
    });
  }

  /**
   * Freezes all that takes long, before the transaction: thousands of rows are read, hashed and written in turns with other
   * requests. Undefined for what will be refused anyway.
   */
  private async prepare(
    actor: Actor,
    proposal: ProposalForMember,
    submissionId: string,
  ): Promise<Prepared | undefined> {
    if (!proposal.isPrincipal || !(await this.report(proposal)).canSubmit) return undefined;
    const { proposalId } = proposal;
    await this.queries.deleteAbandonedParts(proposalId);
    const head = await this.freezeHead(actor, proposal);
    const rows = await this.rows.store(proposalId, submissionId);
    return { rows, headJson: canonicalJson(head), fingerprint: await fingerprintOfParts(head, rows.texts) };
  }

  /** Rows and fingerprint as prepared, or anew where somebody changed something in between. */
  private async upToDate(
    proposalId: string,
    submissionId: string,
    head: SubmittedHead,
    prepared: Prepared | undefined,
  ): Promise<Pick<Prepared, 'rows' | 'fingerprint'>> {
    const isCurrent = prepared !== undefined && (await this.rows.isUnchanged(proposalId, prepared.rows));
    if (isCurrent && prepared.headJson === canonicalJson(head)) return prepared;
    if (prepared !== undefined && !isCurrent) await this.queries.deleteParts(submissionId);
    const rows = isCurrent ? prepared.rows : await this.rows.store(proposalId, submissionId);
    return { rows, fingerprint: await fingerprintOfParts(head, rows.texts) };
  }

  private async store(
    actor: Actor,
    proposalId: string,
    ownId: string,
    prepared: Prepared | undefined,
  ): Promise<{ submissionId: string }> {
    const proposal = await this.access.requirePrincipalForChange(actor, proposalId);
    const { findings } = await this.report(proposal);
    const blocking = findings.filter(({ severity }) => severity === 'blocking');
    if (blocking.length > 0) throw checksFailed(blocking);

    const content = await this.freezeHead(actor, proposal);
    const { rows, fingerprint } = await this.upToDate(proposalId, ownId, content, prepared);
    const submittedAt = new Date();
    const { targetCount } = rows;
    const { submissionId, number } = await this.queries.insertCurrent({
      id: ownId,
      proposalId,
      submittedBy: actor.personId,
      submittedAt,
      content,
      fingerprint,
      requestedHours: content.timeRequest.totals,
      targetCount,
    });
    await this.proposals.setState(proposalId, 'submitted');
    await this.conflicts.detectForProposal(proposalId);
    await this.history.record({
      personId: actor.personId,
      scope: 'proposal',
      scopeId: proposalId,
      subject: 'submission',
      subjectId: submissionId,
      subjectName: `submission ${number}`,
      action: 'submitted',
      details: { fingerprint: { before: null, after: fingerprint } },
    });
    await this.mail.send({
      to: actor.email,
      ...receiptMail({
        label: proposal.label,
        title: content.title,
        number,
        submittedAt: submittedAt.toISOString(),
        deadlineAt: proposal.deadlineAt.toISOString(),
        fingerprint,
        targetCount,
        totalHours: content.timeRequest.totalHours,
        link: `${this.config.publicUrl}/proposals/${proposalId}`,
      }),
    });
    return { submissionId };
  }

  /**
   * Everything that the committee may need, and that would be needed to repeat every number, beside the targets and observations
   * themselves ({@link SubmissionRows}). It stores nothing and checks no deadline; the actor has to be on the team.
   */
  async freezeHead(
    actor: Actor,
    { proposalId, cosmology: choice }: Pick<ProposalForMember, 'proposalId' | 'cosmology'>,
  ): Promise<SubmittedHead> {
    const proposal = await this.proposals.get(actor, proposalId);
    const sections = await this.cases.listStored(proposalId);
    const team = await this.team.list(proposalId, actor.personId);
    const cosmology = chooseCosmology(choice);
    return {
      title: proposal.title,
      abstract: proposal.abstract,
      keywords: proposal.keywords,
      partnerName: proposal.partnerName,
      cosmology: {
        id: cosmology.id,
        title: cosmology.title,
        source: cosmology.source,
        parameters: cosmology.parameters,
      },
      case: sections.map(({ sectionId, title, body }) => ({ sectionId, title, body })),
      team: team.map(({ name, institutionName, isPrincipal, signedAt }) => ({
        name,
        institutionName,
        isPrincipal,
        // Submitting is the principal investigator's signature.
        hasSigned: isPrincipal || signedAt !== null,
      })),
      timeRequest: await this.observations.timeRequest(proposalId),
      engineVersion: ENGINE_VERSION,
    };
  }

  private async report({ proposalId, semesterId, panelId, abstract }: ProposalForMember): Promise<CheckReport> {
    const withoutTime = await this.observations.listWithoutTime(proposalId, LISTED_COUNT);
    const findings = findingsOf({
      facts: await this.facts.get(proposalId),
      panelId,
      hasPanelsToChoose: (await this.panels.listOfSemester(semesterId)).length > 0,
      abstract,
      targets: await this.targets.listForChecks(proposalId),
      ...withoutTime,
      olderConfigurationCount: await this.observations.countOlderConfigurations(proposalId),
    });
    const blockingCount = findings.filter(({ severity }) => severity === 'blocking').length;
    return {
      checkedAt: new Date().toISOString(),
      canSubmit: blockingCount === 0,
      blockingCount,
      warningCount: findings.length - blockingCount,
      findings,
    };
  }
}

function checksFailed(blocking: readonly CheckFinding[]): DomainError {
  const count = blocking.length;
  return new DomainError(
    'checks-failed',
    count === 1
      ? `One thing has to be settled before this can be submitted: ${blocking[0]?.message ?? ''}`
      : `${count} things have to be settled before this can be submitted.`,
    {
      fieldErrors: blocking.map(({ section, field, targetId, message }) => ({
        path: [section, targetId, field].filter((part) => part !== undefined).join('.'),
        message,
      })),
    },
  );
}

function notWithdrawable({ state }: ProposalForMember): DomainError {
  const reason =
    state === 'draft'
      ? 'This proposal was not submitted yet; a draft can be deleted.'
      : state === 'withdrawn'
        ? 'This proposal was withdrawn already.'
        : 'This proposal is decided; the observatory ends a programme.';
  return new DomainError('wrong-state', reason);
}
