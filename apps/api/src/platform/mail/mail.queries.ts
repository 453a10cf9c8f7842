import { Injectable } from '@nestjs/common';
import { count, desc, eq, sql } from 'drizzle-orm';
import { mailboxMessages, outgoingMail } from '../../database/schema/accounts.js';
import { DatabaseService } from '../../database/transaction.js';
import type { MailMessage } from './mail.service.js';

@Injectable()
export class MailQueries {
  constructor(private readonly database: DatabaseService) {}

  async insertOutgoing(message: MailMessage): Promise<string> {
    const [row] = await this.database
      .current()
      .insert(outgoingMail)
      .values({ toAddress: message.to, subject: message.subject, textBody: message.text, htmlBody: message.html })
      .returning({ id: outgoingMail.id });
    if (row === undefined) throw new Error('An insert returned no row.');
    return row.id;
  }

  async findOutgoing(mailId: string) {
    const [row] = await this.database.current().select().from(outgoingMail).where(eq(outgoingMail.id, mailId));
    return row;
  }

  async recordSent(mailId: string): Promise<void> {
    await this.database
      .current()
      .update(outgoingMail)
      .set({ state: 'sent', sentAt: new Date(), attemptCount: sql`${outgoingMail.attemptCount} + 1`, lastError: null })
      .where(eq(outgoingMail.id, mailId));
  }

  async recordFailure(mailId: string, reason: string, attemptLimit: number): Promise<void> {
    await this.database
      .current()
      .update(outgoingMail)
      .set({
        state: sql`case when ${outgoingMail.attemptCount} + 1 >= ${attemptLimit} then 'failed' else 'waiting' end`,
        attemptCount: sql`${outgoingMail.attemptCount} + 1`,
        lastError: reason,
      })
      .where(eq(outgoingMail.id, mailId));
  }

  async listOutgoing(window: { limit: number; offset: number }) {
    const db = this.database.current();
    const rows = await db
      .select()
      .from(outgoingMail)
      .orderBy(desc(outgoingMail.createdAt), outgoingMail.id)
      .limit(window.limit)
      .offset(window.offset);
    const [total] = await db.select({ rowCount: count() }).from(outgoingMail);
    return { rows, rowCount: total?.rowCount ?? 0 };
  }

  async insertReceived(message: MailMessage): Promise<void> {
    await this.database
      .current()
      .insert(mailboxMessages)
      .values({ toAddress: message.to, subject: message.subject, textBody: message.text, htmlBody: message.html });
  }

  async listReceived(limit: number) {
    return this.database
      .current()
      .select()
      .from(mailboxMessages)
      .orderBy(desc(mailboxMessages.receivedAt), mailboxMessages.id)
      .limit(limit);
  }
}
