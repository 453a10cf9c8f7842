import { randomBytes } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import type { Acknowledgement } from '@faintward/contracts/common';
import { Config } from '../../config/config.js';
import { DatabaseService } from '../../database/transaction.js';
import { JobsService } from '../../platform/jobs.js';
import { MailService } from '../../platform/mail/mail.service.js';
import { linkExpired } from './accounts.errors.js';
import { AccountsQueries } from './accounts.queries.js';
import { PasswordHasher } from './passwords.js';
import { resetMail } from './reset-mail.js';
import { SessionsQueries } from './sessions.queries.js';
import { hashOf } from './sessions.service.js';

export const PASSWORD_RESET_QUEUE = 'password-reset';

const LINK_MINUTES = 60;

@Injectable()
export class PasswordResetsService {
  constructor(
    private readonly config: Config,
    private readonly database: DatabaseService,
    private readonly queries: AccountsQueries,
    private readonly sessions: SessionsQueries,
    private readonly passwords: PasswordHasher,
    private readonly jobs: JobsService,
    private readonly mail: MailService,
  ) {
    jobs.register<{ email: string }>({ name: PASSWORD_RESET_QUEUE, handle: ({ email }) => this.prepare(email) });
  }

  /** Only stores the wish: whether somebody has this address shows neither in the answer nor in its time. */
  async request(email: string): Promise<Acknowledgement> {
    await this.jobs.enqueue(PASSWORD_RESET_QUEUE, { email });
    return { ok: true };
  }

  /** @throws {DomainError} `link-expired` when the token is unknown, used or too old */
  async complete(token: string, password: string): Promise<Acknowledgement> {
    const passwordHash = await this.passwords.hash(password);
    await this.database.transaction(async () => {
      const personId = await this.queries.takeResetToken(hashOf(token));
      if (personId === undefined) throw linkExpired();
      await this.queries.updatePerson(personId, { passwordHash });
      await this.queries.deleteResetTokens(personId);
      await this.sessions.endOthers(personId, undefined, 'password-changed');
    });
    return { ok: true };
  }

  private async prepare(email: string): Promise<void> {
    const person = await this.queries.findByEmail(email);
    if (person === undefined) return;
    const token = randomBytes(32).toString('base64url');
    await this.database.transaction(async () => {
      await this.queries.insertResetToken({
        tokenHash: hashOf(token),
        personId: person.id,
        expiresAt: new Date(Date.now() + LINK_MINUTES * 60_000),
      });
      await this.mail.send({
        to: person.email,
        ...resetMail({
          givenName: person.givenName,
          link: `${this.config.publicUrl}/password-reset/${token}`,
          minutes: LINK_MINUTES,
        }),
      });
    });
  }
}
