import {
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import type { RemarkKind } from '../../shared/contracts/sample-review.ts';
import { Sample } from './sample.ts';
import { User } from './user.ts';

/** A line of a sample's thread. */
@Entity('sample_remarks')
export class SampleRemark {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) sampleId!: string;
  @ManyToOne(() => Sample, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'sampleId', foreignKeyConstraintName: 'FK_sample_remark_sample' })
  sample!: Relation<Sample>;
  @Column({ type: 'varchar', length: 32 }) kind!: RemarkKind;
  @Column({ type: 'text' }) text!: string;
  @Column({ type: 'uuid', nullable: true }) byId!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'byId', foreignKeyConstraintName: 'FK_sample_remark_by' })
  by!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
  @Column({ type: 'datetime', precision: 6, nullable: true }) resolvedAt!: Date | null;
  @Column({ type: 'uuid', nullable: true }) resolvedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'resolvedById', foreignKeyConstraintName: 'FK_sample_remark_resolver' })
  resolvedBy!: Relation<User> | null;
}
