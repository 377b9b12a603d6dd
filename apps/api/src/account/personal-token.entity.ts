import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

/** A token for scripts. Only its SHA-256 is kept: it has 256 random bits, so a slow hash would add nothing. */
@Entity('personal_tokens')
export class PersonalToken {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Index()
  @Column({ type: 'uuid' })
  userId: string;

  @Column({ type: 'varchar', length: 120 })
  name: string;

  @Column({ type: 'char', length: 64, unique: true })
  hash: string;

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;

  @Column({ type: 'datetime', precision: 3, nullable: true })
  lastUsedAt: Date | null;
}
