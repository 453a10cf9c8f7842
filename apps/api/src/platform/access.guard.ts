import { type ExecutionContext, Injectable } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuthGuard } from '@nestjs/passport';
import type { Request } from 'express';
import { ACCESS_RULE, type AccessRule, DECIDED_ON } from './access.js';
import type { Actor } from './actor.js';
import { DomainError, forbidden } from './domain-error.js';

/** Stands before every route. A route that says nothing about access is closed to everybody. */
@Injectable()
export class AccessGuard extends AuthGuard('jwt') {
  constructor(private readonly reflector: Reflector) {
    super();
  }

  override async canActivate(context: ExecutionContext): Promise<boolean> {
    const rule = this.ruleOf(context);
    if (rule === undefined) throw forbidden('This route is closed.');
    await super.canActivate(context);
    if (rule.kind !== 'permission') return true;
    const actor = context.switchToHttp().getRequest<Request>().user as Actor;
    const decidedOn = DECIDED_ON[rule.permission];
    if (decidedOn === 'staff' && !actor.isStaff) throw forbidden('This is for the observatory’s staff.');
    if (decidedOn === 'administrator' && !actor.isAdministrator) throw forbidden('This is for administrators.');
    return true;
  }

  /** Called by passport with what the token gave; `info` tells why there is nobody. */
  override handleRequest<Person>(
    error: unknown,
    person: Person | false,
    info: unknown,
    context: ExecutionContext,
  ): Person {
    if (error) throw error;
    if (person) return person;
    // On a public route nobody is somebody to serve; passport's typing has no word for that.
    if (this.ruleOf(context)?.kind === 'public') return undefined as Person;
    const hasToken = !(info instanceof Error && info.message === 'No auth token');
    throw hasToken
      ? new DomainError('session-expired', 'Your session has ended. Sign in again; what you typed is still here.')
      : new DomainError('not-signed-in', 'Please sign in first.');
  }

  private ruleOf(context: ExecutionContext): AccessRule | undefined {
    return this.reflector.getAllAndOverride<AccessRule | undefined>(ACCESS_RULE, [
      context.getHandler(),
      context.getClass(),
    ]);
  }
}
