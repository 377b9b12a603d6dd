import { Inject, Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import { InjectRepository } from '@nestjs/typeorm';
import type { Request } from 'express';
import { ExtractJwt, Strategy } from 'passport-jwt';
import { Repository } from 'typeorm';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { ACCESS_COOKIE, cookieOf } from './cookies.js';
import type { Principal } from './principal.js';
import { Session } from './session.entity.js';

/** What an access token says. */
export interface AccessClaims {
  sub: string;
  sid: string;
}

/** Reads the access token from its cookie. The session is looked up too, so that ending it takes effect at once. */
@Injectable()
export class JwtStrategy extends PassportStrategy(Strategy) {
  constructor(
    @Inject(SETTINGS) settings: Settings,
    @InjectRepository(Session) private readonly sessions: Repository<Session>,
  ) {
    super({
      jwtFromRequest: ExtractJwt.fromExtractors([(request: Request) => cookieOf(request, ACCESS_COOKIE) ?? null]),
      secretOrKey: settings.jwtSecret,
    });
  }

  async validate({ sub, sid }: AccessClaims): Promise<Principal | false> {
    const session = await this.sessions.findOneBy({ id: sid, userId: sub });
    return session && session.expiresAt > new Date() ? { userId: sub, sessionId: sid } : false;
  }
}
