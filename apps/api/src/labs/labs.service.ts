import { Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { Repository } from 'typeorm';
import { conflict } from '../common/problem.js';
import type { LabContext } from '../policy/lab.guard.js';
import { Lab } from './lab.entity.js';
import type { LabChangeDto, LabDto } from './labs.dto.js';

@Injectable()
export class LabsService {
  constructor(@InjectRepository(Lab) private readonly labs: Repository<Lab>) {}

  async read({ labId }: LabContext): Promise<LabDto> {
    return toDto(await this.labs.findOneByOrFail({ id: labId }));
  }

  /** Renames, unless somebody else did since: then 409 with both names. */
  async rename(context: LabContext, { name, version }: LabChangeDto): Promise<LabDto> {
    const changed = await this.labs
      .createQueryBuilder()
      .update()
      .set({ name, version: () => 'version + 1' })
      .where('id = :id AND version = :version', { id: context.labId, version })
      .execute();
    const current = await this.read(context);
    if (changed.affected !== 1)
      throw conflict('The lab was changed by somebody else since.', current, { name, version });
    return current;
  }

  async create(name: string): Promise<Lab> {
    return this.labs.save(this.labs.create({ name }));
  }
}

function toDto({ id, name, version }: Lab): LabDto {
  return { id, name, version };
}
