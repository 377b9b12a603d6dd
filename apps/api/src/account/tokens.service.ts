import { Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { Repository } from 'typeorm';
import { hashOf, newSecret } from '../common/ids.js';
import { notFound } from '../common/problem.js';
import type { TokenDto } from './account.dto.js';
import { PersonalToken } from './personal-token.entity.js';

const PREFIX = 'hdl_';

/** Personal access tokens for scripts: shown once, stored hashed, revocable. */
@Injectable()
export class TokensService {
  constructor(@InjectRepository(PersonalToken) private readonly tokens: Repository<PersonalToken>) {}

  async make(userId: string, name: string): Promise<TokenDto> {
    const secret = PREFIX + newSecret();
    const token = await this.tokens.save(this.tokens.create({ userId, name, hash: hashOf(secret), lastUsedAt: null }));
    return { ...toDto(token), secret };
  }

  async list(userId: string): Promise<TokenDto[]> {
    return (await this.tokens.find({ where: { userId }, order: { createdAt: 'DESC' } })).map(toDto);
  }

  async revoke(userId: string, id: string): Promise<void> {
    if ((await this.tokens.delete({ id, userId })).affected !== 1) throw notFound('token');
  }

  async revokeAll(userId: string): Promise<void> {
    await this.tokens.delete({ userId });
  }

  /** The owner of a token, null for one that is none. */
  async userOf(secret: string): Promise<string | null> {
    if (!secret.startsWith(PREFIX)) return null;
    const token = await this.tokens.findOneBy({ hash: hashOf(secret) });
    if (!token) return null;
    await this.tokens.update({ id: token.id }, { lastUsedAt: new Date() });
    return token.userId;
  }
}

function toDto({ id, name, createdAt, lastUsedAt }: PersonalToken): TokenDto {
  return { id, name, createdAt: createdAt.toISOString(), lastUsedAt: lastUsedAt?.toISOString() ?? null };
}
