import { Injectable } from '@nestjs/common';
import { createTransport, type Transporter } from 'nodemailer';
import { Config } from '../../config/config.js';
import { DatabaseService } from '../../database/transaction.js';
import { JobsService } from '../jobs.js';
import { LocalMailServer } from './local-mail-server.js';
import { MailQueries } from './mail.queries.js';

export interface MailMessage {
  to: string;
  subject: string;
  text: string;
  html: string;
}

export const MAIL_QUEUE = 'mail';

/** Attempts before a message counts as failed: with doubling pauses from ten seconds, about ten minutes. */
const ATTEMPT_LIMIT = 6;

/**
 * Sends mail durably: the message is stored in the transaction that is its reason, and a job hands it to the mail server.
 * After a crash between the server's acceptance and the record of it, a message may arrive twice; it is never lost.
 */
@Injectable()
export class MailService {
  private transporter: Transporter | undefined;

  constructor(
    private readonly config: Config,
    private readonly database: DatabaseService,
    private readonly jobs: JobsService,
    private readonly queries: MailQueries,
    private readonly localServer: LocalMailServer,
  ) {
    jobs.register<{ mailId: string }>({
      name: MAIL_QUEUE,
      retryLimit: ATTEMPT_LIMIT - 1,
      handle: ({ mailId }) => this.deliver(mailId),
    });
  }

  async send(message: MailMessage): Promise<void> {
    await this.database.transaction(async () => {
      const mailId = await this.queries.insertOutgoing(message);
      await this.jobs.enqueue(MAIL_QUEUE, { mailId });
    });
  }

  private async deliver(mailId: string): Promise<void> {
    const mail = await this.queries.findOutgoing(mailId);
    if (mail === undefined || mail.state === 'sent') return;
    try {
      const transporter = await this.openTransporter();
      await transporter.sendMail({
        from: this.config.mailFrom,
        to: mail.toAddress,
        subject: mail.subject,
        text: mail.textBody,
        html: mail.htmlBody,
        messageId: `<${mail.id}@faintward>`,
      });
    } catch (error) {
      const reason = error instanceof Error ? error.message : String(error);
      await this.queries.recordFailure(mailId, reason.slice(0, 500), ATTEMPT_LIMIT);
      throw error;
    }
    await this.queries.recordSent(mailId);
  }

  private async openTransporter(): Promise<Transporter> {
    this.transporter ??= createTransport({
      url: this.config.smtpUrl ?? (await this.localServer.url()),
      // Both guard against a mail server that accepts a connection and then says nothing.
      connectionTimeout: 10_000,
      socketTimeout: 30_000,
    });
    return this.transporter;
  }
}
