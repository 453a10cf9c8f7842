import type { AddressInfo } from 'node:net';
import { Injectable, Logger, type OnApplicationShutdown } from '@nestjs/common';
import { type AddressObject, simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import { MailQueries } from './mail.queries.js';

/**
 * Stands in for a mail server when none is configured: real SMTP on a loopback port of the system's choice, so that the
 * same client code runs, and every message is kept where the mailbox page shows it. Nothing leaves the machine.
 */
@Injectable()
export class LocalMailServer implements OnApplicationShutdown {
  private readonly logger = new Logger('LocalMailServer');
  private server: SMTPServer | undefined;
  private starting: Promise<string> | undefined;

  constructor(private readonly queries: MailQueries) {}

  /** Starts at first use. */
  url(): Promise<string> {
    this.starting ??= this.start();
    return this.starting;
  }

  private start(): Promise<string> {
    const server = new SMTPServer({
      authOptional: true,
      disabledCommands: ['AUTH', 'STARTTLS'],
      size: 5 * 1024 * 1024,
      onData: (stream, _session, done) => {
        simpleParser(stream)
          .then((mail) =>
            this.queries.insertReceived({
              to: addressesOf(mail.to),
              subject: mail.subject ?? '',
              text: mail.text ?? '',
              html: mail.html || '',
            }),
          )
          .then(
            () => done(),
            (error: unknown) => done(error instanceof Error ? error : new Error('could not be stored')),
          );
      },
    });
    server.on('error', (error) => this.logger.warn(`Local mail: ${error.message}`));
    this.server = server;
    return new Promise((resolve, reject) => {
      server.server.once('error', reject);
      server.listen(0, '127.0.0.1', () => resolve(`smtp://127.0.0.1:${(server.server.address() as AddressInfo).port}`));
    });
  }

  async onApplicationShutdown(): Promise<void> {
    const { server } = this;
    if (server !== undefined) await new Promise<void>((resolve) => server.close(() => resolve()));
  }
}

function addressesOf(to: AddressObject | AddressObject[] | undefined): string {
  const list = to === undefined ? [] : Array.isArray(to) ? to : [to];
  return list.flatMap((entry) => entry.value.map(({ address }) => address ?? '')).join(', ');
}
