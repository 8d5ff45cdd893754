import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { BlockAgreement } from '../../shared/contracts/block.ts';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Project } from './project.ts';

/** A part of the study area that is one piece of sampling work. */
@Entity('blocks')
export class Block {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_block_project' })
  project!: Relation<Project>;
  /** Order of the work, and which block has a sample whose centre lies on a shared edge. */
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'varchar', length: 40 }) name!: string;
  @Column({ type: 'polygon', transformer: geometryTransformer }) geometry!: Polygon;
  @Column({ type: 'double' }) areaHa!: number;
  @Column({ type: 'int', nullable: true }) targetPerClass!: number | null;
  @Column({ type: 'datetime', precision: 6, nullable: true }) checkedAt!: Date | null;
  /** How the two agreed, as it was when both were done. */
  @Column({ type: 'json', nullable: true }) agreement!: BlockAgreement | null;
  @Column({ type: 'int', default: 1 }) version!: number;
  @CreateDateColumn() createdAt!: Date;
}
