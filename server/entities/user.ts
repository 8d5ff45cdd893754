import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

@Entity('users')
export class User {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Index({ unique: true })
  @Column({ type: 'varchar', length: 254 })
  email!: string;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  /** Argon2id hash in PHC string form; null until an invited person has chosen a password. */
  @Column({ type: 'varchar', length: 255, nullable: true }) passwordHash!: string | null;
  @Column({ type: 'boolean', default: false }) siteAdmin!: boolean;
  /** Whether a letter tells when a run they started ends. */
  @Column({ type: 'boolean', default: true }) mailsRunEnd!: boolean;
  @Column({ type: 'datetime', precision: 6, nullable: true }) closedAt!: Date | null;
  @CreateDateColumn() createdAt!: Date;
}
