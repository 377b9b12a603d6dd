import { HttpStatus, Injectable } from '@nestjs/common';
import { InjectDataSource, InjectRepository } from '@nestjs/typeorm';
import { DataSource, Repository, type EntityManager } from 'typeorm';
import { User } from '../account/user.entity.js';
import { SessionsService } from '../auth/sessions.service.js';
import { TokensService } from '../account/tokens.service.js';
import { notFound, Problem } from '../common/problem.js';
import { Lab } from '../labs/lab.entity.js';
import type { LabContext } from '../policy/lab.guard.js';
import type { Role } from '../policy/policy.js';
import type { MemberDto } from './members.dto.js';
import { Membership } from './membership.entity.js';

interface MemberRow {
  id: string;
  userId: string;
  role: Role;
  joinedAt: Date;
  name: string;
  email: string;
}

const lastAdmin = () =>
  new Problem(HttpStatus.CONFLICT, 'last-admin', 'A lab needs at least one admin. Make somebody else admin first.');

@Injectable()
export class MembersService {
  constructor(
    @InjectDataSource() private readonly dataSource: DataSource,
    @InjectRepository(Membership) private readonly memberships: Repository<Membership>,
    private readonly sessions: SessionsService,
    private readonly tokens: TokensService,
  ) {}

  async list({ labId }: LabContext): Promise<MemberDto[]> {
    return (await this.rows(labId)).map(toDto);
  }

  async changeRole(context: LabContext, id: string, role: Role): Promise<MemberDto> {
    await this.dataSource.transaction(async (manager) => {
      const membership = await this.lockMember(manager, context, id);
      await this.keepAnAdmin(manager, context, membership, role);
      await manager.update(Membership, { id }, { role });
    });
    return toDto((await this.rows(context.labId)).find((row) => row.id === id)!);
  }

  /** Takes a member out of the lab at once: their sessions and tokens end. */
  async remove(context: LabContext, id: string): Promise<void> {
    const userId = await this.dataSource.transaction(async (manager) => {
      const membership = await this.lockMember(manager, context, id);
      await this.keepAnAdmin(manager, context, membership, undefined);
      await manager.delete(Membership, { id });
      return membership.userId;
    });
    await this.sessions.endAll(userId);
    await this.tokens.revokeAll(userId);
  }

  async ofUser(userId: string): Promise<{ labId: string; labName: string; role: Role }[]> {
    return this.memberships
      .createQueryBuilder('membership')
      .innerJoin(Lab, 'lab', 'lab.id = membership.labId')
      .select(['membership.labId AS labId', 'lab.name AS labName', 'membership.role AS role'])
      .where('membership.userId = :userId', { userId })
      .orderBy('lab.name')
      .getRawMany();
  }

  async add(labId: string, userId: string, role: Role): Promise<void> {
    await this.memberships.upsert({ labId, userId, role }, ['labId', 'userId']);
  }

  private rows(labId: string): Promise<MemberRow[]> {
    return this.memberships
      .createQueryBuilder('membership')
      .innerJoin(User, 'user', 'user.id = membership.userId')
      .select(['membership.id AS id', 'membership.userId AS userId', 'membership.role AS role'])
      .addSelect(['membership.joinedAt AS joinedAt', 'user.name AS name', 'user.email AS email'])
      .where('membership.labId = :labId', { labId })
      .orderBy('user.name')
      .getRawMany<MemberRow>();
  }

  private async lockMember(manager: EntityManager, { labId }: LabContext, id: string): Promise<Membership> {
    const membership = await manager.findOne(Membership, { where: { id, labId }, lock: { mode: 'pessimistic_write' } });
    if (!membership) throw notFound('member');
    return membership;
  }

  private async keepAnAdmin(manager: EntityManager, { labId }: LabContext, leaving: Membership, role?: Role) {
    if (leaving.role !== 'admin' || role === 'admin') return;
    const admins = await manager.find(Membership, {
      where: { labId, role: 'admin' },
      lock: { mode: 'pessimistic_write' },
    });
    if (admins.length < 2) throw lastAdmin();
  }
}

function toDto({ id, userId, name, email, role, joinedAt }: MemberRow): MemberDto {
  return { id, userId, name, email, role, joinedAt: new Date(joinedAt).toISOString() };
}
