import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

/** A spin system of a lab; what it is stands in its revisions. The columns beside are for lists. */
@Entity('systems')
@Index(['labId', 'name'])
export class SystemEntity {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Column({ type: 'uuid' })
  labId: string;

  @Column({ type: 'uuid' })
  ownerId: string;

  @Column({ type: 'varchar', length: 200 })
  name: string;

  @Column({ type: 'boolean', default: false })
  shared: boolean;

  @Column({ type: 'boolean', default: false })
  archived: boolean;

  @Column({ type: 'int' })
  latestRevision: number;

  /** Isotopes of the latest revision. */
  @Column({ type: 'json' })
  nuclides: string[];

  @Column({ type: 'int' })
  nucleusCount: number;

  /** The system and revision that this one is a copy of. */
  @Column({ type: 'uuid', nullable: true })
  originId: string | null;

  @Column({ type: 'int', nullable: true })
  originRevision: number | null;

  @Column({ type: 'int', default: 1 })
  version: number;

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;

  @Column({ type: 'datetime', precision: 3 })
  updatedAt: Date;
}
