import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm';
import type { Confidence } from '../../shared/contracts/sample.ts';
import { ReferencePoint } from './reference-point.ts';
import { User } from './user.ts';

/** What one interpreter said of a point, or that they skipped it. */
@Entity('reference_answers')
@Unique('UQ_reference_answer_user', ['pointId', 'userId'])
export class ReferenceAnswer {
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Column({ type: 'uuid' }) pointId!: string;
  @ManyToOne(() => ReferencePoint, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'pointId', foreignKeyConstraintName: 'FK_reference_answer_point' })
  point!: Relation<ReferencePoint>;
  @Column({ type: 'uuid', nullable: true }) userId!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'userId', foreignKeyConstraintName: 'FK_reference_answer_user' })
  user!: Relation<User> | null;
  /** Null for a skipped point. */
  @Column({ type: 'uuid', nullable: true }) classId!: string | null;
  @Column({ type: 'uuid', nullable: true }) alternateClassId!: string | null;
  @Column({ type: 'varchar', length: 8 }) confidence!: Confidence;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'varchar', length: 8 }) source!: 'image' | 'import';
  /** How long the point was looked at. */
  @Column({ type: 'double', nullable: true }) seconds!: number | null;
  @Column({ type: 'datetime', precision: 6 }) answeredAt!: Date;
}
