import { Id } from '@faintward/contracts/common';
import { Proposal } from '@faintward/contracts/proposals';
import { CheckReport, Submission, SubmissionList, SubmissionSummary } from '@faintward/contracts/submissions';
import { Controller, Get, Param, Post } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IdempotencyKey } from '../../platform/idempotency.js';
import { SubmissionsService } from './submissions.service.js';

@ApiTags('submissions')
@Controller('proposals/:proposalId')
export class SubmissionsController {
  constructor(private readonly submissions: SubmissionsService) {}

  @Get('checks')
  @Requires('proposal.read')
  @Answers(CheckReport)
  check(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Promise<CheckReport> {
    return this.submissions.check(actor, proposalId);
  }

  @Get('submissions')
  @Requires('proposal.read')
  @Answers(SubmissionList)
  list(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<z.infer<typeof SubmissionList>> {
    return this.submissions.list(actor, proposalId);
  }

  @Post('submissions')
  @Requires('proposal.submit')
  @Answers(SubmissionSummary, { status: 201 })
  submit(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IdempotencyKey() key: string | undefined,
  ): Promise<SubmissionSummary> {
    return this.submissions.submit(actor, proposalId, key);
  }

  @Get('submissions/:submissionId')
  @Requires('proposal.read')
  @Answers(Submission)
  get(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('submissionId', { schema: Id }) submissionId: string,
  ): Promise<Submission> {
    return this.submissions.get(actor, proposalId, submissionId);
  }

  @Post('withdrawal')
  @Requires('proposal.submit')
  @Answers(Proposal, { status: 200 })
  withdraw(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Promise<Proposal> {
    return this.submissions.withdraw(actor, proposalId);
  }
}
