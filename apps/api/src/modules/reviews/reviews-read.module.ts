import { Module } from '@nestjs/common';
import { ReviewsReadModel } from './reviews.read-model.js';

/** The part of reviews that knows no other subject's services, so that those which reviews build on can import it. */
@Module({ providers: [ReviewsReadModel], exports: [ReviewsReadModel] })
export class ReviewsReadModule {}
