import type { ScoreAnswer } from '@faintward/contracts/reviews';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, sql } from 'drizzle-orm';
import { assignments } from '../../database/schema/assignments.js';
import { panelMembers, panels } from '../../database/schema/panels.js';
import { reviews } from '../../database/schema/reviews.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';

export interface ReviewContent {
  answers: Record<string, ScoreAnswer>;
  overallScore: number | null;
  isComplete: boolean;
  commentToPrincipal: string;
  confidentialComment: string;
}

@Injectable()
export class ReviewsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The reviews this person was given on panels that are still at work and that the person still sits on. */
  async listOpenAssignments(personId: string) {
    return this.database
      .current()
      .select({
        proposalId: assignments.proposalId,
        isLead: assignments.isLead,
        panelId: panels.id,
        panelName: panels.name,
        semesterName: semesters.name,
        reviewsDueAt: semesters.reviewsDueAt,
        review: reviews,
      })
      .from(assignments)
      .innerJoin(panels, eq(panels.id, assignments.panelId))
      .innerJoin(semesters, eq(semesters.id, panels.semesterId))
      .innerJoin(
        panelMembers,
        and(eq(panelMembers.panelId, assignments.panelId), eq(panelMembers.personId, assignments.personId)),
      )
      .leftJoin(
        reviews,
        and(eq(reviews.proposalId, assignments.proposalId), eq(reviews.personId, assignments.personId)),
      )
      .where(and(eq(assignments.personId, personId), isNull(panels.finalisedAt)))
      .orderBy(asc(semesters.deadlineAt), asc(panels.position), asc(panels.name));
  }

  async findAssignment(
    panelId: string,
    proposalId: string,
    personId: string,
  ): Promise<{ isLead: boolean } | undefined> {
    const [row] = await this.database
      .current()
      .select({ isLead: assignments.isLead })
      .from(assignments)
      .where(
        and(
          eq(assignments.panelId, panelId),
          eq(assignments.proposalId, proposalId),
          eq(assignments.personId, personId),
        ),
      );
    return row;
  }

  /** Keeps an assignment from being taken back until the transaction ends; false when it has been. */
  async holdAssignment(proposalId: string, personId: string): Promise<boolean> {
    const rows = await this.database
      .current()
      .select({ id: assignments.id })
      .from(assignments)
      .where(and(eq(assignments.proposalId, proposalId), eq(assignments.personId, personId)))
      .for('share');
    return rows.length === 1;
  }

  async find(proposalId: string, personId: string) {
    const [row] = await this.database
      .current()
      .select()
      .from(reviews)
      .where(and(eq(reviews.proposalId, proposalId), eq(reviews.personId, personId)));
    return row;
  }

  /**
   * Stores the first content of a review. An unwritten review is its version 1, so that what is stored first is version 2.
   *
   * @returns its id, or undefined when another request was first
   */
  async insert(proposalId: string, personId: string, content: ReviewContent): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .insert(reviews)
      .values({ proposalId, personId, ...content, version: 2 })
      .onConflictDoNothing()
      .returning({ reviewId: reviews.id });
    return row?.reviewId;
  }

  /** @returns its id, or undefined when `version` is no longer the stored one */
  async update(
    proposalId: string,
    personId: string,
    version: number,
    content: ReviewContent,
  ): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .update(reviews)
      .set({ ...content, updatedAt: new Date(), version: sql`${reviews.version} + 1` })
      .where(and(eq(reviews.proposalId, proposalId), eq(reviews.personId, personId), eq(reviews.version, version)))
      .returning({ reviewId: reviews.id });
    return row?.reviewId;
  }
}
