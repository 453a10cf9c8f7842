import type { PanelRole } from '@faintward/contracts/permissions';
import { Injectable } from '@nestjs/common';
import { and, asc, eq, isNull, ne, sql } from 'drizzle-orm';
import { assignments } from '../../database/schema/assignments.js';
import { panelMembers, panels } from '../../database/schema/panels.js';
import { institutions, people } from '../../database/schema/people.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';

export interface PanelRow {
  panelId: string;
  name: string;
  semesterId: string;
  semesterName: string;
  deadlineAt: Date;
  finalisedAt: Date | null;
}

export interface AssignmentRow {
  assignmentId: string;
  proposalId: string;
  personId: string;
  isLead: boolean;
}

@Injectable()
export class PanelsQueries {
  constructor(private readonly database: DatabaseService) {}

  /** The panel, if this person has one of these roles on it. */
  async findForMember(panelId: string, personId: string, roles: readonly PanelRole[]): Promise<PanelRow | undefined> {
    const [row] = await this.database
      .current()
      .select({
        panelId: panels.id,
        name: panels.name,
        semesterId: panels.semesterId,
        semesterName: semesters.name,
        deadlineAt: semesters.deadlineAt,
        finalisedAt: panels.finalisedAt,
        role: panelMembers.role,
      })
      .from(panels)
      .innerJoin(semesters, eq(semesters.id, panels.semesterId))
      .innerJoin(panelMembers, and(eq(panelMembers.panelId, panels.id), eq(panelMembers.personId, personId)))
      .where(eq(panels.id, panelId));
    if (row === undefined || !roles.includes(row.role)) return undefined;
    const { role: _role, ...panel } = row;
    return panel;
  }

  /**
   * Keeps the panel from being finalised until the transaction ends, or, `for` 'update', waits for everything that is
   * being written under it.
   */
  async lock(panelId: string, strength: 'share' | 'update'): Promise<{ finalisedAt: Date | null } | undefined> {
    const [row] = await this.database
      .current()
      .select({ finalisedAt: panels.finalisedAt })
      .from(panels)
      .where(eq(panels.id, panelId))
      .for(strength);
    return row;
  }

  async listMembers(panelId: string) {
    return this.database
      .current()
      .select({
        personId: people.id,
        name: sql<string>`${people.givenName} || ' ' || ${people.familyName}`,
        institutionName: institutions.name,
        role: panelMembers.role,
      })
      .from(panelMembers)
      .innerJoin(people, eq(people.id, panelMembers.personId))
      .leftJoin(institutions, eq(institutions.id, people.institutionId))
      .where(eq(panelMembers.panelId, panelId))
      .orderBy(asc(people.familyName), asc(people.givenName), asc(people.id));
  }

  async listAssignments(panelId: string): Promise<AssignmentRow[]> {
    return this.database
      .current()
      .select({
        assignmentId: assignments.id,
        proposalId: assignments.proposalId,
        personId: assignments.personId,
        isLead: assignments.isLead,
      })
      .from(assignments)
      .where(eq(assignments.panelId, panelId))
      .orderBy(asc(assignments.createdAt), asc(assignments.id));
  }

  /** One assignment, after the reviewer's save that may be under way. */
  async findAssignmentLocked(panelId: string, proposalId: string, personId: string): Promise<string | undefined> {
    const [row] = await this.database
      .current()
      .select({ assignmentId: assignments.id })
      .from(assignments)
      .where(
        and(
          eq(assignments.panelId, panelId),
          eq(assignments.proposalId, proposalId),
          eq(assignments.personId, personId),
        ),
      )
      .for('update');
    return row?.assignmentId;
  }

  async insertAssignments(
    rows: readonly { panelId: string; proposalId: string; personId: string; isLead: boolean }[],
  ): Promise<AssignmentRow[]> {
    if (rows.length === 0) return [];
    return this.database
      .current()
      .insert(assignments)
      .values([...rows])
      .returning({
        assignmentId: assignments.id,
        proposalId: assignments.proposalId,
        personId: assignments.personId,
        isLead: assignments.isLead,
      });
  }

  async clearOtherLeads(proposalId: string, personId: string): Promise<void> {
    await this.database
      .current()
      .update(assignments)
      .set({ isLead: false })
      .where(and(eq(assignments.proposalId, proposalId), ne(assignments.personId, personId)));
  }

  async setLead(assignmentIds: readonly string[]): Promise<void> {
    for (const assignmentId of assignmentIds) {
      await this.database.current().update(assignments).set({ isLead: true }).where(eq(assignments.id, assignmentId));
    }
  }

  async deleteAssignment(assignmentId: string): Promise<void> {
    await this.database.current().delete(assignments).where(eq(assignments.id, assignmentId));
  }

  async setFinal(panelId: string, personId: string, at: Date): Promise<void> {
    await this.database
      .current()
      .update(panels)
      .set({ finalisedAt: at, finalisedBy: personId })
      .where(and(eq(panels.id, panelId), isNull(panels.finalisedAt)));
  }
}
