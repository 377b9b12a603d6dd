import { HttpStatus, Inject, Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { MoreThan, Repository } from 'typeorm';
import { AccountService } from '../account/account.service.js';
import { User } from '../account/user.entity.js';
import { hashOf, newSecret } from '../common/ids.js';
import { notFound, Problem, refusedFields } from '../common/problem.js';
import { SETTINGS } from '../config/settings.module.js';
import type { Settings } from '../config/settings.js';
import { Lab } from '../labs/lab.entity.js';
import { MailService } from '../mail/mail.service.js';
import { MembersService } from '../members/members.service.js';
import type { LabContext } from '../policy/lab.guard.js';
import { Invitation } from './invitation.entity.js';
import type { AcceptDto, InvitationDto, InvitationViewDto, InviteDto } from './invitations.dto.js';

const DAYS = 14;

/** What the account of an accepted invitation is. */
export interface Accepted {
  userId: string;
  /** A new account may sign in at once; one that exists proves itself by signing in. */
  isNew: boolean;
}

@Injectable()
export class InvitationsService {
  constructor(
    @Inject(SETTINGS) private readonly settings: Settings,
    @InjectRepository(Invitation) private readonly invitations: Repository<Invitation>,
    @InjectRepository(Lab) private readonly labs: Repository<Lab>,
    @InjectRepository(User) private readonly users: Repository<User>,
    private readonly account: AccountService,
    private readonly members: MembersService,
    private readonly mail: MailService,
  ) {}

  async list({ labId }: LabContext): Promise<InvitationDto[]> {
    const open = await this.invitations.find({
      where: { labId, expiresAt: MoreThan(new Date()) },
      order: { createdAt: 'DESC' },
    });
    return Promise.all(open.map((invitation) => this.toDto(invitation)));
  }

  /** Invites by mail. A second invitation to one address takes the place of the first. */
  async invite(context: LabContext, { email: written, role }: InviteDto): Promise<InvitationDto> {
    const { labId, userId } = context;
    const email = written.toLowerCase();
    if ((await this.members.list(context)).some((member) => member.email === email)) {
      throw refusedFields([{ path: 'email', message: 'belongs to a member of this lab already' }]);
    }
    await this.invitations.delete({ labId, email });
    const token = newSecret();
    const expiresAt = new Date(Date.now() + DAYS * 86_400_000);
    const invitation = await this.invitations.save(
      this.invitations.create({ labId, email, role, hash: hashOf(token), invitedById: userId, expiresAt }),
    );
    const lab = await this.labs.findOneByOrFail({ id: labId });
    const inviter = await this.users.findOneByOrFail({ id: userId });
    await this.mail.send({
      to: email,
      subject: `${inviter.name} invites you to ${lab.name}`,
      paragraphs: [`${inviter.name} invites you to join ${lab.name} on Heddle as ${role}.`],
      link: { text: 'Accept the invitation', url: `${this.settings.publicUrl}/invitations/${token}` },
      closing: `The link works for ${DAYS} days.`,
    });
    return this.toDto(invitation);
  }

  async withdraw({ labId }: LabContext, id: string): Promise<void> {
    if ((await this.invitations.delete({ id, labId })).affected !== 1) throw notFound('invitation');
  }

  async view(token: string): Promise<InvitationViewDto> {
    const { labId, email, role } = await this.open(token);
    const { name } = await this.labs.findOneByOrFail({ id: labId });
    return { labName: name, email, role, needsAccount: !(await this.account.findByEmail(email)) };
  }

  /** Joins the lab. Somebody who has an account must be signed in to it. */
  async accept(token: string, { name, password }: AcceptDto, signedInAs: string | undefined): Promise<Accepted> {
    const { id, labId, email, role } = await this.open(token);
    const existing = await this.account.findByEmail(email);
    if (existing && existing.id !== signedInAs) {
      throw new Problem(HttpStatus.UNAUTHORIZED, 'sign-in-first', `Sign in as ${email} to accept this invitation.`);
    }
    if (!existing && (!name || !password)) {
      const missing = [...(name ? [] : ['name']), ...(password ? [] : ['password'])];
      throw refusedFields(missing.map((path) => ({ path, message: 'is needed for the new account' })));
    }
    const user = existing ?? (await this.account.create(name!, email, password!));
    if ((await this.invitations.delete({ id })).affected !== 1) throw notFound('invitation');
    await this.members.add(labId, user.id, role);
    return { userId: user.id, isNew: !existing };
  }

  private async open(token: string): Promise<Invitation> {
    const invitation = await this.invitations.findOneBy({ hash: hashOf(token), expiresAt: MoreThan(new Date()) });
    if (!invitation) throw notFound('invitation');
    return invitation;
  }

  private async toDto({ id, email, role, createdAt, expiresAt, invitedById }: Invitation): Promise<InvitationDto> {
    const inviter = await this.users.findOneBy({ id: invitedById });
    return {
      id,
      email,
      role,
      createdAt: createdAt.toISOString(),
      expiresAt: expiresAt.toISOString(),
      invitedBy: inviter?.name ?? 'somebody who left',
    };
  }
}
