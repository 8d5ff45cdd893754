import { Column, CreateDateColumn, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import type { ArealGeometry, Polygon } from '../../shared/contracts/geometry.ts';
import type { Recipe } from '../../shared/contracts/run.ts';
import type { TuningPlan, TuningTrial } from '../../shared/contracts/tuning.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Job } from './job.ts';
import { Project } from './project.ts';
import type { RunClass } from './run.ts';
import { User } from './user.ts';

/** A sample as it stood when the tuning was asked for. */
export interface TuningSample {
  id: string;
  classId: string;
  /** Held-out samples are kept so that their pixels can be left out; no trial learns from them or is judged by them. */
  part: 'training' | 'held-out';
  geometry: Polygon;
}

/** A search for the settings of a classifier, judged by folds of the training polygons. */
@Entity('tunings')
export class Tuning {
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Index('IDX_tuning_project')
  @Column({ type: 'uuid' })
  projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_tuning_project' })
  project!: Relation<Project>;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'json' }) recipe!: Recipe;
  @Column({ type: 'json' }) plan!: TuningPlan;
  @Column({ type: 'json' }) classes!: RunClass[];
  @Column({ type: 'geometry', nullable: true, transformer: geometryTransformer }) studyArea!: ArealGeometry | null;
  @Column({ type: 'json' }) samples!: TuningSample[];
  /** Training polygons of each fold, and what is worth knowing about them. */
  @Column({ type: 'json' }) notes!: string[];
  @Column({ type: 'json' }) trials!: TuningTrial[];
  @Column({ type: 'uuid', nullable: true }) jobId!: string | null;
  @ManyToOne(() => Job, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'jobId', foreignKeyConstraintName: 'FK_tuning_job' })
  job!: Relation<Job> | null;
  @Column({ type: 'uuid', nullable: true }) startedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'startedById', foreignKeyConstraintName: 'FK_tuning_user' })
  startedBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
