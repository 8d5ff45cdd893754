import {
  Column,
  CreateDateColumn,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import { User } from './user.ts';

/** A welcome or password-reset link; only the SHA-256 of its secret is stored. */
@Entity('account_tokens')
export class AccountToken {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Index({ unique: true })
  @Column({ type: 'char', length: 64 })
  secretSha256!: string;
  @Column({ type: 'uuid' }) userId!: string;
  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User>;
  @Column({ type: 'varchar', length: 16 }) purpose!: 'welcome' | 'reset';
  @Column({ type: 'datetime', precision: 6 }) expiresAt!: Date;
  @CreateDateColumn() createdAt!: Date;
}
