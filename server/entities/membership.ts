import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import type { ProjectRole } from '../../shared/constants/roles.ts';
import { Project } from './project.ts';
import { User } from './user.ts';

@Entity('memberships')
@Unique(['projectId', 'userId'])
export class Membership {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'uuid' }) userId!: string;
  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'userId' })
  user!: Relation<User>;
  @Column({ type: 'simple-array' }) roles!: ProjectRole[];
  @CreateDateColumn() createdAt!: Date;
}
