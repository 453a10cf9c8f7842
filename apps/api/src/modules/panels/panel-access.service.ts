import { Injectable } from '@nestjs/common';
import { DomainError, notFound } from '../../platform/domain-error.js';
import type { Actor } from '../../platform/actor.js';
import { type PanelRow, PanelsQueries } from './panels.queries.js';

/** Who may do what on a panel, and until when. Other subjects of the committee ask here. */
@Injectable()
export class PanelAccess {
  constructor(private readonly queries: PanelsQueries) {}

  /** @throws {DomainError} `not-found` for everybody who is not a chair of the panel, as if it did not exist */
  async getAsChair(actor: Actor, panelId: string): Promise<PanelRow> {
    const panel = await this.queries.findForMember(panelId, actor.personId, ['chair']);
    if (panel === undefined) throw notFound('panel');
    return panel;
  }

  async isChair(actor: Actor, panelId: string): Promise<boolean> {
    return (await this.queries.findForMember(panelId, actor.personId, ['chair'])) !== undefined;
  }

  /**
   * Makes sure that the panel is not final and stays so until the transaction ends.
   *
   * @throws {DomainError} `wrong-state`
   */
  async holdOpen(panelId: string): Promise<void> {
    const panel = await this.queries.lock(panelId, 'share');
    if (panel === undefined) throw notFound('panel');
    if (panel.finalisedAt !== null) throw panelIsFinal();
  }

  /**
   * Makes the panel final, after everything that is being written under it.
   *
   * @throws {DomainError} `wrong-state` when it is final already
   */
  async finalise(actor: Actor, panelId: string, at: Date): Promise<void> {
    const panel = await this.queries.lock(panelId, 'update');
    if (panel === undefined) throw notFound('panel');
    if (panel.finalisedAt !== null) throw panelIsFinal();
    await this.queries.setFinal(panelId, actor.personId, at);
  }
}

function panelIsFinal(): DomainError {
  return new DomainError(
    'wrong-state',
    'The ranking of this panel is final: assignments, scores and awards are closed.',
  );
}
