import { Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import { Id } from '@faintward/contracts/common';
import type { Request } from 'express';
import { Strategy } from 'passport-jwt';
import { z } from 'zod';
import { Config } from '../config/config.js';
import type { Actor } from './actor.js';
import { ActorQueries } from './actor.queries.js';

export const ACCESS_COOKIE = 'faintward_access';

/** What an access token says. Everything else about the person is read at each request, so that a role taken away is gone. */
export const AccessClaims = z.object({ sub: Id, sid: Id });
export type AccessClaims = z.infer<typeof AccessClaims>;

@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy, 'jwt') {
  constructor(
    config: Config,
    private readonly actors: ActorQueries,
  ) {
    super({
      jwtFromRequest: (request: Request) => {
        const token = (request.cookies as Record<string, unknown> | undefined)?.[ACCESS_COOKIE];
        return typeof token === 'string' ? token : null;
      },
      secretOrKey: config.sessionSecret,
      algorithms: ['HS256'],
    });
  }

  /** The secret may be shared with another program, whose tokens say something else. */
  async validate(payload: unknown): Promise<Actor | false> {
    const claims = AccessClaims.safeParse(payload);
    if (!claims.success) return false;
    return (await this.actors.findActor(claims.data.sub, claims.data.sid)) ?? false;
  }
}
