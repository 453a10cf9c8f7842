import { Id } from '@faintward/contracts/common';
import {
  CaseSection,
  CaseSectionId,
  CaseSectionInput,
  CaseSectionList,
  NewProposal,
  Proposal,
  ProposalChangePage,
  ProposalChoices,
  ProposalHistoryQuery,
  ProposalListQuery,
  ProposalPage,
  ProposalPatch,
} from '@faintward/contracts/proposals';
import { Body, Controller, Delete, Get, Param, Patch, Post, Put, Query } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers, AnswersNothing } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { CaseService } from './case.service.js';
import { ProposalsService } from './proposals.service.js';

@ApiTags('proposals')
@Controller('proposals')
export class ProposalsController {
  constructor(
    private readonly proposals: ProposalsService,
    private readonly cases: CaseService,
  ) {}

  @Get()
  @SignedIn()
  @Answers(ProposalPage)
  list(
    @CurrentPerson() actor: Actor,
    @Query({ schema: ProposalListQuery }) query: ProposalListQuery,
  ): Promise<z.infer<typeof ProposalPage>> {
    return this.proposals.list(actor, query);
  }

  @Post()
  @Requires('proposal.create')
  @Answers(Proposal, { status: 201 })
  create(@CurrentPerson() actor: Actor, @Body({ schema: NewProposal }) input: NewProposal): Promise<Proposal> {
    return this.proposals.create(actor, input);
  }

  @Get(':proposalId')
  @Requires('proposal.read')
  @Answers(Proposal)
  get(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Promise<Proposal> {
    return this.proposals.get(actor, proposalId);
  }

  @Patch(':proposalId')
  @Requires('proposal.edit')
  @Answers(Proposal)
  update(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IfMatch() version: number,
    @Body({ schema: ProposalPatch }) patch: ProposalPatch,
  ): Promise<Proposal> {
    return this.proposals.update(actor, proposalId, version, patch);
  }

  @Delete(':proposalId')
  @Requires('proposal.manage-team')
  @AnswersNothing()
  async delete(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IfMatch() version: number,
  ): Promise<void> {
    await this.proposals.delete(actor, proposalId, version);
  }

  @Get(':proposalId/choices')
  @Requires('proposal.read')
  @Answers(ProposalChoices)
  choices(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<ProposalChoices> {
    return this.proposals.choices(actor, proposalId);
  }

  @Get(':proposalId/case')
  @Requires('proposal.read')
  @Answers(CaseSectionList)
  listCase(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
  ): Promise<z.infer<typeof CaseSectionList>> {
    return this.cases.list(actor, proposalId);
  }

  @Put(':proposalId/case/:sectionId')
  @Requires('proposal.edit')
  @Answers(CaseSection)
  saveCaseSection(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Param('sectionId', { schema: CaseSectionId }) sectionId: CaseSectionId,
    @IfMatch() version: number,
    @Body({ schema: CaseSectionInput }) input: CaseSectionInput,
  ): Promise<CaseSection> {
    return this.cases.save(actor, proposalId, sectionId, version, input);
  }

  @Get(':proposalId/history')
  @Requires('proposal.read')
  @Answers(ProposalChangePage)
  history(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Query({ schema: ProposalHistoryQuery }) query: ProposalHistoryQuery,
  ): Promise<z.infer<typeof ProposalChangePage>> {
    return this.proposals.listHistory(actor, proposalId, query);
  }
}
