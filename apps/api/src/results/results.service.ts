import { Injectable } from '@nestjs/common';
import { InjectRepository } from '@nestjs/typeorm';
import { toResultDocument, type Result } from '@heddle/shared';
import { Repository, type EntityManager } from 'typeorm';
import { notFound } from '../common/problem.js';
import type { RunEntity } from '../runs/run.entity.js';
import { packArrays, toBytes, unpackArrays } from './packed-arrays.js';
import { ResultEntity } from './result.entity.js';

@Injectable()
export class ResultsService {
  constructor(@InjectRepository(ResultEntity) private readonly results: Repository<ResultEntity>) {}

  async store(manager: EntityManager, runId: string, { report, lines, spectrum, fid }: Result): Promise<void> {
    const { firstPpm, lastPpm } = spectrum;
    const arrays = await packArrays({ spectrum, fid });
    await manager.upsert(
      ResultEntity,
      { runId, report, lines: lines ?? null, firstPpm, lastPpm, dwell: fid.dwell, arrays },
      ['runId'],
    );
  }

  /** The whole result of a run that is done, else 404. */
  async read(run: RunEntity): Promise<Result> {
    const row = await this.require(run);
    const { spectrum, fid } = await unpackArrays(row.arrays);
    return {
      format: 'heddle.result/1',
      system: run.system,
      experiment: run.experiment,
      spectrum: { firstPpm: row.firstPpm, lastPpm: row.lastPpm, ...spectrum },
      fid: { dwell: row.dwell, ...fid },
      ...(row.lines && { lines: row.lines }),
      report: row.report,
    };
  }

  async readDocument(run: RunEntity): Promise<object> {
    return toResultDocument(await this.read(run));
  }

  /**
   * For the viewer: the length of a JSON header as a 32-bit little-endian integer, the header (everything but the arrays,
   * padded with blanks so that the arrays lie on 8 bytes), then the block of `packed-arrays.ts`.
   */
  async readBinary(run: RunEntity): Promise<Buffer> {
    const { spectrum, fid, ...rest } = await this.read(run);
    const { firstPpm, lastPpm } = spectrum;
    const text = JSON.stringify({ ...rest, spectrum: { firstPpm, lastPpm }, fid: { dwell: fid.dwell } });
    const bytes = Buffer.byteLength(text);
    const header = Buffer.from(text + ' '.repeat((8 - ((bytes + 4) % 8)) % 8));
    const length = Buffer.alloc(4);
    length.writeUInt32LE(header.length, 0);
    return Buffer.concat([length, header, toBytes({ spectrum, fid })]);
  }

  async remove(manager: EntityManager, runId: string): Promise<void> {
    await manager.delete(ResultEntity, { runId });
  }

  private async require({ id }: RunEntity): Promise<ResultEntity> {
    const row = await this.results.findOneBy({ runId: id });
    if (!row) throw notFound('result yet');
    return row;
  }
}
