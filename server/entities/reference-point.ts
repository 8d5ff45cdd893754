import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, Unique, type Relation } from 'typeorm';
import { ReferenceDesign } from './reference-design.ts';
import { User } from './user.ts';

/** A drawn pixel of a design. Numbers are in random order, so that they tell nothing of the stratum. */
@Entity('reference_points')
@Unique('UQ_reference_point_number', ['designId', 'number'])
export class ReferencePoint {
  @PrimaryColumn({ type: 'uuid' }) id!: string;
  @Column({ type: 'uuid' }) designId!: string;
  @ManyToOne(() => ReferenceDesign, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'designId', foreignKeyConstraintName: 'FK_reference_point_design' })
  design!: Relation<ReferenceDesign>;
  @Column({ type: 'int' }) number!: number;
  /** Place of its stratum in the design's list, and its place in the stratum's order of drawing, from 0. */
  @Column({ type: 'int' }) stratum!: number;
  @Column({ type: 'int' }) drawOrder!: number;
  /** Pixel of the scene's grid, from the upper left. */
  @Column({ type: 'int' }) pixelRow!: number;
  @Column({ type: 'int' }) pixelColumn!: number;
  /** Centre of the pixel, degrees on WGS84. */
  @Column({ type: 'double' }) lon!: number;
  @Column({ type: 'double' }) lat!: number;
  @Column({ type: 'int' }) mappedCode!: number;
  /** Taken over, with the class that stood, from the design this one carries on. */
  @Column({ type: 'boolean', default: false }) isCarried!: boolean;
  @Column({ type: 'uuid', nullable: true }) decisionClassId!: string | null;
  @Column({ type: 'uuid', nullable: true }) decisionAlternateClassId!: string | null;
  @Column({ type: 'text' }) decisionNote!: string;
  @Column({ type: 'uuid', nullable: true }) decidedById!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'decidedById', foreignKeyConstraintName: 'FK_reference_point_decider' })
  decidedBy!: Relation<User> | null;
  @Column({ type: 'datetime', precision: 6, nullable: true }) decidedAt!: Date | null;
}
