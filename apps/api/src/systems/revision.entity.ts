import type { SpinSystem } from '@heddle/shared';
import { Column, CreateDateColumn, Entity, PrimaryGeneratedColumn, Unique } from 'typeorm';

/** One saved state of a system. Never changed once written. */
@Entity('revisions')
@Unique(['systemId', 'number'])
export class RevisionEntity {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Column({ type: 'uuid' })
  systemId: string;

  @Column({ type: 'int' })
  number: number;

  @Column({ type: 'json' })
  document: SpinSystem;

  @Column({ type: 'varchar', length: 2000, nullable: true })
  note: string | null;

  @Column({ type: 'uuid' })
  authorId: string;

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;
}
