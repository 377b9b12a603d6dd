import { HttpStatus, Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import { InjectRepository } from '@nestjs/typeorm';
import { Repository } from 'typeorm';
import { hashOf, newSecret } from '../common/ids.js';
import { Problem } from '../common/problem.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { ACCESS_SECONDS, REFRESH_SECONDS, type SessionTokens } from './cookies.js';
import type { AccessClaims } from './jwt.strategy.js';
import { Session } from './session.entity.js';

/** A page that renews while another of the same browser just did still holds the token before; it is no thief. */
const GRACE_MS = 10_000;

const ended = () => new Problem(HttpStatus.UNAUTHORIZED, 'session-ended', 'The session is over. Sign in again.');

/** Sessions of browsers: short access tokens, and refresh tokens that are good for one use. */
@Injectable()
export class SessionsService {
  constructor(
    private readonly jwt: JwtService,
    @Inject(SETTINGS) private readonly settings: Settings,
    @InjectRepository(Session) private readonly sessions: Repository<Session>,
  ) {}

  async begin(userId: string, userAgent: string): Promise<SessionTokens> {
    const refresh = newSecret();
    const session = await this.sessions.save(
      this.sessions.create({
        userId,
        refreshHash: hashOf(refresh),
        previousHash: null,
        rotatedAt: new Date(),
        expiresAt: after(REFRESH_SECONDS),
        userAgent: userAgent.slice(0, 300),
      }),
    );
    return { access: await this.accessFor(session), refresh };
  }

  /** Swaps a refresh token for new ones. One that was used before ends the session: somebody else holds a copy. */
  async rotate(refresh: string): Promise<SessionTokens & { userId: string }> {
    const used = hashOf(refresh);
    const next = newSecret();
    const rotated = await this.sessions
      .createQueryBuilder()
      .update()
      .set({ refreshHash: hashOf(next), previousHash: used, rotatedAt: new Date(), expiresAt: after(REFRESH_SECONDS) })
      .where('refreshHash = :used AND expiresAt > :now', { used, now: new Date() })
      .execute();
    if (rotated.affected !== 1) {
      await this.endReused(used);
      throw ended();
    }
    const session = await this.sessions.findOneByOrFail({ refreshHash: hashOf(next) });
    return { access: await this.accessFor(session), refresh: next, userId: session.userId };
  }

  async end(id: string, userId: string): Promise<boolean> {
    return (await this.sessions.delete({ id, userId })).affected === 1;
  }

  async endByRefresh(refresh: string): Promise<void> {
    await this.sessions.delete({ refreshHash: hashOf(refresh) });
  }

  async endAll(userId: string): Promise<void> {
    await this.sessions.delete({ userId });
  }

  async endOthers(userId: string, keptId: string): Promise<void> {
    await this.sessions
      .createQueryBuilder()
      .delete()
      .where('userId = :userId AND id <> :keptId', { userId, keptId })
      .execute();
  }

  ofUser(userId: string): Promise<Session[]> {
    return this.sessions.find({ where: { userId }, order: { rotatedAt: 'DESC' } });
  }

  private async endReused(used: string): Promise<void> {
    const session = await this.sessions.findOneBy({ previousHash: used });
    if (session && Date.now() - session.rotatedAt.getTime() > GRACE_MS) await this.sessions.delete({ id: session.id });
  }

  private accessFor(session: Session): Promise<string> {
    const claims: AccessClaims = { sub: session.userId, sid: session.id };
    return this.jwt.signAsync(claims, { secret: this.settings.jwtSecret, expiresIn: ACCESS_SECONDS });
  }
}

function after(seconds: number): Date {
  return new Date(Date.now() + seconds * 1000);
}
