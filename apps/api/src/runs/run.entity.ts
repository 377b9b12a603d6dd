import type { Experiment, SpinSystem } from '@heddle/shared';
import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';
import type { RunState } from './run.states.js';

/** One simulation. Its documents and engine never change; only its state does, and only as `run.states.ts` allows. */
@Entity('runs')
@Index(['labId', 'createdAt'])
@Index(['state', 'createdAt'])
@Index(['identity'])
export class RunEntity {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Column({ type: 'uuid' })
  labId: string;

  @Column({ type: 'uuid' })
  ownerId: string;

  @Index()
  @Column({ type: 'uuid' })
  systemId: string;

  @Column({ type: 'int' })
  revision: number;

  @Column({ type: 'varchar', length: 200 })
  systemName: string;

  @Column({ type: 'json' })
  system: SpinSystem;

  @Column({ type: 'json' })
  experiment: Experiment;

  @Column({ type: 'varchar', length: 20 })
  engine: string;

  /** SHA-256 of revision, experiment and engine: equal for runs that must give equal results. */
  @Column({ type: 'char', length: 64 })
  identity: string;

  /** Who asked, with which Idempotency-Key; asking twice makes one run. */
  @Column({ type: 'varchar', length: 140, nullable: true, unique: true })
  requestKey: string | null;

  /** Estimated to be done in moments: such a run never waits behind a long one. */
  @Column({ type: 'boolean', default: false })
  short: boolean;

  @Column({ type: 'varchar', length: 20, default: 'queued' })
  state: RunState;

  @Column({ type: 'double', default: 0 })
  progress: number;

  @Column({ type: 'int', default: 0 })
  attempts: number;

  /** The hold of a worker on a running job; one that isn't renewed until `leaseUntil` is lost. */
  @Column({ type: 'uuid', nullable: true })
  lease: string | null;

  @Column({ type: 'datetime', precision: 3, nullable: true })
  leaseUntil: Date | null;

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;

  @Column({ type: 'datetime', precision: 3, nullable: true })
  startedAt: Date | null;

  @Column({ type: 'datetime', precision: 3, nullable: true })
  finishedAt: Date | null;

  @Column({ type: 'double', nullable: true })
  seconds: number | null;

  @Column({ type: 'varchar', length: 300, nullable: true })
  method: string | null;

  @Column({ type: 'int', default: 0 })
  warnings: number;

  @Column({ type: 'varchar', length: 2000, nullable: true })
  error: string | null;
}
