import { Column, CreateDateColumn, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm';
import type { PostProcessingStep, StepEffect } from '../../shared/contracts/post-processing.ts';
import { Job } from './job.ts';
import { Run } from './run.ts';
import { User } from './user.ts';

/** A list of steps after mapping, as somebody had it applied to a run's map. Rows are never changed but for what came of them. */
@Entity('post_processing_revisions')
@Unique('UQ_post_processing_number', ['runId', 'number'])
export class PostProcessingRevision {
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Column({ type: 'uuid' }) runId!: string;
  @ManyToOne(() => Run, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'runId', foreignKeyConstraintName: 'FK_post_processing_run' })
  run!: Relation<Run>;
  /** From 1 in each run. */
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'json' }) steps!: PostProcessingStep[];
  /** In the order of the steps; empty until it is applied. */
  @Column({ type: 'json' }) effects!: StepEffect[];
  @Column({ type: 'uuid', nullable: true }) jobId!: string | null;
  @ManyToOne(() => Job, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'jobId', foreignKeyConstraintName: 'FK_post_processing_job' })
  job!: Relation<Job> | null;
  @Column({ type: 'uuid', nullable: true }) madeById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'madeById', foreignKeyConstraintName: 'FK_post_processing_user' })
  madeBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
