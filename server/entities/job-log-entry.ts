import { Column, Entity, Index, JoinColumn, ManyToOne, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import type { JobLogLevel } from '../../shared/contracts/queue.ts';
import { Job } from './job.ts';

/** A line of a job's log, for people. */
@Entity('job_logs')
export class JobLogEntry {
  @PrimaryGeneratedColumn({ type: 'bigint' }) id!: string;
  @Index('IDX_job_log_job')
  @Column({ type: 'uuid' })
  jobId!: string;
  @ManyToOne(() => Job, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'jobId', foreignKeyConstraintName: 'FK_job_log_job' })
  job!: Relation<Job>;
  @Column({ type: 'datetime', precision: 6 }) at!: Date;
  @Column({ type: 'varchar', length: 8 }) level!: JobLogLevel;
  @Column({ type: 'text' }) text!: string;
}
