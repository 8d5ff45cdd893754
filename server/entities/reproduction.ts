import { Column, CreateDateColumn, Entity, Index, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import type { ReproductionCheck, ReproductionVerdict } from '../../shared/contracts/reproduction.ts';
import { Job } from './job.ts';
import { Run } from './run.ts';
import { User } from './user.ts';

/** A run made once more from its stored recipe and snapshot, to see whether the class map comes out the same. */
@Entity('reproductions')
export class Reproduction {
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Index('IDX_reproduction_run')
  @Column({ type: 'uuid' })
  runId!: string;
  @ManyToOne(() => Run, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'runId', foreignKeyConstraintName: 'FK_reproduction_run' })
  run!: Relation<Run>;
  @Column({ type: 'uuid', nullable: true }) jobId!: string | null;
  @ManyToOne(() => Job, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'jobId', foreignKeyConstraintName: 'FK_reproduction_job' })
  job!: Relation<Job> | null;
  @Column({ type: 'varchar', length: 12, nullable: true }) verdict!: ReproductionVerdict | null;
  @Column({ type: 'json' }) checks!: ReproductionCheck[];
  /** Why it cannot be made again, in plain words. */
  @Column({ type: 'json' }) missing!: string[];
  @Column({ type: 'int' }) threads!: number;
  @Column({ type: 'double', nullable: true }) seconds!: number | null;
  @Column({ type: 'uuid', nullable: true }) askedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'askedById', foreignKeyConstraintName: 'FK_reproduction_user' })
  askedBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
