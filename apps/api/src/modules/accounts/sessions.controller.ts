import { Body, Controller, Delete, Get, Post, Req, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import { Me, SignInRequest } from '@faintward/contracts/accounts';
import type { Request, Response } from 'express';
import { Config } from '../../config/config.js';
import { Public, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson, OptionalPerson } from '../../platform/actor.js';
import { Answers, AnswersNothing } from '../../platform/answers.js';
import { RateLimit } from '../../platform/rate-limits.js';
import { AccountsService } from './accounts.service.js';
import { clearSessionCookies, refreshTokenOf, setSessionCookies } from './session-cookies.js';
import { SessionsService } from './sessions.service.js';

@ApiTags('accounts')
@Controller('session')
export class SessionsController {
  constructor(
    private readonly sessions: SessionsService,
    private readonly accounts: AccountsService,
    private readonly config: Config,
  ) {}

  @Post()
  @Public()
  @RateLimit('credentials')
  @Answers(Me, { status: 200, description: 'Signed in; both tokens are set as cookies.' })
  async signIn(
    @Body({ schema: SignInRequest }) request: SignInRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<Me> {
    const { me, tokens } = await this.sessions.signIn(request);
    setSessionCookies(response, this.config, tokens);
    return me;
  }

  @Get()
  @SignedIn()
  @Answers(Me)
  get(@CurrentPerson() actor: Actor): Promise<Me> {
    return this.accounts.getMe(actor);
  }

  @Post('refresh')
  @Public()
  @Answers(Me, { status: 200, description: 'Renewed; the refresh cookie is replaced.' })
  async refresh(@Req() request: Request, @Res({ passthrough: true }) response: Response): Promise<Me> {
    try {
      const { me, tokens } = await this.sessions.refresh(refreshTokenOf(request));
      setSessionCookies(response, this.config, tokens);
      return me;
    } catch (error) {
      // A refused token stays refused: without this the web would ask again on every page.
      clearSessionCookies(response, this.config);
      throw error;
    }
  }

  /** Public, because signing out must also work when the access token has just expired. */
  @Delete()
  @Public()
  @AnswersNothing()
  async signOut(
    @OptionalPerson() actor: Actor | undefined,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<void> {
    await this.sessions.signOut(refreshTokenOf(request), actor?.sessionId);
    clearSessionCookies(response, this.config);
  }
}
