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
import type { DesignState, PlanDesign } from '../../shared/contracts/reference.ts';
import { Project } from './project.ts';
import { Run, type RunClass } from './run.ts';
import { User } from './user.ts';

/** A stratum of a design as it was planned: the pixels the map gives to one code. */
export interface DesignStratum {
  /** Null for what the map leaves unclassified. */
  classId: string | null;
  code: number;
  name: string;
  colour: string;
  pixels: number;
  areaHa: number;
  share: number;
  expectedUsers: number | null;
  points: number;
  expectedLow: number | null;
  expectedHigh: number | null;
}

/** A probability sample of reference points for a run's class map. */
@Entity('reference_designs')
@Unique('UQ_reference_design_number', ['projectId', 'number'])
export class ReferenceDesign {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) projectId!: string;
  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'projectId', foreignKeyConstraintName: 'FK_reference_design_project' })
  project!: Relation<Project>;
  @Column({ type: 'uuid' }) runId!: string;
  @ManyToOne(() => Run, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'runId', foreignKeyConstraintName: 'FK_reference_design_run' })
  run!: Relation<Run>;
  @Column({ type: 'int' }) number!: number;
  @Column({ type: 'varchar', length: 120 }) name!: string;
  @Column({ type: 'varchar', length: 16 }) state!: DesignState;
  /** What was asked for when the points were drawn. */
  @Column({ type: 'json' }) plan!: PlanDesign;
  @Column({ type: 'json' }) strata!: DesignStratum[];
  /** Classes an answer may name: those of the run, in its order, then others of the scheme. */
  @Column({ type: 'json' }) classes!: RunClass[];
  @Column({ type: 'int', unsigned: true }) seed!: number;
  @Column({ type: 'double' }) minSpacingMeters!: number;
  /** Candidates left out for lying too near to another point, by stratum. */
  @Column({ type: 'json' }) leftOutBySpacing!: number[];
  @Column({ type: 'int' }) answersPerPoint!: number;
  /** SHA-256 over class map, strata, seed and points, from opening on. */
  @Column({ type: 'char', length: 64, nullable: true }) digest!: string | null;
  @Column({ type: 'uuid', nullable: true }) augmentsId!: string | null;
  @Column({ type: 'uuid', nullable: true }) createdById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'createdById', foreignKeyConstraintName: 'FK_reference_design_creator' })
  createdBy!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
  @Column({ type: 'datetime', precision: 6, nullable: true }) openedAt!: Date | null;
  @Column({ type: 'datetime', precision: 6, nullable: true }) closedAt!: Date | null;
}
