import { HttpStatus, Inject, Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { Repository } from 'typeorm';
import { User } from '../account/user.entity.js';
import { hashOf, newSecret } from '../common/ids.js';
import { Problem, refusedFields } from '../common/problem.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { MailService } from '../mail/mail.service.js';
import { MembersService } from '../members/members.service.js';
import type { SessionDto } from './auth.dto.js';
import { PasswordReset } from './password-reset.entity.js';
import { hashPassword, matchesPassword } from './passwords.js';
import { SessionsService } from './sessions.service.js';

const RESET_MINUTES = 60;

@Injectable()
export class AuthService {
  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    @InjectRepository(User) private readonly users: Repository<User>,
    @InjectRepository(PasswordReset) private readonly resets: Repository<PasswordReset>,
    private readonly sessions: SessionsService,
    private readonly members: MembersService,
    private readonly mail: MailService,
  ) {}

  /** The account of these credentials. Unknown addresses and wrong passwords are told apart neither by words nor by time. */
  async check(email: string, password: string): Promise<User> {
    const user = await this.users.findOneBy({ email: email.toLowerCase() });
    const matches = await matchesPassword(password, user?.passwordHash);
    if (!user || !matches) {
      throw new Problem(HttpStatus.UNAUTHORIZED, 'credentials', 'The e-mail address or the password is wrong.');
    }
    return user;
  }

  async describe(userId: string): Promise<SessionDto> {
    const { id, name, email } = await this.users.findOneByOrFail({ id: userId });
    return { user: { id, name, email }, memberships: await this.members.ofUser(userId) };
  }

  /** Sends a link by mail if there is such an account; says nothing about it either way. */
  async requestReset(email: string): Promise<void> {
    const user = await this.users.findOneBy({ email: email.toLowerCase() });
    if (!user) return;
    const token = newSecret();
    await this.resets.delete({ userId: user.id });
    const expiresAt = new Date(Date.now() + RESET_MINUTES * 60_000);
    await this.resets.save(this.resets.create({ userId: user.id, hash: hashOf(token), expiresAt }));
    await this.mail.send({
      to: user.email,
      subject: 'Choose a new password for Heddle',
      paragraphs: [
        `Hello ${user.name},`,
        `somebody, hopefully you, asked for a new password. The link works once, for ${RESET_MINUTES} minutes.`,
      ],
      link: { text: 'Choose a new password', url: `${this.settings.publicUrl}/reset/${token}` },
      closing: 'If it was not you, nothing has changed and you need do nothing.',
    });
  }

  /** Sets the new password and ends every session of the account. */
  async confirmReset(token: string, password: string): Promise<void> {
    const reset = await this.resets.findOneBy({ hash: hashOf(token) });
    const used = reset && reset.expiresAt > new Date() ? await this.resets.delete({ id: reset.id }) : undefined;
    if (!reset || used?.affected !== 1) {
      throw refusedFields([{ path: 'token', message: 'this link was used already or has run out; ask for a new one' }]);
    }
    await this.users.update({ id: reset.userId }, { passwordHash: await hashPassword(password) });
    await this.sessions.endAll(reset.userId);
  }
}
