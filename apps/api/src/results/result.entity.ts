import type { Line, Report } from '@heddle/shared';
import { Column, Entity, PrimaryColumn } from 'typeorm';

/** What a run gave. The arrays are packed, see `packed-arrays.ts`. */
@Entity('results')
export class ResultEntity {
  @PrimaryColumn({ type: 'uuid' })
  runId: string;

  @Column({ type: 'json' })
  report: Report;

  @Column({ type: 'json', nullable: true })
  lines: Line[] | null;

  @Column({ type: 'double' })
  firstPpm: number;

  @Column({ type: 'double' })
  lastPpm: number;

  @Column({ type: 'double' })
  dwell: number;

  @Column({ type: 'longblob' })
  arrays: Buffer;
}
