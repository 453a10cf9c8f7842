import type { PanelRole } from '@faintward/contracts/permissions';
import { Injectable } from '@nestjs/common';
import { asc, desc, eq } from 'drizzle-orm';
import { panelMembers, panels } from '../../database/schema/panels.js';
import { semesters } from '../../database/schema/semesters.js';
import { DatabaseService } from '../../database/transaction.js';

export interface PanelOfSemester {
  panelId: string;
  name: string;
  isFinal: boolean;
}

export interface PanelOfPerson {
  panelId: string;
  panelName: string;
  semesterId: string;
  semesterName: string;
  role: PanelRole;
}

/** What other subjects read of panels: their names, and who sits on them. Nothing about proposals. */
@Injectable()
export class PanelsReadModel {
  constructor(private readonly database: DatabaseService) {}

  /** Panels of a semester in the order the observatory gave them. */
  async listOfSemester(semesterId: string): Promise<PanelOfSemester[]> {
    const rows = await this.database
      .current()
      .select({ panelId: panels.id, name: panels.name, finalisedAt: panels.finalisedAt })
      .from(panels)
      .where(eq(panels.semesterId, semesterId))
      .orderBy(asc(panels.position), asc(panels.name));
    return rows.map(({ finalisedAt, ...panel }) => ({ ...panel, isFinal: finalisedAt !== null }));
  }

  /** Panels a person sits on, those of the newest semester first. */
  async listOfPerson(personId: string): Promise<PanelOfPerson[]> {
    return this.database
      .current()
      .select({
        panelId: panels.id,
        panelName: panels.name,
        semesterId: semesters.id,
        semesterName: semesters.name,
        role: panelMembers.role,
      })
      .from(panelMembers)
      .innerJoin(panels, eq(panels.id, panelMembers.panelId))
      .innerJoin(semesters, eq(semesters.id, panels.semesterId))
      .where(eq(panelMembers.personId, personId))
      .orderBy(desc(semesters.startsOn), asc(panels.position), asc(panels.name));
  }

  async findById(
    panelId: string,
  ): Promise<{ panelId: string; name: string; semesterId: string; finalisedAt: Date | null } | undefined> {
    const [panel] = await this.database
      .current()
      .select({
        panelId: panels.id,
        name: panels.name,
        semesterId: panels.semesterId,
        finalisedAt: panels.finalisedAt,
      })
      .from(panels)
      .where(eq(panels.id, panelId));
    return panel;
  }
}
