import { Injectable } from '@nestjs/common';
import { InjectDataSource, InjectRepository } from '@nestjs/typeorm';
import { parseSystem, type SpinSystem } from '@heddle/shared';
import { DataSource, Repository, type EntityManager, type SelectQueryBuilder } from 'typeorm';
import { PeopleService } from '../account/people.service.js';
import { conflict, notFound, refusedFields } from '../common/problem.js';
import { page, type Paged, type PageQuery } from '../common/paging.js';
import { Membership } from '../members/membership.entity.js';
import { requireMay, type LabContext } from '../policy/lab.guard.js';
import { RevisionEntity } from './revision.entity.js';
import { SystemEntity } from './system.entity.js';
import {
  SYSTEM_SORT,
  type NewRevisionDto,
  type NewSystemDto,
  type RevisionDto,
  type SystemChangeDto,
  type SystemDto,
  type SystemQuery,
} from './systems.dto.js';

/** A copy's place of origin. */
interface Origin {
  originId: string;
  originRevision: number;
}

@Injectable()
export class SystemsService {
  constructor(
    @InjectDataSource() private readonly dataSource: DataSource,
    @InjectRepository(SystemEntity) private readonly systems: Repository<SystemEntity>,
    @InjectRepository(RevisionEntity) private readonly revisions: Repository<RevisionEntity>,
    private readonly people: PeopleService,
  ) {}

  /** Systems that the asker may see: shared ones and their own. */
  async list(context: LabContext, query: SystemQuery): Promise<Paged<SystemDto>> {
    const { items, nextCursor } = await page(this.filtered(context, query), query, query.sort, SYSTEM_SORT);
    return { items: await this.toDtos(items), nextCursor };
  }

  async create(context: LabContext, { document, note, shared }: NewSystemDto): Promise<SystemDto> {
    return this.insert(context, parseSystem(document), note ?? null, shared ?? false);
  }

  async read(context: LabContext, id: string): Promise<SystemDto> {
    return (await this.toDtos([await this.requireVisible(context, id)]))[0];
  }

  /** Shares, archives or gives away. */
  async change(context: LabContext, id: string, change: SystemChangeDto): Promise<SystemDto> {
    const system = await this.requireVisible(context, id);
    const { version, shared, archived, ownerId } = change;
    if (shared !== undefined || archived !== undefined) requireMay(context, 'system.edit', system.ownerId);
    if (ownerId !== undefined) {
      requireMay(context, 'system.give', system.ownerId);
      await this.requireMember(context, ownerId);
    }
    const changed = await this.systems
      .createQueryBuilder()
      .update()
      .set({
        ...(shared !== undefined && { shared }),
        ...(archived !== undefined && { archived }),
        ...(ownerId !== undefined && { ownerId }),
        updatedAt: new Date(),
        version: () => 'version + 1',
      })
      .where('id = :id AND version = :version', { id, version })
      .execute();
    const current = await this.read({ ...context, userId: ownerId ?? context.userId }, id);
    if (changed.affected !== 1) throw conflict('The system was changed by somebody else since.', current, change);
    return current;
  }

  /** A copy of the latest revision that remembers where it came from; it belongs to who made it. */
  async duplicate(context: LabContext, id: string): Promise<SystemDto> {
    const system = await this.requireVisible(context, id);
    const { document } = await this.requireRevision(id, system.latestRevision);
    const name = `Copy of ${document.name}`.slice(0, 200);
    const origin = { originId: id, originRevision: system.latestRevision };
    return this.insert(context, { ...document, name }, `Copy of revision ${system.latestRevision}`, false, origin);
  }

  /** Deletes a system that no run stands on; one with runs can be archived. */
  async remove(context: LabContext, id: string): Promise<void> {
    const system = await this.requireVisible(context, id);
    requireMay(context, 'system.delete', system.ownerId);
    await this.dataSource.transaction(async (manager) => {
      const [{ runs }] = await manager.query<{ runs: string }[]>(
        'SELECT COUNT(*) AS runs FROM runs WHERE systemId = ?',
        [id],
      );
      if (Number(runs) > 0)
        throw conflict('Runs stand on this system. Archive it instead.', { runs: Number(runs) }, null);
      await manager.delete(RevisionEntity, { systemId: id });
      await manager.delete(SystemEntity, { id });
    });
  }

  async listRevisions(context: LabContext, id: string, query: PageQuery): Promise<Paged<RevisionDto>> {
    await this.requireVisible(context, id);
    const rows = this.revisions.createQueryBuilder('revision').where('revision.systemId = :id', { id });
    const { items, nextCursor } = await page(rows, query, '-number', { number: 'revision.number' });
    const named = await this.people.named(items.map(({ authorId }) => authorId));
    return { items: items.map((revision) => toRevisionDto(revision, named(revision.authorId))), nextCursor };
  }

  async readRevision(context: LabContext, id: string, number: number): Promise<RevisionDto> {
    await this.requireVisible(context, id);
    return this.describe(await this.requireRevision(id, number));
  }

  /** Saves a new revision, unless somebody saved since: then 409 with both documents. */
  async saveRevision(context: LabContext, id: string, body: NewRevisionDto): Promise<RevisionDto> {
    const system = await this.requireVisible(context, id);
    requireMay(context, 'system.edit', system.ownerId);
    const document = parseSystem(body.document);
    const number = body.basedOn + 1;
    const saved = await this.dataSource.transaction(async (manager) => {
      const moved = await manager
        .createQueryBuilder()
        .update(SystemEntity)
        .set({ ...listColumns(document), latestRevision: number, updatedAt: new Date(), version: () => 'version + 1' })
        .where('id = :id AND latestRevision = :basedOn', { id, basedOn: body.basedOn })
        .execute();
      if (moved.affected !== 1) return null;
      return insertRevision(manager, id, number, document, body.note ?? null, context.userId);
    });
    if (saved) return this.describe(saved);
    const { latestRevision } = await this.systems.findOneByOrFail({ id });
    const current = await this.describe(await this.requireRevision(id, latestRevision));
    throw conflict('Somebody saved this system since you began.', current, { ...body, document });
  }

  /** A system the asker may see, or 404: a private one of somebody else does not exist for them. */
  async requireVisible({ labId, userId }: LabContext, id: string): Promise<SystemEntity> {
    const system = await this.systems.findOneBy({ id, labId });
    if (!system || !(system.shared || system.ownerId === userId)) throw notFound('system');
    return system;
  }

  async requireRevision(systemId: string, number: number): Promise<RevisionEntity> {
    const revision = await this.revisions.findOneBy({ systemId, number });
    if (!revision) throw notFound('revision');
    return revision;
  }

  async toDtos(systems: readonly SystemEntity[]): Promise<SystemDto[]> {
    const named = await this.people.named(systems.map(({ ownerId }) => ownerId));
    return systems.map(({ id, name, ownerId, shared, archived, latestRevision, nuclides, nucleusCount, ...rest }) => ({
      id,
      name,
      owner: named(ownerId),
      shared,
      archived,
      latestRevision,
      nuclides,
      nucleusCount,
      createdAt: rest.createdAt.toISOString(),
      updatedAt: rest.updatedAt.toISOString(),
      version: rest.version,
    }));
  }

  private filtered(context: LabContext, query: SystemQuery): SelectQueryBuilder<SystemEntity> {
    const { labId, userId } = context;
    const rows = this.systems
      .createQueryBuilder('system')
      .where('system.labId = :labId', { labId })
      .andWhere('(system.shared = TRUE OR system.ownerId = :userId)', { userId })
      .andWhere('system.archived = :archived', { archived: query.archived ?? false });
    if (query.q) rows.andWhere('system.name LIKE :q', { q: `%${query.q.replace(/[\\%_]/g, '\\$&')}%` });
    if (query.nuclide)
      rows.andWhere('JSON_CONTAINS(system.nuclides, :nuclide)', { nuclide: JSON.stringify(query.nuclide) });
    if (query.owner) rows.andWhere('system.ownerId = :owner', { owner: query.owner });
    if (query.shared !== undefined) rows.andWhere('system.shared = :shared', { shared: query.shared });
    return rows;
  }

  private async insert(
    { labId, userId }: LabContext,
    document: SpinSystem,
    note: string | null,
    shared: boolean,
    origin?: Origin,
  ): Promise<SystemDto> {
    const system = await this.dataSource.transaction(async (manager) => {
      const row = { labId, ownerId: userId, shared, latestRevision: 1, updatedAt: new Date(), ...origin };
      const saved = await manager.save(manager.create(SystemEntity, { ...row, ...listColumns(document) }));
      await insertRevision(manager, saved.id, 1, document, note, userId);
      return saved;
    });
    return (await this.toDtos([await this.systems.findOneByOrFail({ id: system.id })]))[0];
  }

  private async requireMember({ labId }: LabContext, userId: string): Promise<void> {
    const member = await this.dataSource.manager.existsBy(Membership, { labId, userId });
    if (!member) throw refusedFields([{ path: 'ownerId', message: 'is no member of this lab' }]);
  }

  private async describe(revision: RevisionEntity): Promise<RevisionDto> {
    const named = await this.people.named([revision.authorId]);
    return toRevisionDto(revision, named(revision.authorId));
  }
}

/** The columns of a system that its latest document decides. */
function listColumns({ name, nuclei }: SpinSystem) {
  return {
    name,
    nuclides: [...new Set(nuclei.map(({ isotope }) => isotope))],
    nucleusCount: nuclei.reduce((total, { count }) => total + count, 0),
  };
}

function insertRevision(
  manager: EntityManager,
  systemId: string,
  number: number,
  document: SpinSystem,
  note: string | null,
  authorId: string,
): Promise<RevisionEntity> {
  return manager.save(manager.create(RevisionEntity, { systemId, number, document, note, authorId }));
}

function toRevisionDto(
  { number, document, note, createdAt }: RevisionEntity,
  author: RevisionDto['author'],
): RevisionDto {
  return { number, document: { ...document }, note, author, createdAt: createdAt.toISOString() };
}
