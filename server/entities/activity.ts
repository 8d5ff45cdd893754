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
import { Project } from './project.ts';
import { User } from './user.ts';

/** A line of the project's diary: who did what. */
@Entity('activities')
@Index(['projectId', 'createdAt'])
export class Activity {
  @PrimaryGeneratedColumn({ type: 'bigint' }) id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'uuid', nullable: true }) userId!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User> | null;
  @Column({ type: 'varchar', length: 400 }) text!: string;
  /** Path of the screen it is about, within the project: "runs/…". */
  @Column({ type: 'varchar', length: 200, nullable: true }) path!: string | null;
  @CreateDateColumn() createdAt!: Date;
}
