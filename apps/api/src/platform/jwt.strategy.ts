import { Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import type { Request } from 'express';
import { Strategy } from 'passport-jwt';
import { Config } from '../config/config.js';
import type { Actor } from './actor.js';
import { ActorQueries } from './actor.queries.js';

export const ACCESS_COOKIE = 'faintward_access';

/** What an access token says. Everything else about the person is read at each request, so that a role taken away is gone. */
export interface AccessClaims {
  sub: string;
  sid: string;
}

@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy, 'jwt') {
  constructor(
    config: Config,
    private readonly actors: ActorQueries,
  ) {
    super({
      jwtFromRequest: (request: Request) =>
        (request.cookies as Record<string, string> | undefined)?.[ACCESS_COOKIE] ?? null,
      secretOrKey: config.sessionSecret,
      algorithms: ['HS256'],
    });
  }

  async validate(claims: AccessClaims): Promise<Actor | false> {
    return (await this.actors.findActor(claims.sub, claims.sid)) ?? false;
  }
}
