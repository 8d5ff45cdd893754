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
import type { Polygon } from '../../shared/contracts/geometry.ts';
import type { Confidence } from '../../shared/contracts/sample.ts';
import { geometryTransformer } from './geometry-column.ts';
import { Sample } from './sample.ts';
import { User } from './user.ts';

/** A sample as it stood after one change. */
@Entity('sample_versions')
@Unique(['sampleId', 'versionNumber'])
export class SampleVersion {
  @PrimaryGeneratedColumn('uuid') id!: string;
  @Column({ type: 'uuid' }) sampleId!: string;
  @ManyToOne(() => Sample, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'sampleId' })
  sample!: Relation<Sample>;
  @Column({ type: 'int' }) versionNumber!: number;
  @Column({ type: 'varchar', length: 16 }) change!: 'created' | 'edited' | 'deleted' | 'restored';
  @Column({ type: 'uuid' }) classId!: string;
  @Column({ type: 'polygon', transformer: geometryTransformer }) geometry!: Polygon;
  @Column({ type: 'varchar', length: 8 }) confidence!: Confidence;
  @Column({ type: 'text' }) note!: string;
  @Column({ type: 'int' }) pixelCount!: number;
  @Column({ type: 'double' }) areaHa!: number;
  @Column({ type: 'uuid', nullable: true }) byId!: string | null;
  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'byId' })
  by!: Relation<User> | null;
  @CreateDateColumn() createdAt!: Date;
}
