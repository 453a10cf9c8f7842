import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import { DomainError } from './domain-error.js';

/** The signed-in person, as every service receives it. */
export interface Actor {
  readonly personId: string;
  readonly sessionId: string;
  readonly email: string;
  readonly isStaff: boolean;
  readonly isAdministrator: boolean;
}

function actorOf(context: ExecutionContext): Actor | undefined {
  return context.switchToHttp().getRequest<Request>().user as Actor | undefined;
}

/** The signed-in person; on routes that need one. */
export const CurrentPerson = createParamDecorator((_: unknown, context: ExecutionContext): Actor => {
  const actor = actorOf(context);
  if (actor === undefined) throw new DomainError('not-signed-in', 'Please sign in first.');
  return actor;
});

/** The signed-in person if there is one; on public routes. */
export const OptionalPerson = createParamDecorator((_: unknown, context: ExecutionContext) => actorOf(context));
