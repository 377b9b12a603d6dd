import { Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import type { Request } from 'express';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { ACCESS_COOKIE, cookieOf } from './cookies.js';
import type { AccessClaims } from './jwt.strategy.js';

/** Who is signed in on a route that is open to everybody. */
@Injectable()
export class SignedInUser {
  constructor(
    private readonly jwt: JwtService,
    @Inject(SETTINGS) private readonly settings: Settings,
  ) {}

  async of(request: Request): Promise<string | undefined> {
    const token = cookieOf(request, ACCESS_COOKIE);
    if (!token) return undefined;
    try {
      return (await this.jwt.verifyAsync<AccessClaims>(token, { secret: this.settings.jwtSecret })).sub;
    } catch {
      return undefined;
    }
  }
}
