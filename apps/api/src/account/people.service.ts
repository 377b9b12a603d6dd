import { Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { In, Repository } from 'typeorm';
import type { PersonDto } from '../common/person.dto.js';
import { User } from './user.entity.js';

/** Names of people, for lists that show who owns what. */
@Injectable()
export class PeopleService {
  constructor(@InjectRepository(User) private readonly users: Repository<User>) {}

  /** A look-up for these ids; somebody who is gone still has a name to show. */
  async named(ids: readonly string[]): Promise<(id: string) => PersonDto> {
    const users = ids.length > 0 ? await this.users.findBy({ id: In([...new Set(ids)]) }) : [];
    const names = new Map(users.map(({ id, name }) => [id, name]));
    return (id) => ({ id, name: names.get(id) ?? 'somebody who left' });
  }
}
