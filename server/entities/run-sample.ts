import { Column, Entity, JoinColumn, ManyToOne, PrimaryColumn, type Relation } from 'typeorm';
import type { Polygon } from '../../shared/contracts/geometry.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Run } from './run.ts';

/** A sample as a run took it: the snapshot that makes the run repeatable, and what the map says of it. */
@Entity('run_samples')
export class RunSample {
  @PrimaryColumn({ type: 'uuid' }) runId!: string;
  @ManyToOne(() => Run, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'runId' })
  run!: Relation<Run>;
  @PrimaryColumn({ type: 'uuid' }) sampleId!: string;
  @Column({ type: 'int' }) sampleNumber!: number;
  @Column({ type: 'int' }) sampleVersion!: number;
  @Column({ type: 'varchar', length: 8 }) part!: 'training' | 'held-out';
  @Column({ type: 'uuid' }) classId!: string;
  @Column({ type: 'polygon', transformer: geometryTransformer }) geometry!: Polygon;
  /** Of a held-out sample: its pixels by mapped class code; null before mapping ends. */
  @Column({ type: 'json', nullable: true }) mappedPixels!: Record<string, number> | null;
}
