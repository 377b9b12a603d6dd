import type { Variation } from '@heddle/shared';
import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

/** Runs of one system along a varied quantity. */
@Entity('series')
export class SeriesEntity {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Index()
  @Column({ type: 'uuid' })
  labId: string;

  @Column({ type: 'uuid' })
  ownerId: string;

  @Column({ type: 'varchar', length: 200 })
  name: string;

  @Column({ type: 'uuid' })
  systemId: string;

  @Column({ type: 'int' })
  revision: number;

  @Column({ type: 'json' })
  vary: Variation;

  /** One run for each value, in their order; one run may serve several series. */
  @Column({ type: 'json' })
  runIds: string[];

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;
}
