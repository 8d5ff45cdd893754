import {
  Column,
  CreateDateColumn,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryColumn,
  Unique,
  type Relation,
} from 'typeorm';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { Confidence, SampleState } from '../../shared/contracts/sample.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Block } from './block.ts';
import { LandClass } from './land-class.ts';
import { Project } from './project.ts';
import { Scene } from './scene.ts';
import { User } from './user.ts';

/** A training sample. Deleting sets `deletedAt`, so that undo and history can bring it back. */
@Entity('samples')
@Unique(['projectId', 'number'])
@Index(['projectId', 'deletedAt'])
export class Sample {
  /** Made by the client that drew it. */
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId' })
  project!: Relation<Project>;
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'uuid' }) sceneId!: string;
  @ManyToOne(() => Scene, { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'sceneId' })
  scene!: Relation<Scene>;
  @Column({ type: 'uuid' }) classId!: string;
  @ManyToOne(() => LandClass, { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'classId' })
  landClass!: Relation<LandClass>;
  /** Longitude, latitude on WGS84. */
  @Index({ spatial: true })
  @Column({ type: 'polygon', transformer: geometryTransformer })
  geometry!: Polygon;
  @Column({ type: 'varchar', length: 8 }) confidence!: Confidence;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'int' }) pixelCount!: number;
  @Column({ type: 'double' }) areaHa!: number;
  @Column({ type: 'int', default: 1 }) version!: number;
  /** Moves without a new version: an edit under way is not disturbed by its review. */
  @Column({ type: 'varchar', length: 12, default: 'draft' }) state!: SampleState;
  /** The block its centroid lies in; kept up by place-samples. */
  @Column({ type: 'uuid', nullable: true, default: null }) blockId!: string | null;
  @ManyToOne(() => Block, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'blockId', foreignKeyConstraintName: 'FK_sample_block' })
  block!: Relation<Block> | null;
  @Column({ type: 'int', default: 0 }) openRemarks!: number;
  @Column({ type: 'uuid', nullable: true }) createdById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'createdById' })
  createdBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
  @Column({ type: 'datetime', precision: 6 }) updatedAt!: Date;
  @Column({ type: 'datetime', precision: 6, nullable: true }) deletedAt!: Date | null;
}
