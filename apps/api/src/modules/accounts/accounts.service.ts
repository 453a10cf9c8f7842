import { Injectable } from '@nestjs/common';
import type { DemoPeople, Me, PasswordChange, ProfilePatch, SignUpRequest } from '@faintward/contracts/accounts';
import { DatabaseService } from '../../database/transaction.js';
import type { Actor } from '../../platform/actor.js';
import { onConstraint } from '../../platform/database-errors.js';
import { DemoMode } from '../../platform/demo-mode.js';
import { notFound } from '../../platform/domain-error.js';
import { IdempotencyService } from '../../platform/idempotency.js';
import { JobsService } from '../../platform/jobs.js';
import { emailTaken, sessionEnded, unknownInstitution, wrongCurrentPassword } from './accounts.errors.js';
import { AccountsQueries } from './accounts.queries.js';
import { MeReadModel } from './me.read-model.js';
import { PasswordHasher } from './passwords.js';
import { SessionsQueries } from './sessions.queries.js';
import { SessionsService, type SessionTokens } from './sessions.service.js';

@Injectable()
export class AccountsService {
  constructor(
    private readonly database: DatabaseService,
    private readonly queries: AccountsQueries,
    private readonly sessionsQueries: SessionsQueries,
    private readonly sessions: SessionsService,
    private readonly passwords: PasswordHasher,
    private readonly readModel: MeReadModel,
    private readonly demoMode: DemoMode,
    jobs: JobsService,
    idempotency: IdempotencyService,
  ) {
    jobs.register({
      name: 'account-housekeeping',
      cron: '17 3 * * *',
      handle: async () => {
        await sessionsQueries.deleteExpired();
        await queries.deleteExpiredResetTokens();
        await idempotency.deleteExpired();
      },
    });
  }

  /** @throws {DomainError} `already-exists` on the field `email` */
  async signUp(request: SignUpRequest): Promise<{ me: Me; tokens: SessionTokens }> {
    const { password, ...person } = request;
    const passwordHash = await this.passwords.hash(password);
    return this.database.transaction(async () => {
      const personId = await onConstraint(
        {
          people_email_unique: emailTaken,
          people_institution_id_institutions_id_fk: unknownInstitution,
        },
        () => this.queries.insertPerson({ ...person, passwordHash, lastSignInAt: new Date() }),
      );
      return { tokens: await this.sessions.open(personId), me: await this.readModel.getMe(personId) };
    });
  }

  getMe(actor: Actor): Promise<Me> {
    return this.readModel.getMe(actor.personId);
  }

  async updateProfile(actor: Actor, patch: ProfilePatch): Promise<Me> {
    await onConstraint({ people_institution_id_institutions_id_fk: unknownInstitution }, () =>
      this.queries.updatePerson(actor.personId, patch),
    );
    return this.readModel.getMe(actor.personId);
  }

  /** Ends every other session of the person: whoever knew the old password is out. */
  async changePassword(actor: Actor, change: PasswordChange): Promise<Me> {
    const profile = await this.queries.findProfile(actor.personId);
    if (profile === undefined) throw sessionEnded();
    if (!(await this.passwords.fits(change.currentPassword, profile.passwordHash))) throw wrongCurrentPassword();
    const passwordHash = await this.passwords.hash(change.newPassword);
    await this.database.transaction(async () => {
      await this.queries.updatePerson(actor.personId, { passwordHash });
      await this.queries.deleteResetTokens(actor.personId);
      await this.sessionsQueries.endOthers(actor.personId, actor.sessionId, 'password-changed');
    });
    return this.readModel.getMe(actor.personId);
  }

  /** @throws {DomainError} `not-found` outside of demo mode */
  async listDemoPeople(): Promise<DemoPeople> {
    const password = await this.demoMode.findPassword();
    if (password === undefined) throw notFound('page');
    const rows = await this.queries.listDemoPeople();
    return {
      password,
      people: rows.map((row) => ({
        email: row.email,
        name: `${row.givenName} ${row.familyName}`,
        institutionName: row.institutionName,
        part: row.part ?? '',
      })),
    };
  }
}
