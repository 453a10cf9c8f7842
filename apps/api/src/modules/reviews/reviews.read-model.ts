import { Injectable } from '@nestjs/common';
import { and, eq, isNull, sql } from 'drizzle-orm';
import { panels } from '../../database/schema/panels.js';
import { people } from '../../database/schema/people.js';
import { proposals } from '../../database/schema/proposals.js';
import { reviews } from '../../database/schema/reviews.js';
import { DatabaseService } from '../../database/transaction.js';
import { isFreeOfConflict } from '../panels/conflict-conditions.read-model.js';

export interface PanelReview {
  proposalId: string;
  personId: string;
  reviewerName: string;
  overallScore: number | null;
  isComplete: boolean;
  hasBegun: boolean;
}

/** What panels, ranking and semesters read of reviews. It knows no other subject's services. */
@Injectable()
export class ReviewsReadModel {
  constructor(private readonly database: DatabaseService) {}

  /**
   * The reviews of a panel's proposals that `viewerId` may hear of: none on a proposal with which the viewer has a
   * conflict, and none by a reviewer who has one.
   */
  async listOfPanel(panelId: string, viewerId: string): Promise<PanelReview[]> {
    return this.database
      .current()
      .select({
        proposalId: reviews.proposalId,
        personId: reviews.personId,
        reviewerName: sql<string>`${people.givenName} || ' ' || ${people.familyName}`,
        overallScore: reviews.overallScore,
        isComplete: reviews.isComplete,
        hasBegun: sql<boolean>`(${reviews.answers} <> '{}'::jsonb or ${reviews.commentToPrincipal} <> '' or ${reviews.confidentialComment} <> '')`,
      })
      .from(reviews)
      .innerJoin(proposals, eq(proposals.id, reviews.proposalId))
      .innerJoin(people, eq(people.id, reviews.personId))
      .where(
        and(
          eq(proposals.panelId, panelId),
          isNull(proposals.deletedAt),
          isFreeOfConflict(sql`${viewerId}::uuid`),
          isFreeOfConflict(sql`${reviews.personId}`),
        ),
      )
      .orderBy(people.familyName, people.givenName, people.id);
  }

  /** Whether anybody has answered a criterion of this semester: from then on its criteria are fixed. */
  async haveBegunInSemester(semesterId: string): Promise<boolean> {
    const [row] = await this.database
      .current()
      .select({ id: reviews.id })
      .from(reviews)
      .innerJoin(proposals, eq(proposals.id, reviews.proposalId))
      .innerJoin(panels, eq(panels.id, proposals.panelId))
      .where(and(eq(proposals.semesterId, semesterId), sql`${reviews.answers} <> '{}'::jsonb`))
      .limit(1);
    return row !== undefined;
  }
}
