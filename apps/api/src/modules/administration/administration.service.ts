import { Injectable } from '@nestjs/common';
import type { MailboxMessage } from '@faintward/contracts/accounts';
import type { ListQuery } from '@faintward/contracts/common';
import type { AuditEntry, OutgoingMailEntry } from '@faintward/contracts/people';
import type { Actor } from '../../platform/actor.js';
import { DemoMode } from '../../platform/demo-mode.js';
import { notFound } from '../../platform/domain-error.js';
import { MailQueries } from '../../platform/mail/mail.queries.js';
import { pageWindow, toPage } from '../../platform/pagination.js';
import { AdministrationReadModel } from './administration.read-model.js';

const MAILBOX_LENGTH = 200;

@Injectable()
export class AdministrationService {
  constructor(
    private readonly readModel: AdministrationReadModel,
    private readonly mail: MailQueries,
    private readonly demoMode: DemoMode,
  ) {}

  async listChanges(query: ListQuery) {
    const { rows, rowCount } = await this.readModel.listChanges(query);
    const entries = rows.map((row): AuditEntry => ({
      changeId: row.id,
      at: row.at.toISOString(),
      personName: row.personName,
      subject: row.subject,
      subjectId: row.subjectId,
      action: row.action,
      summary: summaryOf(row),
    }));
    return toPage(entries, rowCount, query);
  }

  async listMail(query: ListQuery) {
    const { rows, rowCount } = await this.mail.listOutgoing(pageWindow(query));
    const entries = rows.map((row): OutgoingMailEntry => ({
      mailId: row.id,
      createdAt: row.createdAt.toISOString(),
      sentAt: row.sentAt?.toISOString() ?? null,
      to: row.toAddress,
      subject: row.subject,
      state: row.state,
      attempts: row.attemptCount,
      lastError: row.lastError,
    }));
    return toPage(entries, rowCount, query);
  }

  /** What the local mail fake caught: open in the demo, whose people are invented; else for administrators. */
  async listMailbox(actor: Actor | undefined): Promise<{ rows: MailboxMessage[] }> {
    const isOpen = actor?.isAdministrator === true || (await this.demoMode.findPassword()) !== undefined;
    if (!isOpen) throw notFound('page');
    const rows = await this.mail.listReceived(MAILBOX_LENGTH);
    return {
      rows: rows.map((row) => ({
        messageId: row.id,
        receivedAt: row.receivedAt.toISOString(),
        to: row.toAddress,
        subject: row.subject,
        text: row.textBody,
      })),
    };
  }
}

function summaryOf(row: {
  action: string;
  scope: string;
  fieldNames: string[];
  roles: Record<string, { after: unknown }> | null;
  roleHolder: string | null;
}): string {
  if (row.roles !== null) {
    const roles = Object.entries(row.roles).map(
      ([name, { after }]) => `${ROLE_NAMES[name] ?? name} ${after === true ? 'given' : 'taken'}`,
    );
    return `${row.roleHolder ?? ''}: ${roles.join(', ')}`;
  }
  return row.fieldNames.length === 0
    ? `${row.scope}: ${row.action}`
    : `${row.scope}: ${row.action} ${row.fieldNames.join(', ')}`;
}

const ROLE_NAMES: Readonly<Record<string, string>> = { isStaff: 'staff role', isAdministrator: 'administrator role' };
