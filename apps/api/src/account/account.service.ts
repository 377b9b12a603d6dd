import { Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { Repository } from 'typeorm';
import { hashPassword, matchesPassword } from '../auth/passwords.js';
import type { Principal } from '../auth/principal.js';
import { SessionsService } from '../auth/sessions.service.js';
import { notFound, refusedFields } from '../common/problem.js';
import type { AccountDto, SessionInfoDto } from './account.dto.js';
import { User } from './user.entity.js';

@Injectable()
export class AccountService {
  constructor(
    @InjectRepository(User) private readonly users: Repository<User>,
    private readonly sessions: SessionsService,
  ) {}

  async read(userId: string): Promise<AccountDto> {
    const { id, name, email } = await this.users.findOneByOrFail({ id: userId });
    return { id, name, email };
  }

  async rename(userId: string, name: string): Promise<AccountDto> {
    await this.users.update({ id: userId }, { name });
    return this.read(userId);
  }

  /** Changes the password and ends all other sessions. */
  async changePassword({ userId, sessionId }: Principal, current: string, next: string): Promise<void> {
    const user = await this.users.findOneByOrFail({ id: userId });
    if (!(await matchesPassword(current, user.passwordHash))) {
      throw refusedFields([{ path: 'current', message: 'is not your password' }]);
    }
    await this.users.update({ id: userId }, { passwordHash: await hashPassword(next) });
    await this.sessions.endOthers(userId, sessionId ?? '');
  }

  async listSessions({ userId, sessionId }: Principal): Promise<SessionInfoDto[]> {
    return (await this.sessions.ofUser(userId)).map((session) => ({
      id: session.id,
      createdAt: session.createdAt.toISOString(),
      lastUsedAt: session.rotatedAt.toISOString(),
      userAgent: session.userAgent,
      current: session.id === sessionId,
    }));
  }

  async endSession(userId: string, id: string): Promise<void> {
    if (!(await this.sessions.end(id, userId))) throw notFound('session');
  }

  /** A new account; the address must be new. */
  async create(name: string, email: string, password: string): Promise<User> {
    const passwordHash = await hashPassword(password);
    return this.users.save(this.users.create({ name, email: email.toLowerCase(), passwordHash }));
  }

  findByEmail(email: string): Promise<User | null> {
    return this.users.findOneBy({ email: email.toLowerCase() });
  }
}
