import { Column, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

@Entity('password_resets')
export class PasswordReset {
  @PrimaryGeneratedColumn('uuid')
  id: string;

  @Index()
  @Column({ type: 'uuid' })
  userId: string;

  @Column({ type: 'char', length: 64, unique: true })
  hash: string;

  @Column({ type: 'datetime', precision: 3 })
  expiresAt: Date;
}
