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
import { Project } from './project.ts';

@Entity('land_classes')
@Unique(['projectId', 'code'])
export class LandClass {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'int' }) code!: number;
  @Column({ type: 'varchar', length: 80 }) name!: string;
  @Column({ type: 'char', length: 7 }) colour!: string;
  @Column({ type: 'text' }) definition!: string;
  @Column({ type: 'int' }) position!: number;
  @Column({ type: 'int', default: 1 }) version!: number;
  @CreateDateColumn() createdAt!: Date;
}
