import { Body, Controller, Get, Param, Patch, Post, Put, Res } from '@nestjs/common';
import { ApiTags } from '@nestjs/swagger';
import {
  DemoPeople,
  Me,
  PasswordChange,
  PasswordReset,
  PasswordResetRequest,
  ProfilePatch,
  SignUpRequest,
} from '@faintward/contracts/accounts';
import { Acknowledgement } from '@faintward/contracts/common';
import type { Response } from 'express';
import { z } from 'zod';
import { Config } from '../../config/config.js';
import { Public, SignedIn } from '../../platform/access.js';
import { type Actor, CurrentPerson } from '../../platform/actor.js';
import { Answers } from '../../platform/answers.js';
import { RateLimit } from '../../platform/rate-limits.js';
import { AccountsService } from './accounts.service.js';
import { PasswordResetsService } from './password-resets.service.js';
import { setSessionCookies } from './session-cookies.js';

@ApiTags('accounts')
@Controller()
export class AccountsController {
  constructor(
    private readonly accounts: AccountsService,
    private readonly resets: PasswordResetsService,
    private readonly config: Config,
  ) {}

  @Post('accounts')
  @Public()
  @RateLimit('signUp')
  @Answers(Me, { status: 201, description: 'The account exists and is signed in.' })
  async signUp(
    @Body({ schema: SignUpRequest }) request: SignUpRequest,
    @Res({ passthrough: true }) response: Response,
  ): Promise<Me> {
    const { me, tokens } = await this.accounts.signUp(request);
    setSessionCookies(response, this.config, tokens);
    return me;
  }

  @Post('password-resets')
  @Public()
  @RateLimit('passwordReset')
  @Answers(Acknowledgement, { status: 202, description: 'Answered alike whether or not there is such an account.' })
  requestReset(@Body({ schema: PasswordResetRequest }) request: PasswordResetRequest): Promise<Acknowledgement> {
    return this.resets.request(request.email);
  }

  @Put('password-resets/:token')
  @Public()
  @RateLimit('passwordReset')
  @Answers(Acknowledgement, { description: 'The password is set; every session of the person has ended.' })
  reset(
    @Param('token', { schema: z.string().min(1).max(200) }) token: string,
    @Body({ schema: PasswordReset }) request: PasswordReset,
  ): Promise<Acknowledgement> {
    return this.resets.complete(token, request.password);
  }

  @Get('profile')
  @SignedIn()
  @Answers(Me)
  getProfile(@CurrentPerson() actor: Actor): Promise<Me> {
    return this.accounts.getMe(actor);
  }

  @Patch('profile')
  @SignedIn()
  @Answers(Me)
  updateProfile(@CurrentPerson() actor: Actor, @Body({ schema: ProfilePatch }) patch: ProfilePatch): Promise<Me> {
    return this.accounts.updateProfile(actor, patch);
  }

  @Put('profile/password')
  @SignedIn()
  @RateLimit('passwordReset')
  @Answers(Me, { description: 'Changed; all other sessions have ended.' })
  changePassword(@CurrentPerson() actor: Actor, @Body({ schema: PasswordChange }) change: PasswordChange): Promise<Me> {
    return this.accounts.changePassword(actor, change);
  }

  @Get('demo-people')
  @Public()
  @Answers(DemoPeople, { description: 'Only in the demo scenario.' })
  listDemoPeople(): Promise<DemoPeople> {
    return this.accounts.listDemoPeople();
  }
}
