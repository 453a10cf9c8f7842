import { Acknowledgement, Id } from '@faintward/contracts/common';
import { ConflictDeclaration, ReadingList, Review, ReviewInput, SavedReview } from '@faintward/contracts/reviews';
import { Body, Controller, Get, Param, Post, Put } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import type { z } from 'zod';
import { Requires, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { IfMatch } from '../../platform/etag.js';
import { ReviewsService } from './reviews.service.js';

@ApiTags('reviews')
@Controller()
export class ReviewsController {
  constructor(private readonly reviews: ReviewsService) {}

  @Get('reading-list')
  @SignedIn()
  @Answers(ReadingList)
  readingList(@CurrentPerson() actor: Actor): Promise<ReadingList> {
    return this.reviews.readingList(actor);
  }

  @Get('reviews/:proposalId')
  @Requires('review.read')
  @Answers(Review)
  get(@CurrentPerson() actor: Actor, @Param('proposalId', { schema: Id }) proposalId: string): Promise<Review> {
    return this.reviews.get(actor, proposalId);
  }

  @Put('reviews/:proposalId')
  @Requires('review.write')
  @Answers(SavedReview)
  save(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @IfMatch() version: number,
    @Body({ schema: ReviewInput }) input: ReviewInput,
  ): Promise<SavedReview> {
    return this.reviews.save(actor, proposalId, version, input);
  }

  @Post('reviews/:proposalId/conflict')
  @Requires('review.write')
  @Answers(Acknowledgement, { status: 200 })
  declareConflict(
    @CurrentPerson() actor: Actor,
    @Param('proposalId', { schema: Id }) proposalId: string,
    @Body({ schema: ConflictDeclaration }) input: ConflictDeclaration,
  ): Promise<z.infer<typeof Acknowledgement>> {
    return this.reviews.declareConflict(actor, proposalId, input);
  }
}
