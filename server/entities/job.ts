import { Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';
import type { JobKind, JobPriority, JobState } from '../../shared/contracts/job.ts';

/** One piece of background work. A job is owned by the process whose heartbeat it carries. */
@Entity('jobs')
@Index(['state', 'createdAt'])
export class Job {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'varchar', length: 16 }) kind!: JobKind;
  @Index()
  @Column({ type: 'uuid' })
  projectId!: string;
  @Column({ type: 'uuid', nullable: true }) sceneId!: string | null;
  @Column({ type: 'uuid', nullable: true }) runId!: string | null;
  /** The reproduction or tuning it works for, of the kinds that have one. */
  @Column({ type: 'uuid', nullable: true }) subjectId!: string | null;
  @Column({ type: 'varchar', length: 16, default: 'queued' }) state!: JobState;
  @Column({ type: 'varchar', length: 8, default: 'normal' }) priority!: JobPriority;
  /** Where a site administrator put it, before all that wait their fair turn; null for a fair turn. */
  @Column({ type: 'int', nullable: true }) place!: number | null;
  @Column({ type: 'varchar', length: 120, default: '' }) step!: string;
  @Column({ type: 'double', default: 0 }) done!: number;
  @Column({ type: 'double', default: 0 }) total!: number;
  @Column({ type: 'double', default: 0 }) share!: number;
  @Column({ type: 'double', nullable: true }) secondsLeft!: number | null;
  @Column({ type: 'text', nullable: true }) error!: string | null;
  @Column({ type: 'boolean', default: false }) cancelAsked!: boolean;
  /** Times it was taken up; a job that keeps killing its server is given up. */
  @Column({ type: 'int', default: 0 }) attempts!: number;
  @Column({ type: 'varchar', length: 64, nullable: true }) owner!: string | null;
  @Column({ type: 'datetime', precision: 6, nullable: true }) heartbeatAt!: Date | null;
  @CreateDateColumn() createdAt!: Date;
  @Column({ type: 'datetime', precision: 6, nullable: true }) startedAt!: Date | null;
  @Column({ type: 'datetime', precision: 6, nullable: true }) endedAt!: Date | null;
}
