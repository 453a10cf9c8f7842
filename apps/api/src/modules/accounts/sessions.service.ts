import { createHash, randomBytes } from 'node:crypto';
import { Injectable, Logger } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type { Me, SignInRequest } from '@faintward/contracts/accounts';
import { DatabaseService } from '../../database/transaction.js';
import type { AccessClaims } from '../../platform/jwt.strategy.js';
import { sessionEnded, wrongCredentials } from './accounts.errors.js';
import { AccountsQueries } from './accounts.queries.js';
import { MeReadModel } from './me.read-model.js';
import { PasswordHasher } from './passwords.js';
import { SessionsQueries } from './sessions.queries.js';

/** An access token is short, because it is believed without asking for the password again. */
export const ACCESS_SECONDS = 15 * 60;
/** A session ends when it was not used for this long. */
export const REFRESH_SECONDS = 30 * 24 * 60 * 60;
/**
 * Two windows of one browser may renew with the same token at the same moment. Within this time a used token renews once
 * more without being taken for a stolen one; the price is that a thief who is that quick is not noticed by reuse.
 */
export const REUSE_GRACE_SECONDS = 10;

export interface SessionTokens {
  accessToken: string;
  refreshToken: string;
}

@Injectable()
export class SessionsService {
  private readonly logger = new Logger('Sessions');

  constructor(
    private readonly database: DatabaseService,
    private readonly queries: SessionsQueries,
    private readonly accounts: AccountsQueries,
    private readonly passwords: PasswordHasher,
    private readonly readModel: MeReadModel,
    private readonly jwt: JwtService,
  ) {}

  /** @throws {DomainError} `wrong-credentials`, for an unknown address after the same time as for a wrong password */
  async signIn(request: SignInRequest): Promise<{ me: Me; tokens: SessionTokens }> {
    const person = await this.accounts.findByEmail(request.email);
    const isRight = await this.passwords.fits(request.password, person?.passwordHash);
    if (person === undefined || !isRight) throw wrongCredentials();
    return this.database.transaction(async () => {
      await this.accounts.recordSignIn(person.id);
      return { tokens: await this.open(person.id), me: await this.readModel.getMe(person.id) };
    });
  }

  async open(personId: string): Promise<SessionTokens> {
    return this.issue(personId, await this.queries.insertSession(personId));
  }

  /**
   * Renews a session: the refresh token is used up and replaced. A token that comes a second time was copied by somebody:
   * then the whole session ends, for the thief and for the person, who signs in again.
   */
  async refresh(refreshToken: string | undefined): Promise<{ me: Me; tokens: SessionTokens }> {
    if (refreshToken === undefined || refreshToken === '') throw sessionEnded();
    const tokenHash = hashOf(refreshToken);
    // Outside of a transaction: ending the session below has to stay although this request fails.
    const isFirstUse = await this.queries.useRefreshToken(tokenHash);
    const token = await this.queries.findRefreshToken(tokenHash);
    if (token === undefined || token.hasEnded || token.hasExpired) throw sessionEnded();
    if (!isFirstUse && (token.usedSecondsAgo === null || token.usedSecondsAgo > REUSE_GRACE_SECONDS)) {
      await this.queries.end(token.sessionId, 'token-reused');
      this.logger.warn(`Session ${token.sessionId} ended: its refresh token was used twice.`);
      throw sessionEnded();
    }
    return {
      tokens: await this.issue(token.personId, token.sessionId),
      me: await this.readModel.getMe(token.personId),
    };
  }

  /** Ends the session of the refresh token, or of the signed-in person; nothing to end is as good as ended. */
  async signOut(refreshToken: string | undefined, sessionId: string | undefined): Promise<void> {
    const token = refreshToken === undefined ? undefined : await this.queries.findRefreshToken(hashOf(refreshToken));
    for (const id of new Set([token?.sessionId, sessionId])) {
      if (id !== undefined) await this.queries.end(id, 'signed-out');
    }
  }

  private async issue(personId: string, sessionId: string): Promise<SessionTokens> {
    const refreshToken = randomBytes(32).toString('base64url');
    await this.queries.insertRefreshToken({
      tokenHash: hashOf(refreshToken),
      sessionId,
      expiresAt: new Date(Date.now() + REFRESH_SECONDS * 1000),
    });
    const claims: AccessClaims = { sub: personId, sid: sessionId };
    return { accessToken: await this.jwt.signAsync(claims, { expiresIn: ACCESS_SECONDS }), refreshToken };
  }
}

/** A fast hash is enough: the token is 256 random bits. */
export function hashOf(token: string): string {
  return createHash('sha256').update(token).digest('base64url');
}
