import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

/** One signed-in browser. The refresh token rotates; the hash of the one before tells a stolen token from a new one. */
@Entity('sessions')
export class Session {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Index()
  @Column({ type: 'uuid' })
  userId: string;

  @Column({ type: 'char', length: 64, unique: true })
  refreshHash: string;

  @Column({ type: 'char', length: 64, nullable: true })
  previousHash: string | null;

  @Column({ type: 'datetime', precision: 3 })
  rotatedAt: Date;

  @Column({ type: 'datetime', precision: 3 })
  expiresAt: Date;

  @Column({ type: 'varchar', length: 300 })
  userAgent: string;

  @CreateDateColumn({ type: 'datetime', precision: 3, default: () => 'CURRENT_TIMESTAMP(3)' })
  createdAt: Date;
}
